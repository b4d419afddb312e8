import type { CornerPlan, PlannedCorner, Treatment } from '../../shared/corner-plans.ts';
import { contourCorners, cornerOfPath, lineBetween, loopAt, loopSlug } from '../../strategy/path/index.ts';

const kerfWidth = 6e-4;
const treatments: readonly Treatment[] = ['loop', 'loop', 'dwell', 'leave', 'ease'];
const columns = 20;

/** A plan like the one given, of so many five-pointed stars in rows: ten corners each, five of them tips with a treatment each. */
export function planOfStars(like: CornerPlan, stars: number): CornerPlan {
  const contours: CornerPlan['part']['contours'] = [];
  const corners: PlannedCorner[] = [];
  const plain = like.corners[0];
  if (!plain) throw new Error('a plan without corners is no pattern');
  for (let star = 0; star < stars; star++) {
    const centre = { x: 0.15 * (star % columns), y: 0.15 * Math.floor(star / columns) };
    const places = Array.from({ length: 10 }, (_, i) => {
      const [radius, angle] = [i % 2 ? 0.022 : 0.055, (i * Math.PI) / 5 + star * 0.37];
      return { x: centre.x + radius * Math.cos(angle), y: centre.y + radius * Math.sin(angle) };
    });
    const segments = places.map((place, i) => lineBetween(place, places[(i + 1) % 10] ?? place));
    const id = `${star}`;
    contours.push({ id, depth: 0, role: 'outer', parent: null, layer: '0', segments });
    for (const found of contourCorners({ segments })) {
      const treatment = found.convex ? (treatments[(found.index / 2 + star) % 5] ?? 'leave') : 'leave';
      const onPath = { ...found, point: cornerOfPath(found, kerfWidth) };
      const loop = treatment === 'loop' ? loopAt(onPath, 3e-3) : null;
      const slug = loop && loopSlug(onPath, loop, kerfWidth);
      corners.push({
        ...plain,
        id: `c${id}-${found.index}`,
        contourId: id,
        at: found.point,
        angle: found.angle,
        convex: found.convex,
        treatment,
        chosenBy: 'rule',
        dwell: treatment === 'dwell' ? 0.8 : null,
        trouble: star % 40 === 0 && found.index === 0 ? 'nothing keeps this tip under the limit' : null,
        loop: loop && {
          radius: loop.radius,
          extension: loop.extension,
          length: loop.length,
          slugArea: slug?.area ?? 0,
          segments: [...loop.segments],
          slug: [...(slug?.contour.segments ?? [])],
        },
      });
    }
  }
  const of = (treatment: Treatment) => corners.filter((corner) => corner.treatment === treatment).length;
  return {
    ...like,
    part: { ...like.part, name: `${stars} stars`, contours },
    overrides: {},
    corners,
    totals: {
      ...like.totals,
      corners: corners.length,
      loops: of('loop'),
      dwells: of('dwell'),
      trouble: corners.filter(({ trouble }) => trouble !== null).length,
    },
  };
}
