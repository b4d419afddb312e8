import type { HeatedPiece } from '../../strategy/heat/index.ts';
import type { PlateQuestion } from '../../strategy/heat/plate/index.ts';
import { segmentLength, segmentShift, segmentStart } from '../../strategy/path/index.ts';
import { plateOfParts } from './corner-plate.ts';

/** Time from the end of one contour to the start of the next and for its pierce, s. */
const between = 1.5;
/** Heat a pierce leaves, J. */
const pierceHeat = 4000;

/**
 * A plate of 3 × 1.5 m on which so many parts of ten corners are cut in a given time, s, row after row there and back: the heat of its contours (6.5 J per mm² of cut, both faces together)
 * and its pierces. The feed is what the time asks for.
 */
export function warmPlate(parts: number, duration: number): PlateQuestion {
  const { contours, plate, cut, thickness, plateTemperature } = plateOfParts(parts);
  if (plate === null || !('min' in plate)) throw new Error('the plate is a rectangle');
  const [width, height] = [3, 1.5];
  const by = {
    x: (width - plate.min.x - plate.max.x) / 2,
    y: (height - plate.min.y - plate.max.y) / 2,
  };
  const columns = Math.ceil(Math.sqrt(parts * 2));
  const paths = contours.map(({ contour }) => contour.segments.map((segment) => segmentShift(segment, by)));
  const rows = Array.from({ length: Math.ceil(parts / columns) }, (_, row) => {
    const one = paths.slice(row * columns, (row + 1) * columns);
    return row % 2 === 0 ? one : one.reverse();
  });
  const order = rows.flat();
  const length = order.flat().reduce((sum, segment) => sum + segmentLength(segment), 0);
  const feed = length / (duration - between * parts);
  const powerPerLength = cut.heatIntoPlate * feed;
  const heat: HeatedPiece[] = [];
  const pierces: { at: { x: number; y: number }; time: number; heat: number }[] = [];
  let time = 0;
  for (const path of order) {
    time += between;
    const first = path[0];
    if (first) pierces.push({ at: segmentStart(first), time: time - 0.1, heat: pierceHeat });
    for (const segment of path) {
      const to = time + segmentLength(segment) / feed;
      heat.push({ segment, from: time, to, powerPerLength });
      time = to;
    }
  }
  return { plate: { minX: 0, minY: 0, maxX: width, maxY: height }, thickness, plateTemperature, heat, pierces };
}
