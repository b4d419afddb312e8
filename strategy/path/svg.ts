import type { Contour } from './contour.ts';
import type { Point } from './point.ts';
import type { Segment } from './segment.ts';
import { segmentEnd, segmentPointAt, segmentStart } from './segment.ts';

/** How metres become the units of an SVG path. Rounding is the writer's choice, made here once. */
export type SvgOptions = {
  /** SVG units a metre; 1000 writes millimetres. */
  readonly scale: number;
  /** Place of the drawing that becomes (0, 0), m. */
  readonly origin?: Point;
  /** True when the drawing's y runs up and the picture's down; the default. */
  readonly flipY?: boolean;
  /** Digits after the point; 3 by default. */
  readonly digits?: number;
};

/** Text of an SVG `d` attribute for a path that stays open (lines L, arcs A; a full circle becomes two arcs). */
export function svgPathData(path: readonly Segment[], options: SvgOptions): string {
  const first = path[0];
  if (!first) return '';
  const write = writer(options);
  return `M${write.point(segmentStart(first))}` + path.map((segment) => write.segment(segment)).join('');
}

/** Text of an SVG `d` attribute for a closed contour, ended by Z. */
export const svgContourData = (contour: Contour, options: SvgOptions): string =>
  contour.segments.length === 0 ? '' : `${svgPathData(contour.segments, options)}Z`;

function writer({ scale, origin = { x: 0, y: 0 }, flipY = true, digits = 3 }: SvgOptions) {
  const number = (value: number): string => String(Number(value.toFixed(digits)));
  const point = (p: Point): string => {
    const y = (p.y - origin.y) * scale;
    return `${number((p.x - origin.x) * scale)} ${number(flipY ? -y : y)}`;
  };
  const arcTo = (radius: number, sweep: number, end: Point): string => {
    const r = number(radius * scale);
    const large = Math.abs(sweep) > Math.PI ? 1 : 0;
    // in a picture with y down, counter-clockwise of the drawing is SVG's negative direction
    const positive = sweep > 0 !== flipY ? 1 : 0;
    return `A${r} ${r} 0 ${large} ${positive} ${point(end)}`;
  };
  const segment = (s: Segment): string => {
    if (s.kind === 'line') return `L${point(s.end)}`;
    // nearly a full circle? two arcs, since one whose ends round to the same place vanishes
    if (Math.abs(s.sweep) > 1.9 * Math.PI) {
      return arcTo(s.radius, s.sweep / 2, segmentPointAt(s, 0.5)) + arcTo(s.radius, s.sweep / 2, segmentEnd(s));
    }
    return arcTo(s.radius, s.sweep, segmentEnd(s));
  };
  return { point, segment };
}
