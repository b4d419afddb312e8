import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { drawingRead, unitLength } from '../../strategy/path/drawing/index.ts';
import type { DrawingReading } from '../../strategy/path/drawing/index.ts';
import { contourArea, contourLength } from '../../strategy/path/index.ts';
import type { OutsideCheck } from './check.ts';
import { outsideChecks } from './check.ts';

const own = path.join(import.meta.dirname, '../support/drawings');
function read(file: string): DrawingReading {
  const r = drawingRead(new Uint8Array(readFileSync(file)));
  if (r.kind === 'none') throw new Error(r.why);
  const all = drawingRead(new Uint8Array(readFileSync(file)), { layers: r.layers.map((l) => l.name) });
  if (all.kind === 'none') throw new Error(all.why);
  return all;
}
const contourOf = (name: string, i: number) => read(path.join(own, name)).contours[i]?.contour ?? { segments: [] };

outsideChecks('curves of a drawing as lines and arcs', [
  {
    id: 'D01',
    what: 'area of an ellipse of half-axes 50 and 25 mm',
    unit: 'm²',
    got: () => Math.abs(contourArea(contourOf('bollard-base.dxf', 1))),
    expected: Math.PI * 0.05 * 0.025,
    // 0.01 mm all round
    tolerance: { abs: 0.2422 * 1e-5 },
    source: 'area of an ellipse, πab',
    standing: 'computed from a published formula',
  },
  {
    id: 'D02',
    what: 'perimeter of that ellipse',
    unit: 'm',
    got: () => contourLength(contourOf('bollard-base.dxf', 1)),
    expected: 0.24221120551,
    // a path that keeps within δ of a convex curve is longer or shorter by at most 2πδ
    tolerance: { abs: 2 * Math.PI * 1e-5 },
    source: 'complete elliptic integral, 4aE(√0.75); E from Abramowitz and Stegun, table 17.1: 1.21105603',
    standing: 'computed from a published formula',
  },
]);

// Drawings by other people stand beside the project and keep their licences; counts and bounds come with them, from an independent reader.
const folder = path.join(import.meta.dirname, '../../../shared/drawings');
const there = existsSync(path.join(folder, 'expected.json'));

type Expected = {
  readonly id: string;
  readonly file: string;
  readonly origin: { readonly repo: string; readonly path: string };
  readonly closedContours?: Record<string, number>;
  readonly boundsFileUnits?: readonly number[];
};

/** Pieces that branch and planes that tilt leave the count to the way of reading. */
const indicative = new Set(['S18', 'S19', 'S24', 'S35']);

// the shape is that of the file beside the drawings, and each value is compared below
const all = there ? (JSON.parse(readFileSync(path.join(folder, 'expected.json'), 'utf8')) as Expected[]) : [];
/** What an independent reader found in a drawing, against what ours finds. */
function drawingChecks(e: Expected): OutsideCheck[] {
  const picture = e.file.endsWith('.svg');
  const base = {
    source: `${e.origin.repo}, ${e.origin.path}, read with Python ${picture ? 'svgelements 1.7.2' : 'ezdxf 0.18.1'}`,
    standing: 'published' as const,
  };
  const file = path.join(folder, e.file);
  const checks: OutsideCheck[] = [];
  const closed = e.closedContours?.['1e-6d'];
  if (closed !== undefined) {
    checks.push({
      ...base,
      id: `${e.id}-closed`,
      what: `closed contours of ${e.file}`,
      unit: '1',
      got: () => read(file).contours.length,
      expected: closed,
      tolerance: { abs: 0 },
    });
  }
  const bounds = e.boundsFileUnits;
  if (bounds) {
    const [x0 = NaN, y0 = NaN, x1 = NaN, y1 = NaN] = bounds;
    const got = () => {
      const r = read(file);
      // the sizes of pictures are given in millimetres, those of drawings in their own units
      const unit = picture ? unitLength.mm : unitLength[r.unit];
      return Math.hypot(r.bounds.maxX - r.bounds.minX, r.bounds.maxY - r.bounds.minY) / unit;
    };
    checks.push({
      ...base,
      id: `${e.id}-diagonal`,
      what: `diagonal of ${e.file}, ${picture ? 'mm' : 'file units'}`,
      unit: '1',
      got,
      expected: Math.hypot(x1 - x0, y1 - y0),
      tolerance: { rel: 1e-3 },
    });
  }
  return checks;
}

const gated = all.filter((e) => !indicative.has(e.id));
describe.skipIf(!there)('real drawings that stand beside the project', () => {
  outsideChecks('read as by an independent reader', gated.flatMap(drawingChecks));

  it('are all there', () => {
    for (const e of all) expect([e.file, existsSync(path.join(folder, e.file))]).toEqual([e.file, true]);
  });
});
