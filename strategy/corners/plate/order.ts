import { contourBox } from '../../path/contour.ts';
import type { Point } from '../../path/point.ts';
import { pointDistance } from '../../path/point.ts';
import { celsius, seconds } from '../../units/said.ts';
import { betterOutcome, outcomeOf } from './choose.ts';
import type { DecidedPlate } from './passes.ts';
import { decidedPlate } from './passes.ts';
import type { PreparedPlate } from './prepared.ts';
import { preparedPlate } from './prepared.ts';

/** Another order of a cut. */
export type OrderSuggestion = {
  /** Ids of the contours in the order of cutting. */
  readonly order: readonly string[];
  readonly why: string;
  /** What the way between the cuts takes more, s. */
  readonly rapidTime: number;
  /** What the treatments of the corners add less, s. */
  readonly addedTime: number;
  /** How many corners fewer stay over a limit. */
  readonly overLimit: number;
};

export type OrderQuestion = {
  /** The piece that a contour belongs to: its contours stay together, in their order. */
  readonly pieceOf: (contourId: string) => string;
  /** Whether an order of the contours may be cut: what lies inside before what lies around it. */
  readonly allowed: (order: readonly string[]) => boolean;
  /** How many to name at most; 3 when left out. */
  readonly most?: number;
};

/** A saving below this is not worth another order, s. */
const worthwhile = 1;

/**
 * Orders of the pieces of a cut that come back later to what is hot: those that leave fewer corners over a limit or spare more time than their way takes, best first. Tried are:
 * every other piece first, every third, each time the piece farthest from those cut last, and the pieces with the hottest corners last; each is planned whole.
 * Deterministic; takes a plan's time for each.
 */
export function orderSuggestions(
  prepared: PreparedPlate,
  decided: DecidedPlate,
  { pieceOf, allowed, most = 3 }: OrderQuestion,
): OrderSuggestion[] {
  const { request } = prepared;
  const pieces = new Map<string, string[]>();
  for (const { id } of request.contours) {
    const known = pieces.get(pieceOf(id));
    if (known) known.push(id);
    else pieces.set(pieceOf(id), [id]);
  }
  const names = [...pieces.keys()];
  const before = outcomeOf(decided.ways.map((way) => ({ way })));
  if (names.length < 3 || (before.over === 0 && before.addedTime < worthwhile)) return [];

  const middles = new Map(
    names.map((name) => {
      const boxes = (pieces.get(name) ?? []).flatMap((id) => {
        const one = request.contours.find((contour) => contour.id === id);
        return one ? [contourBox(one.contour)] : [];
      });
      const x = boxes.reduce((sum, { minX, maxX }) => sum + minX + maxX, 0) / (2 * boxes.length);
      const y = boxes.reduce((sum, { minY, maxY }) => sum + minY + maxY, 0) / (2 * boxes.length);
      return [name, { x, y }] as const;
    }),
  );
  const current = request.contours.map(({ id }) => id).join();
  const tried = new Set([current]);
  const found: (OrderSuggestion & { readonly over: number; readonly whole: number })[] = [];
  for (const { order: sequence, said } of sequences(names, middles, hottestPieces(prepared, decided, pieceOf))) {
    const order = sequence.flatMap((name) => pieces.get(name) ?? []);
    if (tried.has(order.join()) || !allowed(order)) continue;
    tried.add(order.join());
    const other = preparedPlate(reordered(prepared, order));
    const then = decidedPlate(other);
    const after = outcomeOf(then.ways.map((way) => ({ way })));
    const rapidTime = other.duration - prepared.duration;
    const whole = { over: after.over, addedTime: after.addedTime + rapidTime };
    if (!betterOutcome({ ...whole, addedTime: whole.addedTime + worthwhile }, before)) continue;
    const spared = before.addedTime - after.addedTime;
    const fewer = before.over - after.over;
    found.push({
      order,
      why: `${said}: ${cooler(prepared, decided, other, then)}${fewer > 0 ? `${fewer} fewer corners stay over the limit, ` : ''}treatments take ${seconds(Math.abs(spared))} ${spared >= 0 ? 'less' : 'more'} and the ways between the cuts ${seconds(Math.abs(rapidTime))} ${rapidTime >= 0 ? 'more' : 'less'}; the order is set in the layout`,
      rapidTime,
      addedTime: spared,
      overLimit: fewer,
      over: after.over,
      whole: whole.addedTime,
    });
  }
  return found
    .sort((a, b) => a.over - b.over || a.whole - b.whole)
    .slice(0, most)
    .map(({ over: _over, whole: _whole, ...one }) => one);
}

/** The same plate cut in another order of its contours. */
function reordered({ request }: PreparedPlate, order: readonly string[]): PreparedPlate['request'] {
  const place = new Map(order.map((id, i) => [id, i]));
  const at = (id: string) => place.get(id) ?? order.length;
  return {
    ...request,
    contours: [...request.contours].sort((a, b) => at(a.id) - at(b.id)),
    cutPath: { runs: [...request.cutPath.runs].sort((a, b) => at(a.contourId) - at(b.contourId)) },
  };
}

/** Pieces by the hottest tip that the cut comes back to in them, the hottest first. */
function hottestPieces(
  { legs: { legs }, corners }: PreparedPlate,
  { ways }: DecidedPlate,
  pieceOf: OrderQuestion['pieceOf'],
): string[] {
  const hottest = new Map<string, number>();
  legs.forEach(({ corner }, k) => {
    const one = corners[corner];
    const way = ways[k];
    if (!one?.counts || !way) return;
    const piece = pieceOf(one.found.contour.id);
    const heat = way.background + 100 * way.over;
    if (heat > (hottest.get(piece) ?? 0)) hottest.set(piece, heat);
  });
  return [...hottest].sort(([a, x], [b, y]) => y - x || (a < b ? -1 : 1)).map(([piece]) => piece);
}

type Sequence = { readonly order: readonly string[]; readonly said: string };

function sequences(
  names: readonly string[],
  middles: ReadonlyMap<string, Point>,
  hottest: readonly string[],
): Sequence[] {
  const inSteps = (step: number) =>
    Array.from({ length: step }, (_, first) => names.filter((_name, i) => i % step === first)).flat();
  const last = (count: number) => {
    const late = new Set(hottest.slice(0, count));
    return [...names.filter((name) => !late.has(name)), ...names.filter((name) => late.has(name))];
  };
  return [
    { order: inSteps(2), said: 'every other piece first' },
    { order: inSteps(3), said: 'every third piece first' },
    { order: farthestNext(names, middles), said: 'each time the piece farthest from those cut last' },
    { order: last(1), said: 'the piece with the hottest corners last' },
    { order: last(Math.ceil(names.length / 4)), said: 'the quarter of the pieces with the hottest corners last' },
  ];
}

/** Pieces that count as cut last. */
const lately = 4;

/** From the first piece on each time the one farthest from those cut last; of equally far ones the first. */
function farthestNext(names: readonly string[], middles: ReadonlyMap<string, Point>): string[] {
  const left = new Set(names);
  const order: string[] = [];
  const take = (name: string) => {
    left.delete(name);
    order.push(name);
  };
  if (names[0] !== undefined) take(names[0]);
  while (left.size > 0) {
    const recent = order.slice(-lately).flatMap((name) => middles.get(name) ?? []);
    let [best, farthest] = ['', -1];
    for (const name of left) {
      const at = middles.get(name);
      const distance = at ? Math.min(...recent.map((place) => pointDistance(place, at))) : 0;
      if (distance > farthest + 1e-9) [best, farthest] = [name, distance];
    }
    take(best);
  }
  return order;
}

/** What becomes of the corner that finds the warmest plate now. */
function cooler(
  { legs: { legs }, corners }: PreparedPlate,
  { ways }: DecidedPlate,
  other: PreparedPlate,
  then: DecidedPlate,
): string {
  let worst = -1;
  ways.forEach((way, k) => {
    if (corners[legs[k]?.corner ?? -1]?.counts && way.background > (ways[worst]?.background ?? 0)) worst = k;
  });
  const now = ways[worst];
  const id = corners[legs[worst]?.corner ?? -1]?.found.id;
  const after = then.ways[other.legs.legs.findIndex(({ corner }) => other.corners[corner]?.found.id === id)];
  if (!now || !after || id === undefined) return '';
  return `corner ${id} is come back to on a plate of ${celsius(after.background)} instead of ${celsius(now.background)}, `;
}
