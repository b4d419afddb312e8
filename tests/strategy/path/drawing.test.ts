import { readFileSync } from 'node:fs';
import path from 'node:path';
import SecondReader from 'dxf-parser';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { DrawingAnswers, DrawingReading } from '../../../strategy/path/drawing/index.ts';
import { drawingLimits, drawingRead } from '../../../strategy/path/drawing/index.ts';
import {
  contourArea,
  contourBox,
  contourCorners,
  contourLength,
  pointDistance,
  segmentEnd,
  segmentStart,
} from '../../../strategy/path/index.ts';

const folder = path.join(import.meta.dirname, '../../support/drawings');
const bytesOf = (name: string) => new Uint8Array(readFileSync(path.join(folder, name)));
const textBytes = (text: string) => new TextEncoder().encode(text);

function reading(name: string, answers?: DrawingAnswers): DrawingReading {
  const result = drawingRead(bytesOf(name), answers);
  if (result.kind === 'none') throw new Error(result.why);
  return result;
}
function refusal(name: string, answers?: DrawingAnswers): string {
  const result = drawingRead(bytesOf(name), answers);
  if (result.kind === 'drawing') throw new Error(`${name} was read`);
  return result.why;
}
/** The refusal of bytes, or what is asked about them. */
function said(bytes: Uint8Array): string {
  const result = drawingRead(bytes);
  return result.kind === 'none' ? result.why : result.questions.map((q) => q.why).join(' ');
}
const roles = (r: DrawingReading) => r.contours.map((c) => c.role);
const millimetres = (r: DrawingReading) =>
  [r.bounds.minX, r.bounds.minY, r.bounds.maxX, r.bounds.maxY].map((v) => Math.round(v * 1e6) / 1e3 + 0);

describe('the bearing plate', () => {
  const plate = reading('bearing-plate.dxf');

  it('has an outline with rounded corners, four bolt holes and a slot, in metres', () => {
    expect(roles(plate)).toEqual(['outer', 'hole', 'hole', 'hole', 'hole', 'hole']);
    expect(plate.contours.map((c) => c.parent)).toEqual([null, '1', '1', '1', '1', '1']);
    expect(millimetres(plate)).toEqual([0, 0, 300, 200]);
    const [outline, hole] = plate.contours;
    expect(contourArea(outline?.contour ?? { segments: [] })).toBeCloseTo(0.3 * 0.2 - (4 - Math.PI) * 0.02 ** 2, 12);
    expect(contourArea(hole?.contour ?? { segments: [] })).toBeCloseTo(-Math.PI * 0.011 ** 2, 12);
    // arcs and lines of the slot came in any order and sense
    expect(contourArea(plate.contours[5]?.contour ?? { segments: [] })).toBeCloseTo(
      -(0.04 * 0.02 + Math.PI * 0.01 ** 2),
      12,
    );
  });

  it('has no corners, since every change of direction is rounded', () => {
    for (const { contour } of plate.contours) expect(contourCorners(contour)).toEqual([]);
  });

  it('says what was left out, asks nothing and repairs nothing', () => {
    expect(plate.leftOut).toMatchObject([
      { what: 'TEXT', count: 1 },
      { what: 'DIMENSION', count: 1 },
    ]);
    expect(plate.questions).toEqual([]);
    expect(plate.repaired).toEqual([]);
    expect([plate.unit, plate.unitAsked, plate.deviation]).toEqual(['mm', false, 0]);
  });

  it('drawn in inches is the same part', () => {
    const inch = reading('bearing-plate-inch.dxf');
    expect([inch.unit, inch.unitAsked]).toEqual(['inch', false]);
    expect(millimetres(inch)).toEqual([0, 0, 300, 200]);
    inch.contours.forEach((c, i) => {
      expect(contourLength(c.contour)).toBeCloseTo(contourLength(plate.contours[i]?.contour ?? { segments: [] }), 9);
    });
  });

  it('without a unit is read in mm for the time being, and the question shows both sizes', () => {
    const unitless = reading('bearing-plate-unitless.dxf');
    expect([unitless.unit, unitless.unitAsked]).toEqual(['mm', true]);
    const question = unitless.questions.find((q) => q.kind === 'unit');
    if (question?.kind !== 'unit') throw new Error('the unit is asked for');
    expect(question.why).toContain('does not state its unit');
    expect(question.readings.map(({ unit }) => unit)).toEqual(['mm', 'inch']);
    expect(question.readings[0]?.width).toBeCloseTo(0.3, 12);
    expect(question.readings[1]?.height).toBeCloseTo(0.2 * 25.4, 12);
    const answered = reading('bearing-plate-unitless.dxf', { unit: 'cm' });
    expect(answered.unitAsked).toBe(false);
    expect(millimetres(answered)).toEqual([0, 0, 3000, 2000]);
  });

  it('that states inches and calls itself metric is asked about', () => {
    expect(said(bytesOf('bearing-plate-inch-but-metric.dxf'))).toContain('states inch but calls itself metric');
  });

  it('far too small or far too large is asked about', () => {
    const asMicrometres = readFileSync(path.join(folder, 'bearing-plate.dxf'), 'utf8').replace(
      /(\$INSUNITS\n\s*70\n)4/,
      '$113',
    );
    expect(drawingRead(textBytes(asMicrometres))).toMatchObject({ unit: 'µm', unitAsked: true });
    expect(said(textBytes(asMicrometres))).toContain('only 0.3 mm');
    const asMetres = asMicrometres.replace(/(\$INSUNITS\n\s*70\n)13/, '$16');
    expect(said(textBytes(asMetres))).toContain('is 300 m');
  });

  it('as a binary file is the same to the last bit', () => {
    expect(reading('bearing-plate-binary.dxf')).toEqual(plate);
  });
});

describe('the lifting lug', () => {
  const lug = reading('lifting-lug.dxf');

  it('has two feet of 45° and a head that runs into its sides smoothly', () => {
    const outline = lug.contours.find((c) => c.role === 'outer');
    if (!outline) throw new Error('an outline');
    const degrees = contourCorners(outline.contour).map((c) => Math.round((c.angle * 180) / Math.PI));
    expect(degrees.filter((d) => d < 180)).toEqual([45, 45]);
    expect(degrees.filter((d) => d > 180)).toHaveLength(2);
  });

  it('is the same with any line ends, order of codes, and without an end mark', () => {
    const same = (name: string) => {
      const other = reading(name, { unit: 'mm' });
      expect(other.contours.map((c) => c.contour)).toEqual(lug.contours.map((c) => c.contour));
      return other;
    };
    same('lifting-lug-crlf.dxf');
    same('lifting-lug-cr.dxf');
    same('lifting-lug-odd-order.dxf');
    expect(same('lifting-lug-no-end.dxf').leftOut).toMatchObject([
      { what: 'end of the file (it stops before its EOF mark)', count: 1 },
    ]);
  });

  it('keeps names in UTF-8, in windows-1252 and in escapes', () => {
    const named = (bytes: Uint8Array) => {
      const r = drawingRead(bytes);
      return r.kind === 'drawing' ? r.layers.map((l) => l.name) : [r.why];
    };
    const text = readFileSync(path.join(folder, 'lifting-lug.dxf'), 'utf8').replaceAll('CUT', 'Größe €');
    expect(named(textBytes(text))).toEqual(['Größe €']);
    const windows = Uint8Array.from(text, (c) => (c === '€' ? 0x80 : c.charCodeAt(0)));
    expect(named(windows)).toEqual(['Größe €']);
    expect(named(textBytes(text.replaceAll('Größe €', 'Gr\\U+00F6\\U+00DFe')))).toEqual(['Größe']);
  });
});

describe('the bracket', () => {
  it('has a window into which the part pokes with a tip of 90°', () => {
    const bracket = reading('bracket.dxf');
    expect(roles(bracket)).toEqual(['outer', 'hole']);
    const window = bracket.contours[1];
    const tips = contourCorners(window?.contour ?? { segments: [] }).filter((c) => c.convex);
    expect(tips.map((c) => Math.round((c.angle * 180) / Math.PI))).toEqual([90]);
  });

  it('with a gap stays open, shows where, and closes with the tolerance it names', () => {
    const open = reading('bracket-gap.dxf');
    expect(roles(open)).toEqual(['outer']);
    expect(open.openChains).toHaveLength(1);
    const question = open.questions.find((q) => q.kind === 'gaps');
    if (question?.kind !== 'gaps') throw new Error('the gap is asked about');
    expect(question.gaps).toHaveLength(1);
    expect(question.gaps[0]?.size).toBeCloseTo(5e-5, 12);
    expect(question.gaps[0]?.at.x).toBeCloseTo(2.5e-5, 12);
    const closed = reading('bracket-gap.dxf', { gapTolerance: question.tolerance });
    expect(roles(closed)).toEqual(['outer', 'hole']);
    expect(closed.gapTolerance).toBe(question.tolerance);
    expect(closed.repaired.map((r) => r.what)).toEqual(['gap closed']);
    expect(closed.repaired[0]?.size).toBeCloseTo(5e-5, 12);
  });

  it('with nothing else closed is asked about, not refused', () => {
    const open = reading('bracket-not-closed.dxf');
    expect(open.contours).toEqual([]);
    const question = open.questions.find((q) => q.kind === 'gaps');
    if (question?.kind !== 'gaps') throw new Error('the gap is asked about');
    expect(question.why).toBe('One contour stays open by a gap of 0.05 mm. Should gaps up to that be closed?');
    const closed = reading('bracket-not-closed.dxf', { gapTolerance: question.tolerance });
    expect(closed.contours).toHaveLength(1);
    expect(closed.questions).toEqual([]);
  });

  it('drawn over itself loses its duplicates and its piece of no length, and says so', () => {
    const bracket = reading('bracket-duplicates.dxf');
    expect(bracket.contours).toHaveLength(1);
    expect(bracket.repaired.map((r) => r.what).sort()).toEqual([
      'duplicate drawn the other way dropped',
      'duplicate dropped',
      'zero-length piece dropped',
    ]);
  });

  it('on a sheet with a frame on a hidden layer is read without the frame, unless the layer is asked for', () => {
    const bracket = reading('bracket-hidden-frame.dxf');
    expect(roles(bracket)).toEqual(['outer', 'hole']);
    expect(bracket.layers).toEqual([
      { name: 'CUT', pieces: 2, hidden: false, taken: true },
      { name: 'FRAME', pieces: 1, hidden: true, taken: false },
    ]);
    expect(bracket.leftOut).toMatchObject([{ what: 'LWPOLYLINE on the hidden layer "FRAME"', count: 1 }]);
    expect(bracket.questions).toMatchObject([{ kind: 'layers', layers: ['CUT', 'FRAME'] }]);
    expect(reading('bracket-hidden-frame.dxf', { layers: ['CUT', 'FRAME'] }).contours.map((c) => c.depth)).toEqual([
      1, 2, 0,
    ]);
    expect(refusal('bracket-hidden-frame.dxf', { layers: ['PAINT'] })).toContain('Layers with geometry: CUT, FRAME');
  });
});

describe('the bollard base', () => {
  const base = reading('bollard-base.dxf');

  it('has its bolt holes where the nested, turned, mirrored and repeated inserts put them', () => {
    const bolts = base.contours.filter(({ contour }) => contour.segments.length === 1 && contourLength(contour) < 0.1);
    const centres = bolts.map(({ contour }) => {
      const box = contourBox(contour);
      return [Math.round((box.minX + box.maxX) * 500), Math.round((box.minY + box.maxY) * 500)];
    });
    expect(centres).toEqual([
      [-30, -120],
      [30, -120],
      [120, -30],
      [120, 30],
      [-120, 30],
      [-120, -30],
    ]);
    // pieces of a block on layer 0 lie on the layer of its insert
    expect(new Set(bolts.map((c) => c.layer))).toEqual(new Set(['CUT']));
  });

  it('has its ellipse and its spline as arcs within a hundredth of a millimetre, without corners', () => {
    expect(base.deviation).toBeGreaterThan(0);
    expect(base.deviation).toBeLessThanOrEqual(1e-5);
    const [, ellipse, spline] = base.contours;
    if (!ellipse || !spline) throw new Error('both are closed');
    expect(Math.abs(contourArea(ellipse.contour))).toBeCloseTo(Math.PI * 0.05 * 0.025, 6);
    // four cubic quarters stand for a circle of 40 mm within 0.03 %
    expect(Math.abs(contourArea(spline.contour))).toBeCloseTo(Math.PI * 0.04 ** 2, 5);
    for (const { contour } of [ellipse, spline]) expect(contourCorners(contour, 0.01)).toEqual([]);
  });
});

describe('the foot plate of the oldest format', () => {
  it('has its half-round notch and, with its extrusion pointing down, its mirrored hole', () => {
    const plate = reading('foot-plate-r12.dxf', { unit: 'mm' });
    expect(roles(plate)).toEqual(['outer', 'hole', 'hole']);
    const [outline, left, right] = plate.contours.map((c) => contourBox(c.contour));
    expect(outline?.maxY).toBeCloseTo(0.16, 12);
    expect(left?.minX).toBeCloseTo(0.031, 12);
    expect(left?.maxX).toBeCloseTo(0.049, 12);
    expect(right?.minX).toBeCloseTo(0.151, 12);
  });
});

describe('a file that is no drawing', () => {
  it.each([
    ['empty.dxf', 'The file is empty'],
    ['not-a-drawing.dxf', 'neither a DXF'],
    ['decimal-comma.dxf', 'a decimal comma'],
    ['open-lines.dxf', 'no closed contour'],
    ['block-within-itself.dxf', 'Block "ECHO"'],
  ])('%s is refused with a sentence: %s', (name, words) => {
    const why = refusal(name);
    expect(why).toContain(words);
    expect(why).toMatch(/^[A-Z].*\.$/);
  });

  it('names the line of a decimal comma', () => {
    const lines = readFileSync(path.join(folder, 'decimal-comma.dxf'), 'utf8').split('\n');
    expect(refusal('decimal-comma.dxf')).toContain(`Line ${lines.indexOf('173,205081') + 1} reads "173,205081"`);
  });

  it('names the line where a number or a group code is no such thing', () => {
    const good = readFileSync(path.join(folder, 'bracket.dxf'), 'utf8').split('\n');
    const broken = [...good];
    const at = broken.indexOf('173.205081');
    broken[at] = 'far';
    expect(said(textBytes(broken.join('\n')))).toContain(`line ${at + 1} but "far"`);
    broken.splice(at, 1);
    expect(said(textBytes(broken.join('\n')))).toContain('should hold a DXF group code');
  });

  it('is refused beyond the limits of size, entities and points', () => {
    expect(said(new Uint8Array(drawingLimits.bytes + 1))).toContain('at most 10 MiB');
    const bolt = [
      '0',
      'SECTION',
      '2',
      'BLOCKS',
      '0',
      'BLOCK',
      '2',
      'B',
      '0',
      'CIRCLE',
      '40',
      '1',
      '0',
      'CIRCLE',
      '40',
      '2',
      '0',
      'ENDBLK',
      '0',
      'ENDSEC',
    ];
    const array = [
      '0',
      'SECTION',
      '2',
      'ENTITIES',
      '0',
      'INSERT',
      '2',
      'B',
      '70',
      '400',
      '71',
      '400',
      '44',
      '5',
      '45',
      '5',
      '0',
      'ENDSEC',
      '0',
      'EOF',
    ];
    expect(said(textBytes([...bolt, ...array].join('\n')))).toContain('more than 200000 entities');
    const huge = array.map((word) => (word === '400' ? '30000' : word));
    expect(said(textBytes([...bolt, ...huge].join('\n')))).toContain('30000 × 30000 times');
  });

  it('is refused when a place lies beyond all plates, before anything is computed with it', () => {
    const far = readFileSync(path.join(folder, 'bollard-base.dxf'), 'utf8').replace(
      /\n11\n50\n|\n 11\n50\n/,
      '\n 11\n1e200\n',
    );
    expect(said(textBytes(far))).toContain('is 1e+200, larger than any in a drawing');
    expect(said(textBytes(far.replace('1e200', '1e9')))).toContain('more than 10 km away');
  });

  // a bulge of 1e200 or a place at 1e308 once threw out of the reader: the arc's radius was infinite
  it('is refused or read, and never throws, whichever of its numbers is far too large or far too small', () => {
    for (const name of ['bearing-plate.dxf', 'bollard-base.dxf', 'foot-plate-r12.dxf']) {
      const lines = readFileSync(path.join(folder, name), 'utf8').split(/\r?\n/);
      const geometry = lines.flatMap((line, i) =>
        i % 2 === 0 && /^\s*([1-5]\d|2[123]0)$/.test(line) && i > lines.indexOf('BLOCKS') ? [i + 1] : [],
      );
      expect(geometry.length).toBeGreaterThan(30);
      for (const i of geometry) {
        for (const value of ['1e308', '-1e308', '1e200', '1e12', '-1e12', '1e-320']) {
          const result = drawingRead(textBytes(lines.with(i, value).join('\n')));
          if (result.kind === 'none') continue;
          for (const { contour } of result.contours) expect(Number.isFinite(contourArea(contour))).toBe(true);
        }
      }
    }
  });

  it('throws only for a caller who gives a tolerance below 0', () => {
    expect(() => drawingRead(bytesOf('bracket.dxf'), { gapTolerance: -1 })).toThrow(/gap tolerance -1 m/);
  });

  it('never throws and never hangs, whatever becomes of the bytes', () => {
    const names = [
      'bearing-plate.dxf',
      'bearing-plate-binary.dxf',
      'bollard-base.dxf',
      'foot-plate-r12.dxf',
      'lifting-lug-crlf.dxf',
    ];
    const spoilt = fc.record({
      name: fc.constantFrom(...names),
      edits: fc.array(
        fc.tuple(
          fc.integer({ min: 0, max: 9999 }),
          fc.oneof(fc.integer({ min: 48, max: 57 }), fc.integer({ min: 0, max: 255 })),
        ),
        {
          minLength: 1,
          maxLength: 3,
        },
      ),
      keep: fc.oneof(fc.constant(1), fc.double({ min: 0.2, max: 1, noNaN: true })),
    });
    let read = 0;
    let refused = 0;
    fc.assert(
      // the ends of a range are tried less, since the first bytes alone decide that a file is no DXF at all
      fc.property(fc.noBias(spoilt), ({ name, edits, keep }) => {
        const bytes = bytesOf(name).slice();
        for (const [share, value] of edits) bytes[Math.floor((share / 10_000) * bytes.length)] = value;
        const result = drawingRead(bytes.slice(0, Math.ceil(keep * bytes.length)));
        if (result.kind === 'none') {
          refused++;
          expect(result.why.length).toBeGreaterThan(20);
          return;
        }
        read++;
        for (const { contour } of result.contours) {
          expect(Number.isFinite(contourArea(contour))).toBe(true);
          const last = contour.segments.at(-1);
          const first = contour.segments[0];
          if (first && last)
            expect(pointDistance(segmentEnd(last), segmentStart(first))).toBeLessThanOrEqual(result.gapTolerance * 2);
        }
      }),
      { numRuns: 600 },
    );
    expect(read).toBeGreaterThan(100);
    expect(refused).toBeGreaterThan(100);
  });
});

describe('a contour of 130 000 pieces', () => {
  // once the contour's pieces and its closed gaps went to a function as arguments, more than the call stack holds
  it('a hair from the next each, is read', () => {
    const sides = 130_000;
    const at = (i: number) => {
      const angle = (2 * Math.PI * i) / sides;
      return [(1000 * Math.cos(angle)).toFixed(3), (1000 * Math.sin(angle)).toFixed(3)] as const;
    };
    const lines = Array.from({ length: sides }, (_, i) => {
      const [[x0, y0], [x1, y1]] = [at(i), at(i + 0.9)];
      return `0\nLINE\n8\nCUT\n10\n${x0}\n20\n${y0}\n11\n${x1}\n21\n${y1}\n`;
    });
    const text = `0\nSECTION\n2\nENTITIES\n${lines.join('')}0\nENDSEC\n0\nEOF\n`;
    const result = drawingRead(textBytes(text), { unit: 'mm', gapTolerance: 1e-5 });
    if (result.kind === 'none') throw new Error(result.why);
    expect(result.contours.map(({ contour }) => contour.segments.length)).toEqual([sides]);
    expect(result.repaired).toHaveLength(sides);
  }, 60_000);
});

describe('entity counts', () => {
  it.each(['bearing-plate.dxf', 'lifting-lug.dxf', 'bracket.dxf', 'bollard-base.dxf', 'bracket-duplicates.dxf'])(
    'of %s are those of an independent reader',
    (name) => {
      const other = new SecondReader().parseSync(readFileSync(path.join(folder, name), 'utf8'));
      const counts: Record<string, number> = {};
      for (const { type } of other?.entities ?? []) counts[type] = (counts[type] ?? 0) + 1;
      expect(reading(name).entityCounts).toEqual(counts);
    },
  );
});
