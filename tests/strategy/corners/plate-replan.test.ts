import { describe, expect, it } from 'vitest';
import type { PlatePlan, PlatePlanRequest } from '../../../strategy/corners/index.ts';
import { keptPlan, planAgain, platePlan, PlatePlanCancelled } from '../../../strategy/corners/index.ts';
import { cutOfPlate } from '../../bench/cut-plate.ts';
import { seededNumbers } from '../../bench/line.ts';
import { runs } from '../../support/runs.ts';
import { randomCut } from './cuts.ts';

type Overrides = NonNullable<PlatePlanRequest['overrides']>;
const treatments = ['leave', 'dwell', 'loop', 'ease', 'round'] as const;

/** Some corners asked for anew, others no longer, as a programmer does. */
function otherwise(next: () => number, { corners }: PlatePlan, before: Overrides): Overrides {
  const changed = new Map(Object.entries(before));
  for (let n = 1 + Math.floor(next() * 3); n > 0; n--) {
    const id = corners[Math.floor(next() * corners.length)]?.id ?? '';
    const treatment = treatments[Math.floor(next() * 6)];
    if (treatment) changed.set(id, treatment);
    else changed.delete([...changed.keys()][0] ?? '');
  }
  return Object.fromEntries(changed);
}

/** How far two plans of the same corners are apart. */
function apart(a: PlatePlan, b: PlatePlan) {
  expect(a.corners.map(({ id }) => id)).toEqual(b.corners.map(({ id }) => id));
  const pairs = a.corners.flatMap((one, i) => {
    const other = b.corners[i];
    return other ? [[one, other] as const] : [];
  });
  return {
    others: pairs.filter(([one, other]) => one.treatment !== other.treatment).map(([{ id }]) => id),
    hotter: Math.max(...pairs.map(([one, other]) => Math.abs(one.returnWith - other.returnWith))),
    later: Math.max(...pairs.map(([one, other]) => Math.abs((one.returnTime ?? 0) - (other.returnTime ?? 0)))),
    addedTime: Math.abs(a.totals.addedTime - b.totals.addedTime),
  };
}

describe('a plan made again after the programmer asked for something else', () => {
  it('decides what a plan from scratch decides, over and over, by the same heat within half a kelvin', () => {
    const next = seededNumbers(20_261_204);
    const onKeptHeat: boolean[] = [];
    for (let n = 0; n < runs(5, 120); n++) {
      const request = randomCut(next, 8 + Math.floor(next() * 16));
      let kept = keptPlan(request);
      let overrides: Overrides = {};
      for (let change = 0; change < 4; change++) {
        overrides = otherwise(next, kept.plan, overrides);
        kept = planAgain(kept, overrides);
        const scratch = platePlan({ ...request, overrides });
        const { others, hotter, later, addedTime } = apart(kept.plan, scratch);
        const said = `cut ${n}, change ${change}: ${JSON.stringify(overrides)}`;
        expect(others, said).toEqual([]);
        expect(hotter, said).toBeLessThan(0.5);
        expect(addedTime, said).toBeLessThan(0.01 * (scratch.totals.addedTime + 1));
        expect(later, said).toBeLessThan(0.01 * (scratch.totals.addedTime + 1));
        expect(kept.plan.totals.problems, said).toBe(scratch.totals.problems);
        const options = (plan: PlatePlan) =>
          plan.corners.map((one) =>
            one.options.map(({ treatment, fits, form }) => [treatment, fits, Object.keys(form ?? {})]),
          );
        expect(options(kept.plan), said).toEqual(options(scratch));
        onKeptHeat.push(kept.decided.fields === 0);
      }
    }
    // both ways to a plan are gone here: on the heat that was kept, and on a new one
    expect(new Set(onKeptHeat).size).toBe(2);
  }, 120_000);

  const request = cutOfPlate(60);
  const kept = keptPlan(request);
  const waits = kept.plan.corners.filter(({ treatment }) => treatment === 'dwell');

  it('is the kept plan itself when nothing else is asked for', () => {
    const id = waits[3]?.id ?? '';
    expect(planAgain(kept, {})).toBe(kept);
    expect(planAgain(kept, { nobody: 'loop' })).toBe(kept);
    const once = planAgain(kept, { [id]: 'leave' });
    expect(once).not.toBe(kept);
    expect(planAgain(once, { [id]: 'leave' })).toBe(once);
  });

  it('is the same each time, says what a stored plan can keep, and leaves the kept plan as it was', () => {
    const before = JSON.stringify(kept.plan);
    const overrides = { [waits[1]?.id ?? '']: 'loop', [waits[5]?.id ?? '']: 'leave' } as const;
    const [one, other] = [planAgain(kept, overrides).plan, planAgain(kept, overrides).plan];
    expect(one).toEqual(other);
    expect(JSON.parse(JSON.stringify(one))).toEqual(one);
    expect(JSON.stringify(kept.plan)).toBe(before);
  });

  it('is as it was, to rounding, when what was asked for is taken back', () => {
    const asked = planAgain(kept, { [waits[1]?.id ?? '']: 'leave' });
    expect(asked.decided.fields).toBe(0);
    const { others, ...numbers } = apart(planAgain(asked, {}).plan, kept.plan);
    expect(others).toEqual([]);
    for (const number of Object.values(numbers)) expect(number).toBeLessThan(1e-5);
  });

  it('leaves alone what is cut before, and moves what is far behind in time alone', () => {
    const middle = waits[Math.floor(waits.length / 2)];
    const again = planAgain(kept, { [middle?.id ?? '']: 'leave' }).plan;
    const late = (middle?.addedTime ?? 0) - (again.corners.find(({ id }) => id === middle?.id)?.addedTime ?? 0);
    expect(late).toBeGreaterThan(0);
    let moved = 0;
    again.corners.forEach((corner, i) => {
      const was = kept.plan.corners[i];
      if (!was) throw new RangeError(`no corner ${i}`);
      if ((was.returnTime ?? 0) < (middle?.returnTime ?? 0) - 120) expect(corner).toBe(was);
      if (corner === was || corner.options !== was.options) return;
      moved += 1;
      expect({ ...corner, returnTime: was.returnTime }).toEqual(was);
      expect((was.returnTime ?? 0) - (corner.returnTime ?? 0)).toBeGreaterThan(0);
    });
    expect(moved).toBeGreaterThan(20);
    expect(again.totals.cutTime).toBeLessThan(kept.plan.totals.cutTime);
  });

  it('keeps within a kelvin and a hundredth of the time on a plate of many parts, one corner or all asked for', () => {
    const one = { [waits[2]?.id ?? '']: 'leave' } as const;
    const all = Object.fromEntries(waits.map(({ id }) => [id, 'leave'] as const));
    for (const [overrides, fields] of [
      [one, 0],
      [all, 1],
    ] as const) {
      const again = planAgain(kept, overrides);
      const scratch = platePlan({ ...request, overrides });
      const { others, hotter, addedTime } = apart(again.plan, scratch);
      expect(others).toEqual([]);
      // where a wait less brings the cut to a corner sooner, its heat is read at other steps of the field
      expect(hotter).toBeLessThan(1);
      expect(addedTime).toBeLessThan(0.01 * (scratch.totals.addedTime + 1));
      expect(again.decided.fields).toBe(fields);
    }
  });

  it('ends with a word of its own when it is given up', () => {
    expect(() => planAgain(kept, { [waits[0]?.id ?? '']: 'leave' }, () => false)).toThrow(PlatePlanCancelled);
  });
});
