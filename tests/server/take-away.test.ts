import SecondReader from 'dxf-parser';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { extractText, getDocumentProxy } from 'unpdf';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { v7 as newId } from 'uuid';
import { cornerPlanEndpoints } from '../../shared/corner-plans.ts';
import { machineEndpoints } from '../../shared/machines.ts';
import { partEndpoints } from '../../shared/parts.ts';
import { recordEndpoints } from '../../shared/record.ts';
import {
  blockFrameEndpoints,
  cutPathEndpoints,
  takeAwayCautions,
  takeAwayFormats,
  takeAwayUnits,
  type TakeAwayFormat,
} from '../../shared/take-away.ts';
import { dxfText } from '../../strategy/path/drawing/write/index.ts';
import { lineBetween } from '../../strategy/path/segment.ts';
import { connected } from '../support/database.ts';
import { made, makeApproved, makePlant, makeSubmitted, type TestPlant } from '../support/plant.ts';
import { startTestServer, type Caller, type TestServer } from '../support/server.ts';

let server: TestServer;
let plant: TestPlant;
let programmer: Caller;
let engineer: Caller;
let partId: string;
let approvedPlan: string;
let unapprovedPlan: string | undefined;

const room = { left: 0.06, right: 0.06, above: 0.06, below: 0.06 };
const choices = { thickness: 0.0185, plateTemperature: 300, skeleton: room, overrides: {} };

beforeAll(async () => {
  server = await startTestServer();
  plant = await makePlant(server, 'taking away');
  programmer = await plant.as('programmer');
  engineer = await plant.as('engineer');
  partId = await keep('bracket.dxf', 'Brücke „links“ <b>');
  const { id } = await makeApproved(plant, { gradeGroup: 'taken away' });
  approvedPlan = await loopsOf(partId, id);
});
afterAll(() => server.close());

const keep = (file: string, name: string): Promise<string> =>
  keepBytes(readFileSync(path.join(import.meta.dirname, '../support/drawings', file)), file, name);

/** A plain rectangle, which leaves no scrap within its own bounds. */
function keepRectangle(): Promise<string> {
  const corners = [
    { x: 0, y: 0 },
    { x: 0.1, y: 0 },
    { x: 0.1, y: 0.06 },
    { x: 0, y: 0.06 },
  ];
  const segments = corners.map((start, i) => lineBetween(start, corners[(i + 1) % 4] ?? start));
  const pieces = [{ kind: 'contour' as const, segments }];
  const path = { runs: [{ contourId: '1', name: 'outline', pierce: { x: 0, y: 0 }, pieces }] };
  const text = dxfText({ path, unit: 'mm', title: 'Rectangle', notes: [] });
  return keepBytes(Buffer.from(text), 'rectangle.dxf', 'Rectangle');
}

async function keepBytes(bytes: Uint8Array, file: string, name: string): Promise<string> {
  const id = newId();
  await made(
    programmer.call(partEndpoints.add, { body: { id, name, answers: { unit: 'mm' } }, file: { name: file, bytes } }),
  );
  return id;
}

async function planOf(part: string, revisionId: string, change: object = {}): Promise<string> {
  const id = newId();
  await made(
    programmer.call(cornerPlanEndpoints.add, { body: { id, partId: part, revisionId, ...choices, ...change } }),
  );
  return id;
}

/** A plan with a loop wherever one fits but at the last such corner, which waits. */
async function loopsOf(part: string, revisionId: string): Promise<string> {
  const params = { planId: await planOf(part, revisionId) };
  const { body } = await made(programmer.call(cornerPlanEndpoints.get, { params }));
  const fit = body.corners.filter(({ options }) => options.some((one) => one.treatment === 'loop' && one.fits));
  const overrides = Object.fromEntries(fit.map(({ id }, i) => [id, i === fit.length - 1 ? 'dwell' : 'loop']));
  return planOf(part, revisionId, { overrides });
}

const take = (planId: string, as: string, unit = 'mm', caller = programmer) =>
  caller.call(cutPathEndpoints.take, { params: { planId }, query: { as, unit } });
/** Bytes of a file; sheets, which take longest, are made once. */
const taken = async (planId: string, as: TakeAwayFormat, unit = 'mm'): Promise<Buffer> => {
  const key = `${planId} ${as} ${unit}`;
  const bytes = sheets.get(key) ?? (await made(take(planId, as, unit))).bytes;
  if (as === 'pdf') sheets.set(key, bytes);
  return bytes;
};
const sheets = new Map<string, Buffer>();
const textOf = async (planId: string, as: Exclude<TakeAwayFormat, 'pdf'>, unit = 'mm') =>
  (await taken(planId, as, unit)).toString('utf8');
/** All that stands in a PDF, by a package that reads PDFs, without its line breaks. */
async function pdfText(bytes: Uint8Array): Promise<{ text: string; pages: number }> {
  const document = await getDocumentProxy(new Uint8Array(bytes));
  const { text, totalPages } = await extractText(document, { mergePages: true });
  return { text: text.replace(/\s+/g, ' '), pages: totalPages };
}
/** Comments of a file as running text: long ones are broken into lines. */
const spoken: Readonly<Record<TakeAwayFormat, (bytes: Buffer) => Promise<string>>> = {
  dxf: async (bytes) => [...bytes.toString().matchAll(/^999\n(.*)$/gm)].map((line) => line[1]).join(' '),
  svg: async (bytes) => (/<desc>([^]*)<\/desc>/.exec(bytes.toString())?.[1] ?? '').replace(/\s+/g, ' '),
  iso: async (bytes) => [...bytes.toString().matchAll(/^\((.*)\)$/gm)].map((line) => line[1]).join(' '),
  pdf: async (bytes) => (await pdfText(bytes)).text,
};
const plain = (text: string) => text.replaceAll('’', "'");

describe('a corner plan’s cut path', () => {
  test.each([
    ['dxf', 'image/vnd.dxf', 'brucke-links-b-plan-1-inch.dxf'],
    ['svg', 'image/svg+xml', 'brucke-links-b-plan-1-mm.svg'],
    ['iso', 'text/plain; charset=us-ascii', 'brucke-links-b-plan-1-inch.nc'],
    ['pdf', 'application/pdf', 'brucke-links-b-plan-1-inch.pdf'],
  ])('as %s comes as a file to be saved, with a name that every system takes', async (as, type, name) => {
    const { headers } = await made(take(approvedPlan, as, 'inch'));
    expect(headers['content-type']).toBe(type);
    expect(headers['content-disposition']).toBe(`attachment; filename=${name}`);
    expect(headers['x-content-type-options']).toBe('nosniff');
  });

  test('has lead-ins, contours and loops on layers of their own, in the unit asked for', async () => {
    const { body: plan } = await made(programmer.call(cornerPlanEndpoints.get, { params: { planId: approvedPlan } }));
    expect(plan.totals.loops).toBeGreaterThan(0);
    for (const [unit, code] of [
      ['mm', 4],
      ['inch', 1],
    ] as const) {
      const dxf = new SecondReader().parseSync(await textOf(approvedPlan, 'dxf', unit));
      expect(dxf?.header.$INSUNITS).toBe(code);
      const layers = new Map<string, number>();
      for (const { layer } of dxf?.entities ?? []) layers.set(layer, (layers.get(layer) ?? 0) + 1);
      expect([...layers.keys()].sort()).toEqual(['contour', 'lead-in', 'loop']);
      expect(layers.get('lead-in')).toBe(plan.part.contours.length);
    }
  });

  test('is the same path as a drawing and as blocks', async () => {
    const dxf = new SecondReader().parseSync(await textOf(approvedPlan, 'dxf'));
    // a LINE has vertices, an ARC a radius and angles: the package's types name only what all have
    const entities = (dxf?.entities ?? []) as unknown as Partial<
      Record<'vertices', { x: number; y: number }[]> & Record<'radius' | 'startAngle' | 'endAngle', number>
    >[];
    const drawn = entities.reduce((sum, { vertices: [a, b] = [], radius = 0, startAngle = 0, endAngle = 0 }) => {
      if (a && b) return sum + Math.hypot(a.x - b.x, a.y - b.y);
      return sum + radius * ((endAngle - startAngle + 4 * Math.PI) % (2 * Math.PI));
    }, 0);
    let [x, y, run] = [0, 0, 0];
    for (const block of (await textOf(approvedPlan, 'iso')).split('\n')) {
      const word = (letter: string) => Number(new RegExp(`${letter}(-?[0-9.]+)`).exec(block)?.[1] ?? Number.NaN);
      if (!/^G0[0-3]/.test(block)) continue;
      const [x1, y1] = [word('X'), word('Y')];
      if (block.startsWith('G01')) run += Math.hypot(x1 - x, y1 - y);
      else if (!block.startsWith('G00')) {
        const [cx, cy] = [x + word('I'), y + word('J')];
        const turned = Math.atan2(y1 - cy, x1 - cx) - Math.atan2(y - cy, x - cx);
        const sweep = (((block.startsWith('G03') ? turned : -turned) % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI);
        run += Math.hypot(x - cx, y - cy) * sweep;
      }
      [x, y] = [x1, y1];
    }
    expect(run).toBeGreaterThan(100);
    expect(Math.abs(run - drawn)).toBeLessThan(0.01);
  });

  test.each(takeAwayFormats)('as %s says what it is of, and every caution', async (as) => {
    for (const unit of takeAwayUnits) {
      const said = await spoken[as](await taken(approvedPlan, as, unit));
      for (const caution of takeAwayCautions) expect(plain(said)).toContain(plain(caution));
      expect(said).toContain('Machine one');
      expect(said).toMatch(/[Rr]evision 1/);
      expect(said).not.toMatch(/not approved/i);
    }
  });

  test.each(takeAwayFormats)(
    'as %s says when its strategy is not approved, in the file and in its name',
    async (as) => {
      unapprovedPlan ??= await planOf(partId, (await makeSubmitted(plant, { gradeGroup: 'not approved' })).id);
      const { bytes, headers } = await made(take(unapprovedPlan, as));
      expect(await spoken[as](bytes)).toContain('NOT APPROVED: the strategy revision is in review.');
      expect(headers['content-disposition']).toContain('not-approved');
    },
  );

  test('goes round a rounded corner beside its arc, and says in each file where it is eased', async () => {
    const cornerRules = {
      ...plant.content.cornerRules,
      ease: { allowed: true, length: 0.01, feedShare: 0.5, powerShare: 0.5 },
      round: { allowed: true, radius: 0.003, tolerance: 0.005 },
    };
    const { id } = await makeApproved(plant, { gradeGroup: 'rounds and eases', cornerRules });
    const params = { planId: await planOf(partId, id) };
    const tips = (await made(programmer.call(cornerPlanEndpoints.get, { params }))).body.corners.filter(({ options }) =>
      options.some((one) => one.treatment === 'round' && one.fits),
    );
    const [first, second] = tips;
    if (!first || !second) throw new Error('the bracket has no two corners that may be rounded');
    const overrides = Object.fromEntries(tips.map((tip) => [tip.id, tip === first ? 'round' : 'leave']));
    const planId = await planOf(partId, id, { overrides: { ...overrides, [second.id]: 'ease' } });
    const { body } = await made(programmer.call(cornerPlanEndpoints.get, { params: { planId } }));
    const radius = body.corners.find((corner) => corner.id === first.id)?.round?.radius ?? Number.NaN;
    const dxf = new SecondReader().parseSync(await textOf(planId, 'dxf'));
    const radii = dxf?.entities.flatMap((entity) => ('radius' in entity ? [Number(entity.radius)] : []));
    const beside = (radius + plant.content.cut.kerfWidth / 2) * 1000;
    expect(radii?.some((one) => Math.abs(one - beside) < 1e-3)).toBe(true);
    const said = await spoken.iso(await taken(planId, 'iso'));
    expect(said).toContain(
      'One corner is eased: feed and power are lowered there in steps, told in a comment before each.',
    );
    expect(said).toMatch(/ease: feed and power 53\.\d % of the cut's until/);
    expect(await textOf(planId, 'svg')).toContain('data-feed-share="0.5');
    expect(await textOf(planId, 'dxf')).toContain("shares of the cut's own:");
    expect(await spoken.pdf(await taken(planId, 'pdf'))).toContain('ease to 50 %');
    const shown = (await made(programmer.call(cutPathEndpoints.show, { params: { planId } }))).body;
    const shares = shown.runs.flatMap(({ pieces }) =>
      pieces.flatMap((piece) => (piece.kind === 'dwell' || piece.feedShare === undefined ? [] : [piece.feedShare])),
    );
    expect(Math.min(...shares)).toBeLessThan(0.55);
    expect(shown.problems).toEqual([]);
    expect(said).not.toContain('is left out');
  });

  test('whose contour has no room for a lead-in is refused with a sentence, and nothing is saved', async () => {
    const { id } = await makeApproved(plant, { gradeGroup: 'no room' });
    const planId = await planOf(await keepRectangle(), id, { skeleton: { left: 0, right: 0, above: 0, below: 0 } });
    for (const as of takeAwayFormats) {
      const answer = await take(planId, as);
      expect(answer.status).toBe(422);
      expect(answer.problem.code).toBe('no-cut-path');
      expect(answer.problem.detail).toMatch(/^[A-Z].*(outline|plate).*\.$/);
      expect(answer.headers['content-disposition']).toBeUndefined();
      expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/);
    }
  });

  test('that runs beside the plate’s own edge is cut, and each file and the screen say so', async () => {
    const { id } = await makeApproved(plant, { gradeGroup: 'at the edge' });
    const planId = await planOf(partId, id, { skeleton: { ...room, left: 0 } });
    const why = /outline.* lies on the plate's edge at .*: its cut runs outside the plate by/;
    const { problems } = (await made(programmer.call(cutPathEndpoints.show, { params: { planId } }))).body;
    expect(problems).toEqual([expect.objectContaining({ leftOut: false, why: expect.stringMatching(why) as string })]);
    for (const as of takeAwayFormats) {
      expect((await spoken[as](await taken(planId, as))).replace(/\s+/g, ' ')).toMatch(
        /its cut runs outside the plate by/,
      );
    }
  });

  test('comes in no other format or unit', async () => {
    expect((await take(approvedPlan, 'dwg')).problem.errors).toEqual([
      { pointer: '/as', detail: 'Choose dxf, svg, iso or pdf.' },
    ]);
    expect((await take(approvedPlan, 'dxf', 'm')).problem.errors).toEqual([
      { pointer: '/unit', detail: 'Choose mm or inch.' },
    ]);
  });

  test('is shown as it is taken: run by run from its lead-in on, to an operator too while the plan is approved', async () => {
    const { body: shown } = await made(programmer.call(cutPathEndpoints.show, { params: { planId: approvedPlan } }));
    const { body: plan } = await made(programmer.call(cornerPlanEndpoints.get, { params: { planId: approvedPlan } }));
    expect(shown.runs.map(({ contourId }) => contourId).sort()).toEqual(plan.part.contours.map(({ id }) => id).sort());
    for (const { pieces } of shown.runs) expect(pieces[0]?.kind).toBe('lead-in');
    const loops = shown.runs.flatMap(({ pieces }) => pieces.filter(({ kind }) => kind === 'loop'));
    expect(loops).toHaveLength(plan.totals.loops);
    expect(shown.problems.filter(({ leftOut }) => leftOut)).toEqual([]);
    const operator = await plant.as('operator');
    expect((await operator.call(cutPathEndpoints.show, { params: { planId: approvedPlan } })).status).toBe(200);
  });

  test('is not an operator’s to take', async () => {
    expect((await take(approvedPlan, 'pdf', 'mm', await plant.as('operator'))).problem.code).toBe('not-allowed');
  });
});

describe('the sheet', () => {
  test('has a row for each corner with its treatment and temperatures, in the unit asked for', async () => {
    const { body: plan } = await made(programmer.call(cornerPlanEndpoints.get, { params: { planId: approvedPlan } }));
    const loop = plan.corners.find(({ treatment }) => treatment === 'loop');
    if (!loop) throw new Error('the plan has no loop');
    const metric = (await pdfText(await taken(approvedPlan, 'pdf'))).text;
    expect(metric).toContain('Brücke „links“ <b>');
    expect(metric).toMatch(/no\. place x, y angle treatment radius untreated returns at added time/);
    expect(metric.match(/ °C/g)?.length).toBeGreaterThanOrEqual(2 * plan.corners.length);
    expect(metric).toContain(`${Number(((loop.loop?.radius ?? 0) * 1000).toFixed(3))} mm`);
    const inch = (await pdfText(await taken(approvedPlan, 'pdf', 'inch'))).text;
    expect(inch.match(/ °F/g)?.length).toBeGreaterThanOrEqual(2 * plan.corners.length);
  });

  test('of a part without corners says so', async () => {
    const { id } = await makeApproved(plant, { gradeGroup: 'no corners' });
    const planId = await planOf(await keep('bearing-plate.dxf', 'Bearing plate'), id);
    const { text, pages } = await pdfText(await taken(planId, 'pdf'));
    expect(text).toContain('No corner here');
    expect(pages).toBe(1);
  });
});

describe('the lines around a machine’s blocks', () => {
  const params = () => ({ machineId: plant.machineId });
  const read = async () => (await made(engineer.call(blockFrameEndpoints.get, { params: params() }))).body;
  const write = async (body: object, caller = engineer) =>
    caller.call(blockFrameEndpoints.change, { params: params(), body, version: (await read()).version });

  test('are empty at first, written by an engineer, kept as they are, and noted in the record', async () => {
    expect(await read()).toMatchObject({ unit: 'mm', header: '', footer: '' });
    const body = { unit: 'mm', header: '%\nO1 (G71)\n\n  {x} <y> \\u0041 %s\n', footer: 'M30\n%' };
    const { body: written, version } = await made(write(body));
    expect(written).toEqual({ ...body, version });
    expect(await read()).toEqual(written);
    const lead = await plant.as('lead');
    const [entry] = (await made(lead.call(recordEndpoints.list))).body.items;
    expect(entry).toMatchObject({ event: 'machine.blockFrameWritten', facts: body });
    // the machine itself has moved on by one version
    const machine = await made(engineer.call(machineEndpoints.get, { params: params() }));
    expect(machine.version).toBe(version);
  });

  test('stand around the blocks of their unit, and of no other', async () => {
    await made(write({ unit: 'inch', header: 'G70 G90\r\nG17', footer: 'M30' }));
    const inch = (await textOf(approvedPlan, 'iso', 'inch')).trimEnd().split('\n');
    expect(inch.slice(0, 2)).toEqual(['G70 G90', 'G17']);
    expect(inch.at(-1)).toBe('M30');
    const mm = await textOf(approvedPlan, 'iso', 'mm');
    expect(mm).not.toMatch(/^(G70|G17|M30)/m);
    expect(await spoken.iso(Buffer.from(mm))).toContain(
      "The plant's own lines are left out: they are for inches, and these blocks are not.",
    );
  });

  test.each([
    ['a letter that is no ASCII', { header: 'G71\nMaß' }, '/header', 'Line 2 holds “ß”'],
    ['a tab', { footer: 'M30\t' }, '/footer', 'Line 1 holds a tab'],
    ['a control character', { footer: 'M30\u0000' }, '/footer', 'Line 1 holds “\u0000”'],
    ['more than fits', { header: 'x'.repeat(2001) }, '/header', 'At most 2000 characters.'],
    ['no unit', { unit: 'cm' }, '/unit', ''],
  ])('are refused with %s, at their field', async (_what, wrong, pointer, detail) => {
    const before = await read();
    const answer = await write({ unit: 'mm', header: '', footer: '', ...wrong });
    expect(answer.status).toBe(400);
    expect(answer.problem.errors?.[0]).toMatchObject({ pointer, detail: expect.stringContaining(detail) as unknown });
    expect(await read()).toEqual(before);
  });

  test('are refused by the database too when they hold more than plain lines', async () => {
    const update = (header: string) =>
      connected(server.database.ownerUrl, async (owner) => {
        await owner.query('begin');
        await owner.query("select set_config('app.plant_id', $1, true)", [plant.id]);
        return owner.query('update machines set block_header = $1 where id = $2', [header, plant.machineId]);
      });
    for (const header of ['ß', '\t', '\r\n', '\u007f', '\u2028']) {
      await expect(update(header)).rejects.toThrow('machines_block_lines');
    }
    await expect(update('\n ~ \\u0041\n')).resolves.toMatchObject({ rowCount: 1 });
  });

  test('are read by a programmer and not written by one', async () => {
    expect((await programmer.call(blockFrameEndpoints.get, { params: params() })).status).toBe(200);
    expect((await write({ unit: 'mm', header: '', footer: '' }, programmer)).problem.code).toBe('not-allowed');
  });
});
