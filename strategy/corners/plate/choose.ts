/** A treatment as it would turn out at a corner. */
export type Judged = {
  readonly addedTime: number; // s; below 0 where it spares a stop
  /** 0 where it keeps every limit; otherwise how far it is over, in a measure of the model's. */
  readonly over: number;
};

/**
 * A cut whose corners are decided one after another, and whatever is done at one changes what those after it find. `State` says what was done so far; it is never
 * changed, so that several ways on can be tried from one.
 */
export type ChoiceModel<Way extends Judged, State> = {
  readonly corners: number;
  readonly start: State;
  /** The ways open at a corner, in the order of preference at equal time; never none. */
  judge(corner: number, state: State): readonly Way[];
  /** The state behind a corner. */
  then(corner: number, state: State, way: Way): State;
  /**
   * Ways that cost more at a corner than what is chosen for it alone, and still may pay: longer waits, less heat. `after` is what the corners behind it would get up
   * to `reach`. Each way is tried with all of them, so what is hopeless should not be among the answer.
   */
  dearer(corner: number, own: Step<Way, State>, after: readonly Step<Way, State>[]): readonly Way[];
  /** Number of the last corner whose heat a choice here matters to. */
  reach(corner: number): number;
};

/** What some corners come to: how many stay over a limit, and the time all treatments add, s. */
export type Outcome = { readonly over: number; readonly addedTime: number };

/** Times that differ by less are equal, s: rounding decides nothing. */
const tie = 1e-9;

/** Whether one outcome is better than another: fewer corners over a limit, then less added time. */
export const betterOutcome = (a: Outcome, b: Outcome): boolean =>
  a.over !== b.over ? a.over < b.over : a.addedTime < b.addedTime - tie;

/**
 * The way that is best for a corner alone: of those that keep every limit the quickest, and where none does the one that is least over; of equals the
 * quicker, then the first.
 */
export function bestAlone<Way extends Judged>(open: readonly Way[]): Way {
  const [first, ...rest] = open;
  if (!first) throw new RangeError('a corner has no way open');
  return rest.reduce((best, way) => {
    if (best.over > 0 !== way.over > 0) return way.over > 0 ? best : way;
    if (way.over > 0 && Math.abs(way.over - best.over) > tie) return way.over < best.over ? way : best;
    return way.addedTime < best.addedTime - tie ? way : best;
  }, first);
}

/** What was chosen at each corner, and what was open there. */
export type Chosen<Way, State> = {
  readonly ways: readonly Way[];
  readonly open: readonly (readonly Way[])[];
  /** What was done before each corner. */
  readonly before: readonly State[];
};

/**
 * Ways for all corners in their order, such that few corners stay over a limit and the time added by all is small: fewest corners over first, then the time. Where
 * nothing keeps a corner under its limits it gets what leaves it least over. Each corner takes what is best for it alone, unless a dearer way there saves more at
 * the corners after it, as far as it reaches, when those take what is best for them alone. Deterministic. With what was chosen before (`known`) only the corners `from` on
 * are decided: the same as all of them where no corner up to the reach of those before `from` has changed.
 */
export function choose<Way extends Judged, State>(
  model: ChoiceModel<Way, State>,
  known?: Chosen<Way, State>,
  from = 0,
): Chosen<Way, State> {
  if (known && from >= model.corners) return known;
  const ways: Way[] = known ? known.ways.slice(0, from) : [];
  const open: (readonly Way[])[] = known ? known.open.slice(0, from) : [];
  const before: State[] = known ? known.before.slice(0, from) : [];
  let ahead: Ahead<Way, State> = { corners: [], behind: known?.before[from] ?? model.start };
  for (let corner = ways.length; corner < model.corners; corner++) {
    ahead = lookedAhead(model, corner, ahead, model.reach(corner));
    const [own, ...after] = ahead.corners;
    if (!own) break;
    let chosen = own.way;
    let best = ahead;
    if (own.way.over === 0 && after.some(({ way }) => way.addedTime > 0 || way.over > 0)) {
      for (const way of model.dearer(corner, own, after)) {
        const saved = after.reduce((sum, one) => sum + Math.max(0, one.way.addedTime), 0);
        const hopeless = after.every((one) => one.way.over === 0) && way.addedTime - own.way.addedTime >= saved;
        if (hopeless) continue;
        const first: Step<Way, State> = { before: own.before, open: own.open, way };
        const tried = lookedAhead(
          model,
          corner + 1,
          { corners: [], behind: model.then(corner, own.before, way) },
          corner + after.length,
        );
        const whole = { corners: [first, ...tried.corners], behind: tried.behind };
        if (!betterOutcome(outcomeOf(whole.corners), outcomeOf(best.corners))) continue;
        best = whole;
        chosen = way;
      }
    }
    ways.push(chosen);
    open.push(own.open);
    before.push(own.before);
    ahead = { corners: best.corners.slice(1), behind: best.behind };
  }
  return { ways, open, before };
}

/** A corner decided for itself: what was done before it, what is open there, and what it gets. */
export type Step<Way, State> = { readonly before: State; readonly open: readonly Way[]; readonly way: Way };
/** Corners decided each for itself, one after another, and the state behind the last. */
type Ahead<Way, State> = { readonly corners: readonly Step<Way, State>[]; readonly behind: State };

/** What is known from `from` on, continued up to a corner. */
function lookedAhead<Way extends Judged, State>(
  model: ChoiceModel<Way, State>,
  from: number,
  known: Ahead<Way, State>,
  last: number,
): Ahead<Way, State> {
  const corners = [...known.corners];
  let behind = known.behind;
  for (let corner = from + corners.length; corner <= Math.min(last, model.corners - 1); corner++) {
    const open = model.judge(corner, behind);
    const way = bestAlone(open);
    corners.push({ before: behind, open, way });
    behind = model.then(corner, behind, way);
  }
  return { corners, behind };
}

/** What the ways of some corners come to. */
export const outcomeOf = (corners: readonly { readonly way: Judged }[]): Outcome =>
  corners.reduce(
    (sum, { way }) => ({ over: sum.over + (way.over > 0 ? 1 : 0), addedTime: sum.addedTime + way.addedTime }),
    { over: 0, addedTime: 0 },
  );
