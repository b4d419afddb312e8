import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import SecondReader from 'dxf-parser';
import { describe, expect, it } from 'vitest';
import type { DrawingReading } from '../../../strategy/path/drawing/index.ts';
import { drawingRead, unitLength } from '../../../strategy/path/drawing/index.ts';

// Real drawings by other people, which keep their own licences and therefore stand beside the project, not in it.
const folder = path.join(import.meta.dirname, '../../../../shared/drawings');
const there = existsSync(path.join(folder, 'expected.json'));

type Expected = {
  readonly id: string;
  readonly file: string;
  readonly entities?: Record<string, number>;
  readonly closedContours?: Record<string, number>;
  readonly openChains?: Record<string, number>;
  readonly boundsFileUnits?: readonly [number, number, number, number];
  readonly duplicates?: number;
  readonly zeroLength?: number;
  readonly nesting?: Record<string, number>;
};

const all: Expected[] = there
  ? // written beside the drawings by an independent reader; its shape is checked by the tests that use it
    (JSON.parse(readFileSync(path.join(folder, 'expected.json'), 'utf8')) as Expected[])
  : [];
const expected = all.filter((e) => e.file.endsWith('.dxf'));
const pictures = all.filter((e) => e.file.endsWith('.svg'));
const bytesOf = (e: Expected) => new Uint8Array(readFileSync(path.join(folder, e.file)));

/** All layers, since the independent reader does not leave out hidden ones. */
function readAll(e: Expected): DrawingReading {
  const first = drawingRead(bytesOf(e));
  if (first.kind === 'none') throw new Error(first.why);
  const all = drawingRead(bytesOf(e), { layers: first.layers.map((l) => l.name) });
  if (all.kind === 'none') throw new Error(all.why);
  return all;
}

const byId = (id: string): Expected => {
  const found = [...expected, ...pictures].find((e) => e.id === id);
  if (!found) throw new Error(`drawing ${id} is missing`);
  return found;
};

/** Pieces branch in these two, so the count of contours depends on how one chains; the tilted one holds nothing flat. */
const branching = new Set(['S18', 'S19']);
const tilted = 'S24';

const depths = (r: DrawingReading) => {
  const counts: Record<string, number> = {};
  for (const { depth } of r.contours) counts[depth] = (counts[depth] ?? 0) + 1;
  return counts;
};

describe.skipIf(!there)('a real drawing', () => {
  const flat = expected.filter((e) => e.id !== tilted);

  it.each(flat.filter((e) => e.entities).map((e) => [e.id, e] as const))(
    '%s holds the entities an independent reader counts',
    (_, e) => {
      expect(readAll(e).entityCounts).toEqual(e.entities);
    },
  );

  it.each(flat.filter((e) => e.boundsFileUnits).map((e) => [e.id, e] as const))(
    '%s has the bounds of an independent reader',
    (_, e) => {
      const r = readAll(e);
      const [x0, y0, x1, y1] = e.boundsFileUnits ?? [0, 0, 0, 0];
      const unit = unitLength[r.unit];
      const diagonal = Math.hypot(x1 - x0, y1 - y0);
      const got = [r.bounds.minX, r.bounds.minY, r.bounds.maxX, r.bounds.maxY].map((v) => v / unit);
      for (const [i, value] of [x0, y0, x1, y1].entries())
        expect(Math.abs((got[i] ?? NaN) - value)).toBeLessThan(1e-3 * diagonal);
    },
  );

  it.each(flat.filter((e) => e.closedContours && !branching.has(e.id)).map((e) => [e.id, e] as const))(
    '%s has the closed contours and open chains of an independent reader',
    (_, e) => {
      const r = readAll(e);
      expect(r.contours).toHaveLength(e.closedContours?.['1e-6d'] ?? NaN);
      expect(r.openChains).toHaveLength(e.openChains?.['1e-6d'] ?? NaN);
    },
  );

  // where the two figures contradict each other, the nesting was counted at another tolerance
  const nested = flat.filter((e) => {
    const sum = Object.values(e.nesting ?? {}).reduce((total, n) => total + n, 0);
    return !branching.has(e.id) && sum > 0 && sum === e.closedContours?.['1e-6d'];
  });
  it.each(nested.map((e) => [e.id, e] as const))('%s is nested as an independent reader finds', (_, e) => {
    expect(depths(readAll(e))).toEqual(e.nesting);
  });

  it.each(flat.filter((e) => e.duplicates !== undefined && !branching.has(e.id)).map((e) => [e.id, e] as const))(
    '%s has its duplicates and its pieces of no length dropped and listed',
    (_, e) => {
      const { repaired } = readAll(e);
      expect(repaired.filter((r) => r.what === 'duplicate dropped')).toHaveLength(e.duplicates ?? NaN);
      expect(repaired.filter((r) => r.what === 'zero-length piece dropped')).toHaveLength(e.zeroLength ?? NaN);
    },
  );

  it('of states that share their borders keeps a border that is drawn twice for the state on either side', () => {
    const states = readAll(byId('S19'));
    const of = (what: string) => states.repaired.filter((repair) => repair.what === what).length;
    const kept = of('edge drawn twice, kept for the outline on either side');
    expect(kept).toBeGreaterThan(100);
    expect(of('duplicate dropped') + of('duplicate drawn the other way dropped') + kept).toBeGreaterThan(351);
    // with each border kept once 49 lines of pieces stayed open, and 14 outlines were found
    expect(states.openChains.length).toBeLessThan(5);
    expect(depths(states)['0']).toBeGreaterThan(20);
  });

  it('that closes only with a larger tolerance says which, and then nests', () => {
    const r = drawingRead(bytesOf(byId('S12')), { unit: 'mm' });
    const question = r.kind === 'drawing' ? r.questions.find((q) => q.kind === 'gaps') : undefined;
    if (question?.kind !== 'gaps') throw new Error('the gap is asked about');
    const closed = drawingRead(bytesOf(byId('S12')), { unit: 'mm', gapTolerance: question.tolerance });
    expect(closed.kind === 'drawing' && depths(closed)).toEqual(byId('S12').nesting);
  });

  // The nesting beside S10 holds 80 contours and its count of contours 59, so both cannot be of one reading: it belongs to a tolerance of 0.01 units. The holes agree.
  it('whose nesting was counted at another tolerance than its contours agrees in its holes', () => {
    const { closedContours, nesting } = byId('S10');
    expect(Object.values(nesting ?? {}).reduce((sum, n) => sum + n, 0)).toBeGreaterThan(
      closedContours?.['1e-6d'] ?? NaN,
    );
    expect(depths(readAll(byId('S10')))['1']).toBe(nesting?.['1']);
  });

  it.each(['S10', 'S13', 'S23', 'S32'])('%s does not fall apart at a tolerance wider than its details', (id) => {
    const fine = readAll(byId(id));
    const layers = fine.layers.map((l) => l.name);
    const wide = drawingRead(bytesOf(byId(id)), { layers, gapTolerance: 0.1 * unitLength[fine.unit] });
    expect(wide.kind === 'drawing' && wide.contours.length).toBe(fine.contours.length);
  });

  it('tilted out of the plane is refused by that name', () => {
    const r = drawingRead(bytesOf(byId(tilted)));
    expect(r.kind === 'none' && r.why).toContain('30 POLYLINE tilted out of the plane');
  });

  it('in binary is its twin in text', () => {
    const [binary, text] = [readAll(byId('S34')), readAll(byId('S35'))];
    expect(binary.entityCounts).toEqual(text.entityCounts);
    expect(binary.contours.map((c) => c.contour.segments.length)).toEqual(
      text.contours.map((c) => c.contour.segments.length),
    );
  });

  it('dimensioned, with its construction on hidden layers, is the clean plate', () => {
    const [clean, dimensioned] = [drawingRead(bytesOf(byId('S30'))), drawingRead(bytesOf(byId('S31')))];
    if (clean.kind === 'none' || dimensioned.kind === 'none') throw new Error('both are drawings');
    expect(depths(dimensioned)).toEqual(depths(clean));
  });

  it('whose pieces branch says where, and whether contours cross', () => {
    expect(readAll(byId('S18')).branches.length).toBeGreaterThan(0);
    expect(readAll(byId('S20')).crossings.length).toBeGreaterThan(0);
    expect(readAll(byId('S03')).crossings).toEqual([]);
  });

  it('is counted alike by a second independent reader where that one accepts it', () => {
    let accepted = 0;
    // it takes text only
    for (const e of flat.filter(({ id }) => id !== 'S25' && id !== 'S34')) {
      const parsed = parsedByOther(readFileSync(path.join(folder, e.file), 'latin1'));
      if (!parsed) continue;
      accepted++;
      const ours = readAll(e).entityCounts;
      // that reader skips what it does not know and folds vertices into their polyline
      for (const [type, count] of Object.entries(parsed)) expect([e.id, type, ours[type]]).toEqual([e.id, type, count]);
    }
    expect(accepted).toBeGreaterThan(25);
  });
});

describe.skipIf(!there)('a real picture of lines', () => {
  it.each(pictures.map((e) => [e.id, e] as const))('%s has the size of an independent reader', (_, e) => {
    const { bounds } = readAll(e);
    const [x0, y0, x1, y1] = e.boundsFileUnits ?? [0, 0, 0, 0];
    const slack = 1e-3 * Math.hypot(x1 - x0, y1 - y0);
    expect(Math.abs((bounds.maxX - bounds.minX) * 1e3 - (x1 - x0))).toBeLessThan(slack);
    expect(Math.abs((bounds.maxY - bounds.minY) * 1e3 - (y1 - y0))).toBeLessThan(slack);
  });

  // sub-paths after chaining, as counted by the independent reader, which keeps copies
  it.each([
    ['SV01', 118],
    ['SV02', 46],
    ['SV03', 31],
    ['SV04', 45],
    ['SV05', 43],
    ['SV06', 3],
    ['SV07', 2],
  ])('%s holds %i closed contours, copies and pages included, and nothing open', (id, count) => {
    const { contours, openChains, repaired } = readAll(byId(id));
    expect([
      contours.length + repaired.filter((r) => r.what === 'duplicate dropped').length,
      openChains.length,
    ]).toEqual([count, 0]);
  });

  it.each([
    ['SV06', 2],
    ['SV07', 1],
  ])('%s is read without its page, which is said', (id, pages) => {
    const read = drawingRead(bytesOf(byId(id)));
    if (read.kind === 'none') throw new Error(read.why);
    expect(read.contours).toHaveLength(1);
    expect(read.leftOut.filter(({ what }) => what.includes('page rectangle'))).toMatchObject([{ count: pages }]);
    expect(read.layers.find(({ name }) => name === 'page rectangle')).toMatchObject({ taken: false, pieces: pages });
  });

  it('states its size, so that no unit is asked for', () => {
    for (const e of pictures) expect([e.id, readAll(e).unitAsked]).toEqual([e.id, false]);
  });
});

function parsedByOther(text: string): Record<string, number> | null {
  let entities: readonly { type: string }[] | undefined;
  try {
    entities = new SecondReader().parseSync(text)?.entities;
  } catch {
    // it refuses some files, which is why it is only a cross-check
    return null;
  }
  if (!entities) return null;
  const counts: Record<string, number> = {};
  for (const { type } of entities) counts[type] = (counts[type] ?? 0) + 1;
  return counts;
}
