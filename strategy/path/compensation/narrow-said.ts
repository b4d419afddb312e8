import { millimetres } from '../../units/said.ts';
import { quantityText } from '../../units/text.ts';
import type { Contour } from '../contour.ts';
import { contourBox, contourContains } from '../contour.ts';
import type { Nearest } from '../distance.ts';
import type { Box, Point } from '../point.ts';
import type { NarrowFeature } from './narrow.ts';
import type { SegmentIndex } from './segment-index.ts';
import { nearestWithin } from './segment-index.ts';

/** What is too narrow, where, and by how much: "hole 3 at (120.0 mm, 35.5 mm) is narrower than the kerf: 1.2 mm against 1.6 mm". */
export function narrowSentence(name: string, feature: NarrowFeature, kerfWidth: number): string {
  const place = placeText(feature.at);
  switch (feature.kind) {
    case 'hole':
      return `${name} at ${place} ${against(feature.width, kerfWidth)}`;
    case 'gap':
      return `a gap of ${name} at ${place} ${against(feature.width, kerfWidth)}`;
    case 'end':
      return `the cut of ${name} ends ${millimetres(feature.unreached)} before ${place}: from there on it is narrower than the kerf of ${millimetres(kerfWidth)}`;
  }
}

/** Told in tenths of a millimetre, or finer where tenths would not tell the two apart. */
function against(width: number, kerfWidth: number): string {
  const text = (value: number, decimals: number) => quantityText(value, 'length', 'metric', { decimals }).text;
  const digits = [1, 2, 3].find((decimals) => text(width, decimals) !== text(kerfWidth, decimals));
  if (digits === undefined) return `is only as wide as the kerf of ${text(kerfWidth, 1)}`;
  return `is narrower than the kerf: ${text(width, digits)} against ${text(kerfWidth, digits)}`;
}

/** A place as a sentence says it: "(120.0 mm, 35.5 mm)". */
export const placeText = ({ x, y }: Point): string => {
  const text = (value: number) => quantityText(value, 'length', 'metric', { unit: 'mm', decimals: 1 }).text;
  return `(${text(x)}, ${text(y)})`;
};

type Named = { readonly id: string; readonly name: string; readonly contour: Contour };

/** Where two contours with scrap between them are nearer to each other than the kerf is wide: the narrowest place of each pair. */
export function gapsBetweenContours(
  contours: readonly Named[],
  edges: SegmentIndex<{ readonly contourId: string; readonly name: string }>,
  kerfWidth: number,
) {
  const boxes = contours.map(({ contour }) => contourBox(contour));
  const place = new Map(contours.map(({ id }, i) => [id, i]));
  const closest = new Map<string, Nearest & { readonly first: Named; readonly second: string }>();
  contours.forEach((first, i) => {
    for (const segment of first.contour.segments) {
      const found = nearestWithin(edges, segment, kerfWidth * (1 - 1e-6), (of) => (place.get(of.contourId) ?? 0) > i);
      if (!found) continue;
      const key = `${i} ${found.of.contourId}`;
      if (found.distance >= (closest.get(key)?.distance ?? Infinity)) continue;
      const at = between(found);
      // inside an odd number of contours there is steel to be kept between them, not scrap
      const around = contours.filter(({ contour }, k) => boxHolds(boxes[k], at) && contourContains(contour, at)).length;
      if (around % 2 === 1) continue;
      closest.set(key, { ...found, first, second: found.of.name });
    }
  });
  return [...closest.values()].map((found) => {
    const at = between(found);
    return {
      contourId: found.first.id,
      kind: 'narrow' as const,
      at,
      why: `the gap between ${found.first.name} and ${found.second} at ${placeText(at)} ${against(found.distance, kerfWidth)}`,
      leftOut: false,
    };
  });
}

const between = ({ onFirst, onSecond }: Nearest): Point => ({
  x: (onFirst.x + onSecond.x) / 2,
  y: (onFirst.y + onSecond.y) / 2,
});

const boxHolds = (box: Box | undefined, { x, y }: Point): boolean =>
  box !== undefined && x >= box.minX && x <= box.maxX && y >= box.minY && y <= box.maxY;
