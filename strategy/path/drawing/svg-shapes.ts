import svgPath from 'svgpath';
import type { Point } from '../point.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';
import type { Shape } from './shape.ts';
import type { SvgNode } from './svg-tree.ts';
import type { Viewport } from './svg-values.ts';
import { svgNumbers, svgPixels } from './svg-values.ts';

/** Shapes of one element, each list connected; `fault` says what its data had wrong, read up to there. */
export type Outline = { readonly runs: readonly (readonly Shape[])[]; readonly fault: string | null };

export const shapeNames: ReadonlySet<string> = new Set([
  'path',
  'rect',
  'circle',
  'ellipse',
  'line',
  'polyline',
  'polygon',
]);

/** Geometry of a shape element in its own coordinates. SVG 1.1, chapters 8 and 9. */
export function svgOutline({ name, attributes }: SvgNode, port: Viewport): Outline {
  const diagonal = Math.hypot(port.width, port.height) / Math.SQRT2;
  const across = (key: string): number => svgPixels(attributes[key], port.width) ?? 0;
  const down = (key: string): number => svgPixels(attributes[key], port.height) ?? 0;
  switch (name) {
    case 'path':
      return pathOutline(attributes.d ?? '');
    case 'rect': {
      const [width, height] = [across('width'), down('height')];
      const rx = svgPixels(attributes.rx, port.width);
      const ry = svgPixels(attributes.ry, port.height);
      // one radius given stands for both, and neither is more than half of its side
      const half = (radius: number | null, other: number | null, side: number) =>
        Math.min(Math.max(0, radius ?? other ?? 0), side / 2);
      const corner = { x: across('x'), y: down('y') };
      return sound(rectangle(corner, width, height, half(rx, ry, width), half(ry, rx, height)));
    }
    case 'circle': {
      const radius = svgPixels(attributes.r, diagonal) ?? 0;
      return sound(oval({ x: across('cx'), y: down('cy') }, radius, radius));
    }
    case 'ellipse': {
      const rx = svgPixels(attributes.rx, port.width);
      const ry = svgPixels(attributes.ry, port.height);
      return sound(oval({ x: across('cx'), y: down('cy') }, rx ?? ry ?? 0, ry ?? rx ?? 0));
    }
    case 'line':
      return sound([straight({ x: across('x1'), y: down('y1') }, { x: across('x2'), y: down('y2') })]);
    case 'polyline':
    case 'polygon': {
      const values = svgNumbers(attributes.points ?? '');
      const points = Array.from({ length: Math.floor(values.length / 2) }, (_, i) => ({
        x: values[2 * i] ?? 0,
        y: values[2 * i + 1] ?? 0,
      }));
      tooMany(points.length);
      const first = points[0];
      if (name === 'polygon' && first) points.push(first);
      const shapes = points.slice(1).map((p, i) => straight(points[i] ?? p, p));
      return { runs: [shapes], fault: values.length % 2 === 1 ? 'an odd number of coordinates' : null };
    }
    default:
      return { runs: [], fault: null };
  }
}

const sound = (shapes: readonly Shape[]): Outline => ({ runs: [shapes], fault: null });

const straight = (from: Point, to: Point): Shape => ({ kind: 'line', from, to });

function tooMany(points: number): void {
  if (points > drawingLimits.points) {
    throw new DrawingRefusal(
      `One element has ${points} points; at most ${drawingLimits.points} are read. Simplify it and export again.`,
    );
  }
}

function oval(centre: Point, rx: number, ry: number): Shape[] {
  if (!(rx > 0 && ry > 0)) return [];
  return [{ kind: 'conic', centre, u: { x: rx, y: 0 }, v: { x: 0, y: ry }, start: 0, sweep: 2 * Math.PI }];
}

function rectangle({ x, y }: Point, width: number, height: number, rx: number, ry: number): Shape[] {
  if (!(width > 0 && height > 0)) return [];
  const [right, bottom] = [x + width, y + height];
  if (!(rx > 0 && ry > 0)) {
    const corners = [
      { x, y },
      { x: right, y },
      { x: right, y: bottom },
      { x, y: bottom },
    ];
    return corners.map((p, i) => straight(p, corners[(i + 1) % 4] ?? p));
  }
  const quarter = (cx: number, cy: number, turns: number): Shape => ({
    kind: 'conic',
    centre: { x: cx, y: cy },
    u: { x: rx, y: 0 },
    v: { x: 0, y: ry },
    start: (turns * Math.PI) / 2,
    sweep: Math.PI / 2,
  });
  return [
    straight({ x: x + rx, y }, { x: right - rx, y }),
    quarter(right - rx, y + ry, -1),
    straight({ x: right, y: y + ry }, { x: right, y: bottom - ry }),
    quarter(right - rx, bottom - ry, 0),
    straight({ x: right - rx, y: bottom }, { x: x + rx, y: bottom }),
    quarter(x + rx, bottom - ry, 1),
    straight({ x, y: bottom - ry }, { x, y: y + ry }),
    quarter(x + rx, y + ry, 2),
  ].filter((shape) => shape.kind !== 'line' || shape.from.x !== shape.to.x || shape.from.y !== shape.to.y);
}

function pathOutline(data: string): Outline {
  const path = svgPath(data.trim());
  const runs: Shape[][] = [];
  let run: Shape[] = [];
  let begin: Point = { x: 0, y: 0 };
  let points = 0;
  const add = (shape: Shape) => {
    tooMany(++points);
    run.push(shape);
  };
  const end = () => {
    if (run.length > 0) runs.push(run);
    run = [];
  };
  path
    .abs()
    .unshort()
    .iterate((segment, _, x, y) => {
      const at = { x, y };
      switch (segment[0]) {
        case 'M':
          end();
          begin = { x: segment[1], y: segment[2] };
          return;
        case 'L':
          add(straight(at, { x: segment[1], y: segment[2] }));
          return;
        case 'H':
          add(straight(at, { x: segment[1], y }));
          return;
        case 'V':
          add(straight(at, { x, y: segment[1] }));
          return;
        case 'C':
          add(
            bezier([
              at,
              { x: segment[1], y: segment[2] },
              { x: segment[3], y: segment[4] },
              { x: segment[5], y: segment[6] },
            ]),
          );
          return;
        case 'Q':
          add(bezier([at, { x: segment[1], y: segment[2] }, { x: segment[3], y: segment[4] }]));
          return;
        case 'A':
          for (const shape of arcShapes(at, segment)) add(shape);
          return;
        case 'Z':
        case 'z':
          if (at.x !== begin.x || at.y !== begin.y) add(straight(at, begin));
          end();
      }
    });
  end();
  return { runs, fault: faultOf(path) };
}

/** The package keeps what it stumbled over in a field that its types do not name. */
function faultOf(path: object): string | null {
  const fault: unknown = 'err' in path ? path.err : '';
  return typeof fault === 'string' && fault !== ''
    ? fault.replace(/^SvgPath:\s*/, '').replace(/[^\x20-\x7e]/g, '?')
    : null;
}

function bezier(points: readonly Point[]): Shape {
  const degree = points.length - 1;
  const ends = (at: number) => Array.from({ length: degree + 1 }, () => at);
  return { kind: 'spline', degree, knots: [...ends(0), ...ends(1)], points, weights: points.map(() => 1) };
}

/** From the ends of an elliptical arc to its centre and angles: SVG 1.1, appendix F.6.5 and F.6.6. */
function arcShapes(
  from: Point,
  [, rxGiven, ryGiven, rotation, large, sweeps, x, y]: readonly [
    'A',
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ],
): Shape[] {
  const to = { x, y };
  if (from.x === x && from.y === y) return [];
  let [rx, ry] = [Math.abs(rxGiven), Math.abs(ryGiven)];
  if (!(rx > 0 && ry > 0)) return [straight(from, to)];
  const phi = (rotation * Math.PI) / 180;
  const [cos, sin] = [Math.cos(phi), Math.sin(phi)];
  const [dx, dy] = [(from.x - x) / 2, (from.y - y) / 2];
  const [px, py] = [cos * dx + sin * dy, -sin * dx + cos * dy];
  const reach = (px / rx) ** 2 + (py / ry) ** 2;
  // radii too small to span the chord grow until they do
  if (reach > 1) {
    rx *= Math.sqrt(reach);
    ry *= Math.sqrt(reach);
  }
  const root = Math.sqrt(Math.max(0, 1 / Math.min(1, reach) - 1)) * (large === sweeps ? -1 : 1);
  const [qx, qy] = reach > 1 ? [0, 0] : [(root * rx * py) / ry, (-root * ry * px) / rx];
  const centre = { x: cos * qx - sin * qy + (from.x + x) / 2, y: sin * qx + cos * qy + (from.y + y) / 2 };
  const start = Math.atan2((py - qy) / ry, (px - qx) / rx);
  const stop = Math.atan2((-py - qy) / ry, (-px - qx) / rx);
  const full = 2 * Math.PI;
  const turn = (((stop - start) % full) + full) % full;
  const sweep = sweeps ? (turn === 0 ? full : turn) : turn - full;
  return [{ kind: 'conic', centre, u: { x: rx * cos, y: rx * sin }, v: { x: -ry * sin, y: ry * cos }, start, sweep }];
}
