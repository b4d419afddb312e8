import SecondReader from 'dxf-parser';
import * as fc from 'fast-check';
import { Window } from 'happy-dom';
import svgPath from 'svgpath';
import { describe, expect, it } from 'vitest';
import type { CutPath, CutPiece, CutRun } from '../../../strategy/path/cut-path.ts';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';
import {
  blocksText,
  cutFileUnits,
  cutLayers,
  dxfText,
  svgText,
  type CutFileUnit,
  type CutLayer,
} from '../../../strategy/path/drawing/write/index.ts';
import type { Point, Segment } from '../../../strategy/path/index.ts';
import {
  arcOf,
  circleOf,
  contourArea,
  lineBetween,
  pointAdd,
  pointDistance,
  segmentEnd,
  segmentFromBulge,
  segmentLength,
  segmentPointDistance,
  segmentPointAt,
  segmentStart,
} from '../../../strategy/path/index.ts';
import { runs } from '../../support/runs.ts';

/** What is read back lies within this of what was written, m. */
const micrometre = 1e-6;
const units = ['mm', 'inch'] as const satisfies readonly CutFileUnit[];
const notes = ['Check this file.', 'Not approved: revision 3 is in review.'];
const noFrame = { header: '', footer: '' };
const fileOf = (path: CutPath, unit: CutFileUnit = 'mm') => ({ path, unit, title: 'Bracket (left)', notes });

// Cut paths as a plate may hold them: each piece goes on where the one before ended.

const near = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true, noDefaultInfinity: true });
const place = fc.record({ x: near(-5, 5), y: near(-5, 5) });
/** From a tenth of a micrometre to a metre, small ones as often as large ones. */
const reach = near(-7, 0).map((power) => 10 ** power);
const turn = near(-Math.PI, Math.PI);

type Step = (from: Point) => Segment;
const lineStep: fc.Arbitrary<Step> = fc.tuple(reach, turn).map(
  ([length, angle]) =>
    (from) =>
      lineBetween(from, pointAdd(from, polar(length, angle))),
);
const bulgeStep: fc.Arbitrary<Step> = fc.tuple(reach, turn, near(-3, 3)).map(
  ([length, angle, bulge]) =>
    (from) =>
      segmentFromBulge(from, pointAdd(from, polar(length, angle)), bulge),
);
/** Of any sweep, up to full circles and just short of them. */
const arcStep: fc.Arbitrary<Step> = fc
  .tuple(
    reach,
    turn,
    fc.oneof(near(1e-6, 2 * Math.PI), fc.constantFrom(2 * Math.PI, Math.PI, 2 * Math.PI - 1e-7, 2 * Math.PI - 1e-4)),
    fc.boolean(),
  )
  .map(([radius, angle, sweep, left]) => (from) => {
    const centre = pointAdd(from, polar(radius, angle));
    return arcOf(centre, radius, angle + Math.PI, left ? sweep : -sweep);
  });
const step = fc.oneof(lineStep, bulgeStep, arcStep);
const shareOf = near(0.05, 1);
const piece = fc.oneof(
  fc.record({
    kind: fc.constantFrom(...cutLayers),
    steps: fc.array(step, { minLength: 1, maxLength: 5 }),
    ease: fc.option(fc.record({ feedShare: shareOf, powerShare: shareOf }), { nil: {} }),
  }),
  fc.record({ kind: fc.constant('dwell' as const), duration: near(0.1, 12) }),
);
const cutPath: fc.Arbitrary<CutPath> = fc
  .array(fc.record({ pierce: place, pieces: fc.array(piece, { minLength: 1, maxLength: 6 }) }), {
    minLength: 1,
    maxLength: 4,
  })
  .map((given) => ({
    runs: given.map(({ pierce, pieces }, i): CutRun => {
      let at = pierce;
      const joined = pieces.map((one): CutPiece => {
        if (one.kind === 'dwell') return { kind: 'dwell', at, duration: one.duration };
        const segments = one.steps.map((next) => {
          const segment = next(at);
          at = segmentEnd(segment);
          return segment;
        });
        return { kind: one.kind, segments, ...(one.kind === 'contour' ? one.ease : {}) };
      });
      return { contourId: String(i), name: `hole ${i} (bracket)`, pierce, pieces: joined };
    }),
  }));

const polar = (length: number, angle: number): Point => ({ x: length * Math.cos(angle), y: length * Math.sin(angle) });
const segmentsOf = (path: CutPath, layer: CutLayer): Segment[] =>
  path.runs.flatMap(({ pieces }) => pieces.flatMap((one) => (one.kind === layer ? [...one.segments] : [])));

/** Furthest that any place of `a` is from the nearest of `b`, m, by places an eighth of a segment apart. */
function furthest(a: readonly Segment[], b: readonly Segment[]): number {
  let worst = 0;
  for (const segment of a) {
    for (let i = 0; i <= 8; i++) {
      const from = segmentPointAt(segment, i / 8);
      worst = Math.max(worst, Math.min(...b.map((other) => segmentPointDistance(other, from))));
    }
  }
  return worst;
}

/** The two are the same lines and arcs, whatever their order and sense. Pieces too short to be written need not be there. */
function expectSame(read: readonly Segment[], written: readonly Segment[]): void {
  const worth = written.filter((one) => segmentLength(one) > 2 * micrometre);
  expect(furthest(worth, read)).toBeLessThan(micrometre);
  expect(furthest(read, written)).toBeLessThan(micrometre);
  const lengths = [read, written].map((all) => all.reduce((sum, one) => sum + segmentLength(one), 0));
  expect(Math.abs((lengths[0] ?? 0) - (lengths[1] ?? 0))).toBeLessThan(4 * micrometre * (1 + written.length));
}

describe('the DXF of a cut path', () => {
  /** By the package the project's own reader is checked against. */
  function secondRead(text: string) {
    const dxf = new SecondReader().parseSync(text);
    if (!dxf) throw new Error('the second reader gave up');
    const scale = dxf.header.$INSUNITS === 4 ? 1000 : dxf.header.$INSUNITS === 1 ? 1 / 0.0254 : Number.NaN;
    const segments = new Map<string, Segment[]>(cutLayers.map((layer) => [layer, []]));
    const metres = ({ x, y }: Point) => ({ x: x / scale, y: y / scale });
    for (const entity of dxf.entities) {
      if (entity.type === 'LINE') {
        // the package's types say only what all entities have; a LINE has these
        const [a, b] = (entity as unknown as { vertices: Point[] }).vertices;
        if (a && b) segments.get(entity.layer)?.push(lineBetween(metres(a), metres(b)));
      } else if (entity.type === 'ARC') {
        // likewise an ARC; its angles come in rad
        const arc = entity as unknown as { center: Point; radius: number; startAngle: number; endAngle: number };
        const sweep = (arc.endAngle - arc.startAngle + 4 * Math.PI) % (2 * Math.PI);
        segments.get(entity.layer)?.push(arcOf(metres(arc.center), arc.radius / scale, arc.startAngle, sweep));
      } else throw new Error(`a ${entity.type} is neither a line nor an arc`);
    }
    return { dxf, segments };
  }

  it.each(units)('in %s is read back by a second reader on the same layers within a micrometre', (unit) => {
    fc.assert(
      fc.property(cutPath, (path) => {
        const { segments } = secondRead(dxfText(fileOf(path, unit)));
        for (const layer of cutLayers) expectSame(segments.get(layer) ?? [], segmentsOf(path, layer));
      }),
      { numRuns: runs(60, 5000) },
    );
  });

  it.each(units)('in %s is read back by our own reader as the contour that was written', (unit) => {
    const segments = ring(0.2, 0.1);
    const path = {
      runs: [
        {
          contourId: '1',
          name: 'outline',
          pierce: { x: 0.5, y: 0.5 },
          pieces: [{ kind: 'contour' as const, segments }],
        },
      ],
    };
    const reading = drawingRead(new TextEncoder().encode(dxfText(fileOf(path, unit))));
    if (reading.kind === 'none') throw new Error(reading.why);
    expect(reading.unit).toBe(unit);
    expect(reading.repaired).toEqual([]);
    expect(reading.contours.map(({ layer }) => layer)).toEqual(['contour']);
    const read = reading.contours[0]?.contour ?? { segments: [] };
    expectSame(read.segments, segments);
    expect(contourArea(read)).toBeCloseTo(contourArea({ segments }), 7);
  });

  it('has lines and arcs alone, on three layers of one colour', () => {
    const path = examplePath();
    const { dxf, segments } = secondRead(dxfText(fileOf(path)));
    const layers = Object.values(dxf.tables.layer.layers).filter(({ name }) => name !== '0');
    expect(layers.map(({ name }) => name)).toEqual(['contour', 'lead-in', 'loop']);
    expect(new Set(layers.map(({ color }) => color)).size).toBe(1);
    for (const layer of cutLayers) expect(segments.get(layer)?.length).toBeGreaterThan(0);
  });

  it('begins with its title and notes as comments', () => {
    const lines = dxfText(fileOf(examplePath())).split('\n');
    expect(lines.slice(0, 6)).toEqual(['999', 'Bracket (left)', '999', notes[0], '999', notes[1]]);
    expect(lines.slice(6, 8)).toEqual(['0', 'SECTION']);
  });
});

describe('the SVG of a cut path', () => {
  /** By an XML parser and a reader of path data that the writer does not know; arcs after SVG 2, appendix B.2.4. */
  function secondRead(text: string) {
    const window = new Window();
    const picture = new window.DOMParser().parseFromString(text, 'image/svg+xml').documentElement;
    const segments = new Map<string, Segment[]>();
    for (const group of picture.querySelectorAll('g')) {
      const found: Segment[] = [];
      for (const one of group.querySelectorAll('path')) found.push(...pathSegments(one.getAttribute('d') ?? ''));
      segments.set(group.id, found);
    }
    const attribute = (name: string) => picture.getAttribute(name) ?? '';
    return {
      width: attribute('width'),
      height: attribute('height'),
      viewBox: attribute('viewBox').split(' ').map(Number),
      desc: picture.querySelector('desc')?.textContent ?? '',
      segments,
    };
  }

  function pathSegments(data: string): Segment[] {
    const read = svgPath(data);
    const found: Segment[] = [];
    // y runs down in the picture
    const at = (x: unknown, y: unknown): Point => ({ x: Number(x) / 1000, y: -Number(y) / 1000 });
    read.abs().iterate((command, _index, x, y) => {
      const from = at(x, y);
      if (command[0] === 'L') found.push(lineBetween(from, at(command[1], command[2])));
      else if (command[0] === 'A') {
        const arc = arcFromEnds(from, at(command[6], command[7]), Number(command[1]) / 1000, {
          large: Number(command[4]) === 1,
          left: Number(command[5]) === 0,
        });
        if (arc) found.push(arc);
      } else if (command[0] !== 'M') throw new Error(`${command[0]} is no line, arc or move`);
    });
    return found;
  }

  function arcFromEnds(
    a: Point,
    b: Point,
    given: number,
    { large, left }: { large: boolean; left: boolean },
  ): Segment | null {
    const chord = pointDistance(a, b);
    // the standard leaves an arc out whose ends are the same, and draws one without radius as a line
    if (chord === 0) return null;
    if (given === 0) return lineBetween(a, b);
    // one too small to reach is enlarged until it does
    const radius = Math.max(given, chord / 2);
    const height = Math.sqrt(Math.max(0, radius * radius - (chord * chord) / 4)) * (large === left ? -1 : 1);
    const centre = {
      x: (a.x + b.x) / 2 - (height * (b.y - a.y)) / chord,
      y: (a.y + b.y) / 2 + (height * (b.x - a.x)) / chord,
    };
    const half = Math.asin(Math.min(1, chord / 2 / radius));
    const sweep = large ? 2 * Math.PI - 2 * half : 2 * half;
    return arcOf(centre, radius, Math.atan2(a.y - centre.y, a.x - centre.x), left ? sweep : -sweep);
  }

  it('is read back by a second reader in the same groups within a micrometre', () => {
    fc.assert(
      fc.property(cutPath, (path) => {
        const { segments } = secondRead(svgText(fileOf(path)));
        expect([...segments.keys()]).toEqual([...cutLayers]);
        for (const layer of cutLayers) expectSame(segments.get(layer) ?? [], segmentsOf(path, layer));
      }),
      { numRuns: runs(40, 3000) },
    );
  });

  it('has its real size and holds the whole path', () => {
    const segments = ring(0.2, 0.1);
    const pieces = [{ kind: 'contour' as const, segments }];
    const { width, height, viewBox } = secondRead(
      svgText(fileOf({ runs: [{ contourId: '1', name: 'outline', pierce: { x: 0, y: 0 }, pieces }] })),
    );
    // the ring is 200 by 100 mm, with 1 mm of paper around it
    expect([width, height]).toEqual(['202mm', '102mm']);
    expect(viewBox).toEqual([-1, -101, 202, 102]);
  });

  it('keeps its notes in the description and nothing but the path in the picture, whatever a name holds', () => {
    const text = svgText({ ...fileOf(examplePath()), title: '</title><script>&"\u0007', notes: ['<g id="loop">'] });
    const window = new Window();
    const picture = new window.DOMParser().parseFromString(text, 'image/svg+xml').documentElement;
    expect(picture.querySelector('title')?.textContent).toBe('</title><script>&" ');
    expect(picture.querySelector('desc')?.textContent.trim()).toBe('<g id="loop">');
    expect(picture.querySelectorAll('g').length).toBe(3);
    expect(picture.querySelectorAll('script, text').length).toBe(0);
  });

  it('of nothing is an empty picture', () => {
    expect(secondRead(svgText(fileOf({ runs: [] }))).viewBox).toEqual([-1, -1, 2, 2]);
  });
});

describe('the blocks of a cut path', () => {
  type Move = { readonly layer: string; readonly rapid: boolean; readonly segment: Segment };
  type Ran = { readonly moves: Move[]; readonly dwells: { readonly at: Point; readonly seconds: number }[] };

  /** A small machine: it knows G00 to G04 and comments, and stops at anything else. */
  function run(text: string, unit: CutFileUnit): Ran {
    const scale = cutFileUnits[unit].scale;
    const moves: Move[] = [];
    const dwells: { at: Point; seconds: number }[] = [];
    let at: Point | null = null;
    let layer = '';
    for (const line of text.trimEnd().split('\n')) {
      const comment = /^\(([^()]*)\)$/.exec(line);
      if (comment) {
        layer = cutLayers.find((name) => name === comment[1]) ?? layer;
        continue;
      }
      const block = /^G0([0-4])((?: [XYIJF]-?\d+\.\d+)+)$/.exec(line);
      if (!block) throw new Error(`this machine does not know the block ${line}`);
      const words = new Map(
        [...(block[2] ?? '').matchAll(/([XYIJF])(\S+)/g)].map((word) => [word[1], Number(word[2])]),
      );
      const has = (letters: string) => expect([...words.keys()].join('')).toBe(letters);
      if (block[1] === '4') {
        has('F');
        if (at) dwells.push({ at, seconds: words.get('F') ?? Number.NaN });
        continue;
      }
      const to: Point = { x: (words.get('X') ?? Number.NaN) / scale, y: (words.get('Y') ?? Number.NaN) / scale };
      const from: Point = at ?? to;
      at = to;
      if (block[1] === '0' || block[1] === '1') {
        has('XY');
        moves.push({ layer, rapid: block[1] === '0', segment: lineBetween(from, to) });
        continue;
      }
      has('XYIJ');
      const centre: Point = {
        x: from.x + (words.get('I') ?? Number.NaN) / scale,
        y: from.y + (words.get('J') ?? Number.NaN) / scale,
      };
      const [r0, r1] = [pointDistance(centre, from), pointDistance(centre, to)];
      expect(Math.abs(r0 - r1)).toBeLessThan(micrometre);
      const a0 = Math.atan2(from.y - centre.y, from.x - centre.x);
      const a1 = Math.atan2(to.y - centre.y, to.x - centre.x);
      const full = 2 * Math.PI;
      const left = (((a1 - a0) % full) + full) % full;
      const sweep = block[1] === '3' ? left || full : left - full;
      moves.push({ layer, rapid: false, segment: arcOf(centre, (r0 + r1) / 2, a0, sweep) });
    }
    return { moves, dwells };
  }

  it.each(units)(
    'in %s lead a second machine along the same path, in the same order and sense, within a micrometre',
    (unit) => {
      fc.assert(
        fc.property(cutPath, (path) => {
          const { moves, dwells } = run(blocksText(fileOf(path, unit), noFrame), unit);
          const cut = moves.filter(({ rapid }) => !rapid);
          for (const layer of cutLayers) {
            expectSame(
              cut.filter((move) => move.layer === layer).map(({ segment }) => segment),
              segmentsOf(path, layer),
            );
          }
          expect(moves.filter(({ rapid }) => rapid).length).toBe(path.runs.length);
          const pauses = path.runs.flatMap(({ pieces }) =>
            pieces.flatMap((one) => (one.kind === 'dwell' ? [one] : [])),
          );
          expect(dwells.length).toBe(pauses.length);
          pauses.forEach(({ at, duration }, i) => {
            expect(pointDistance(dwells[i]?.at ?? { x: 9, y: 9 }, at)).toBeLessThan(micrometre);
            expect(dwells[i]?.seconds).toBeCloseTo(duration, 2);
          });
          expectSameCourse(moves, path);
        }),
        { numRuns: runs(60, 5000) },
      );
    },
  );

  /** Place and direction at the same share of the whole way, run by run. */
  function expectSameCourse(moves: readonly Move[], path: CutPath): void {
    const starts = moves.flatMap(({ rapid }, i) => (rapid ? [i] : []));
    path.runs.forEach(({ pierce, pieces }, i) => {
      const of = moves.slice((starts[i] ?? 0) + 1, starts[i + 1]).map(({ segment }) => segment);
      const written = pieces.flatMap((one) => (one.kind === 'dwell' ? [] : [...one.segments]));
      const rapid = moves[starts[i] ?? 0]?.segment;
      expect(pointDistance(rapid ? segmentEnd(rapid) : { x: 9, y: 9 }, pierce)).toBeLessThan(micrometre);
      const total = (all: readonly Segment[]) => all.reduce((sum, one) => sum + segmentLength(one), 0);
      const [lengthRead, lengthWritten] = [total(of), total(written)];
      for (let share = 0; share <= 1; share += 1 / 16) {
        const a = pointAlong(of, share * lengthRead) ?? pierce;
        const b = pointAlong(written, share * lengthWritten) ?? pierce;
        // each piece may be a fraction of a micrometre longer or shorter as written, and that adds up along the way
        expect(pointDistance(a, b)).toBeLessThan(micrometre * (1 + written.length));
      }
    });
  }

  function pointAlong(segments: readonly Segment[], way: number): Point | null {
    let left = way;
    for (const segment of segments) {
      const length = segmentLength(segment);
      if (left <= length) return length === 0 ? segmentStart(segment) : segmentPointAt(segment, left / length);
      left -= length;
    }
    const last = segments.at(-1);
    return last ? segmentEnd(last) : null;
  }

  it('hold no word but G00 to G04, positions, arc centres and the dwell, and comments', () => {
    for (const unit of units) {
      const bare = blocksText(fileOf(examplePath(), unit), noFrame)
        .replace(/\([^()\n]*\)/g, '')
        .trim();
      expect([...new Set(bare.match(/[A-Z]/g))].sort()).toEqual(['F', 'G', 'I', 'J', 'X', 'Y']);
      expect([...new Set(bare.match(/G\d+/g))].sort()).toEqual(['G00', 'G01', 'G02', 'G03', 'G04']);
    }
  });

  it('say a run as a person would, with what is left to the plant’s own postprocessing', () => {
    const corner = { x: 0.01, y: 0 };
    const path: CutPath = {
      runs: [
        {
          contourId: '2',
          name: 'hole 3 of “Öse” (links)',
          pierce: { x: 0, y: 0 },
          pieces: [
            { kind: 'lead-in', segments: [lineBetween({ x: 0, y: 0 }, corner)] },
            { kind: 'dwell', at: corner, duration: 2.5 },
            { kind: 'contour', segments: [arcOf({ x: 0, y: 0 }, 0.01, 0, 2 * Math.PI)] },
            { kind: 'loop', segments: [arcOf({ x: 0.02, y: 0 }, 0.01, Math.PI, -Math.PI)] },
          ],
        },
      ],
    };
    const lines = blocksText({ ...fileOf(path), title: 'Lug', notes: [] }, noFrame)
      .trimEnd()
      .split('\n');
    expect(lines.slice(lines.indexOf('(1 of 1: hole 3 of "Ose" [links])'))).toEqual([
      '(1 of 1: hole 3 of "Ose" [links])',
      'G00 X0.0 Y0.0',
      "(pierce: by the plant's own postprocessing)",
      '(lead-in)',
      'G01 X10.0 Y0.0',
      "(dwell 2.5 s, beam off: by the plant's own postprocessing)",
      'G04 F2.5',
      '(contour)',
      'G03 X-10.0 Y0.0 I-10.0 J0.0',
      'G03 X10.0 Y0.0 I10.0 J0.0',
      '(loop)',
      'G02 X30.0 Y0.0 I10.0 J0.0',
      "(end of this cut, beam off: by the plant's own postprocessing)",
    ]);
  });

  it('stand between the plant’s own lines, which stay as they are', () => {
    const header = '%\nO1234 (G71 G90)\n  N10 M99\n';
    const lines = blocksText(fileOf(examplePath()), { header, footer: 'M30\n%' }).split('\n');
    expect(lines.slice(0, 4)).toEqual(['%', 'O1234 (G71 G90)', '  N10 M99', '(Bracket [left])']);
    expect(lines.slice(-3)).toEqual(['M30', '%', '']);
  });

  it('are not made of a path with a gap in it', () => {
    const path: CutPath = {
      runs: [
        {
          contourId: '1',
          name: 'outline',
          pierce: { x: 0, y: 0 },
          pieces: [{ kind: 'contour', segments: [lineBetween({ x: 0.001, y: 0 }, { x: 1, y: 0 })] }],
        },
      ],
    };
    expect(() => blocksText(fileOf(path), noFrame)).toThrow('pieces of outline are 0.001 m apart');
  });

  it('write an arc too short for its ends to be told apart as no circle', () => {
    // half a tenth of a micrometre of a circle of 20 mm
    const tiny = arcOf({ x: 0, y: 0 }, 0.02, 0.3, 2.5e-6);
    const path: CutPath = {
      runs: [
        {
          contourId: '1',
          name: 'outline',
          pierce: segmentStart(tiny),
          pieces: [{ kind: 'contour', segments: [tiny] }],
        },
      ],
    };
    for (const unit of units) {
      expect(blocksText(fileOf(path, unit), noFrame)).not.toMatch(/^G0[23]/m);
      for (const { segment } of run(blocksText(fileOf(path, unit), noFrame), unit).moves) {
        expect(segmentLength(segment)).toBeLessThan(2e-7);
      }
    }
  });
});

/** A closed outline of lines with one rounded corner, w by h. */
function ring(w: number, h: number): Segment[] {
  const r = 0.02;
  return [
    lineBetween({ x: 0, y: 0 }, { x: w, y: 0 }),
    lineBetween({ x: w, y: 0 }, { x: w, y: h - r }),
    arcOf({ x: w - r, y: h - r }, r, 0, Math.PI / 2),
    lineBetween({ x: w - r, y: h }, { x: 0, y: h }),
    lineBetween({ x: 0, y: h }, { x: 0, y: 0 }),
  ];
}

/** A hole with a lead-in and an outline with a loop and a dwell. */
function examplePath(): CutPath {
  const outline = ring(0.2, 0.1);
  const loop = arcOf({ x: 0.2, y: -0.005 }, 0.005, Math.PI / 2, -1.5 * Math.PI);
  const [first, ...rest] = outline;
  if (!first) throw new Error('the ring is empty');
  const hole = circleOf({ x: 0.1, y: 0.05 }, 0.01);
  const back = lineBetween(segmentEnd(loop), segmentEnd(first));
  return {
    runs: [
      {
        contourId: '2',
        name: 'hole',
        pierce: { x: 0.1, y: 0.05 },
        pieces: [
          { kind: 'lead-in', segments: [lineBetween({ x: 0.1, y: 0.05 }, segmentStart(hole))] },
          { kind: 'contour', segments: [hole] },
        ],
      },
      {
        contourId: '1',
        name: 'outline',
        pierce: { x: 0, y: -0.01 },
        pieces: [
          { kind: 'lead-in', segments: [lineBetween({ x: 0, y: -0.01 }, { x: 0, y: 0 })] },
          { kind: 'contour', segments: [first] },
          { kind: 'loop', segments: [loop, back] },
          { kind: 'contour', segments: rest.slice(0, 2) },
          { kind: 'dwell', at: { x: 0.18, y: 0.1 }, duration: 2 },
          { kind: 'contour', segments: rest.slice(2) },
        ],
      },
    ],
  };
}

describe('a stretch that is eased', () => {
  const places = [0, 0.01, 0.015, 0.02, 0.03].map((x) => ({ x, y: 0 }));
  const along = (i: number) => [lineBetween(places[i] ?? { x: 0, y: 0 }, places[i + 1] ?? { x: 0, y: 0 })];
  const path: CutPath = {
    runs: [
      {
        contourId: '1',
        name: 'outline',
        pierce: { x: 0, y: 0 },
        pieces: [
          { kind: 'contour', segments: along(0) },
          { kind: 'contour', segments: along(1), feedShare: 0.7, powerShare: 0.7 },
          { kind: 'contour', segments: along(2), feedShare: 0.4125, powerShare: 0.55 },
          { kind: 'contour', segments: along(3) },
        ],
      },
    ],
  };

  it('is said in comments of the blocks, before each step and where it ends', () => {
    const lines = blocksText(fileOf(path), noFrame).trimEnd().split('\n');
    expect(lines.slice(lines.indexOf('(contour)'), -1)).toEqual([
      '(contour)',
      'G01 X10.0 Y0.0',
      '(contour)',
      "(ease: feed and power 70 % of the cut's until the next comment)",
      'G01 X15.0 Y0.0',
      '(contour)',
      "(ease: feed 41.3 % and power 55 % of the cut's until the next comment)",
      'G01 X20.0 Y0.0',
      '(contour)',
      '(ease ends: feed and power of the cut again)',
      'G01 X30.0 Y0.0',
    ]);
  });

  it('is told by each path of the picture', () => {
    const ofPath = [...svgText(fileOf(path)).matchAll(/<path d="[^"]*"(.*)\/>/g)].map(([, rest]) => rest);
    expect(ofPath).toEqual([
      '',
      ' data-feed-share="0.7" data-power-share="0.7"',
      ' data-feed-share="0.4125" data-power-share="0.55"',
      '',
    ]);
  });

  it('is listed in comments of the drawing, with the places where the steps end', () => {
    const lines = dxfText(fileOf(path)).split('\n');
    const comments = lines.filter((_, i) => lines[i - 1] === '999').join(' ');
    expect(comments).toContain(
      "Ease of outline from 10, 0, shares of the cut's own: feed and power 70 % to 15, 0; feed 41.3 % and power 55 % to 20, 0.",
    );
  });
});
