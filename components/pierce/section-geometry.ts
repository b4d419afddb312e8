import { laneHeight } from './lane-scale.ts';

/** Where everything of the section stands, px. */
export type SectionGeometry = {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  readonly lanesBottom: number;
  /** Middle of the row in which stages' ends are moved. */
  readonly handleRow: number;
  /** Base of the time axis's figures. */
  readonly timeBase: number;
  /** Height of a lane's drawn range. */
  readonly box: number;
  readonly laneTop: (index: number) => number;
  readonly x: (time: number) => number;
  /** Seconds a pixel. */
  readonly secondsPerPixel: number;
};

/** Height of one dimension line with its lettering, px. */
export const dimensionRow = 26;

type GeometryInput = {
  readonly measured: number;
  readonly depth: number;
  readonly lanes: number;
  readonly box: number;
  /** Seconds that the axis must hold. */
  readonly timeSpan: number;
  readonly editable: boolean;
};

export function sectionGeometry({ measured, depth, lanes, box, timeSpan, editable }: GeometryInput): SectionGeometry {
  // narrower the drawing is scaled down, and what is touched would no longer stand on what is drawn
  const width = Math.max(200, measured);
  const left = 50;
  const right = width - 14;
  const top = 28;
  const bottom = top + depth;
  const lanesTop = bottom + 2 * dimensionRow + 18;
  const lanesBottom = lanesTop + lanes * laneHeight(box);
  const handleRow = lanesBottom + 14;
  const timeBase = editable ? lanesBottom + 48 : lanesBottom + 18;
  const span = Math.max(timeSpan, 1e-9);
  return {
    width,
    height: timeBase + 12,
    left,
    right,
    top,
    bottom,
    lanesBottom,
    handleRow,
    timeBase,
    box,
    laneTop: (index) => lanesTop + index * laneHeight(box),
    x: (time) => left + (time / span) * (right - left),
    secondsPerPixel: span / (right - left),
  };
}
