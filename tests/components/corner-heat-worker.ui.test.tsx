import { act, renderHook, waitFor } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { heatAnswer, type HeatAsked, type HeatSaid } from '@/components/corners/heat.worker.ts';
import { heatMoment, temperatureAt, type PlateHeat } from '@/components/corners/heat-field.ts';
import { usePlateHeat } from '@/components/corners/use-plate-heat.ts';
import { pathOf, planOf } from './corner-plan-fixtures.ts';
import { plateHeatOf } from './corner-heat-fixtures.ts';

afterEach(() => vi.unstubAllGlobals());

const plan = planOf();
const asked = (more: Partial<HeatAsked> = {}): HeatAsked => ({
  path: pathOf(plan),
  cutting: plan.cutting,
  plate: { minX: -0.02, minY: -0.02, maxX: 0.12, maxY: 0.12 },
  shape: null,
  thickness: 0.02,
  plateTemperature: 293.15,
  ...more,
});

describe('the heat of a plan’s cut', () => {
  it('is worked out from its path: nothing before the cut, warm beside what is cut, warmest at last near the end', () => {
    const said: HeatSaid[] = [];
    heatAnswer(asked(), (one) => said.push(structuredClone(one)));
    const shares = said.flatMap((one) => (one.kind === 'progress' ? [one.share] : []));
    expect(shares.at(-1)).toBe(1);
    expect([...shares].sort((a, b) => a - b)).toEqual(shares);
    const last = said.at(-1);
    if (last?.kind !== 'done') throw new Error('there is no answer');
    const kelvin = (time: number, x: number, y: number) => {
      const moment = heatMoment(last.heat, time, 5e-4);
      return moment ? temperatureAt(moment, { x, y }) : Number.NaN;
    };
    const end = last.heat.frames.at(-1)?.time ?? 0;
    expect(kelvin(0, 0.05, 0.05)).toBeCloseTo(293.15, 1);
    expect(kelvin(end, 0.012, 0.05)).toBeGreaterThan(300);
    // 4 mm inside the last edge and the first
    expect(kelvin(end, 0.004, 0.03)).toBeGreaterThan(kelvin(end, 0.03, 0.004) + 20);
  });

  it('of a plate smaller than its heat spreads in a second is refused with a sentence', () => {
    const said: HeatSaid[] = [];
    heatAnswer(asked({ plate: { minX: 0, minY: 0, maxX: 1e-3, maxY: 1e-3 } }), (one) => said.push(one));
    expect(said.at(-1)).toMatchObject({ kind: 'refused', why: expect.stringMatching(/smaller than/) as string });
  });
});

/** A worker that says what a test wants it to. */
class HeldWorker {
  static made: HeldWorker[] = [];
  onmessage: ((event: { readonly data: HeatSaid }) => void) | null = null;
  onerror: ((event: { readonly message: string }) => void) | null = null;
  ended = false;
  constructor() {
    HeldWorker.made.push(this);
  }
  postMessage(): void {}
  terminate(): void {
    this.ended = true;
  }
  says(data: HeatSaid): void {
    act(() => this.onmessage?.({ data }));
  }
  breaks(): void {
    act(() => this.onerror?.({ message: 'out of memory' }));
  }
}

describe('heat that is worked out beside the page', () => {
  const held = (first: HeatAsked | null) => {
    HeldWorker.made = [];
    vi.stubGlobal('Worker', HeldWorker);
    const shown = renderHook(({ of }: { of: HeatAsked | null }) => usePlateHeat(of), { initialProps: { of: first } });
    const worker = () => {
      const last = HeldWorker.made.at(-1);
      if (!last) throw new Error('no worker was made');
      return last;
    };
    return { ...shown, worker };
  };
  const heat: PlateHeat = plateHeatOf();

  it('says how far it is, and is then of the plan', () => {
    const { result, worker } = held(asked());
    expect(result.current.working).toBe(0);
    worker().says({ kind: 'progress', share: 0.4 });
    expect(result.current.working).toBe(0.4);
    worker().says({ kind: 'done', heat });
    expect(result.current).toMatchObject({ heat, old: false, working: null, trouble: null });
    expect(worker().ended).toBe(true);
  });

  it('of a plan that has changed is marked as old until the new one is there', () => {
    const { result, worker, rerender } = held(asked());
    worker().says({ kind: 'done', heat });
    // the new plan's path is not known yet
    rerender({ of: null });
    expect(result.current).toMatchObject({ heat, old: true, working: null });
    rerender({ of: asked({ thickness: 0.025 }) });
    expect(result.current).toMatchObject({ heat, old: true, working: 0 });
    const next = plateHeatOf();
    worker().says({ kind: 'done', heat: next });
    expect(result.current).toMatchObject({ heat: next, old: false });
  });

  it('keeps the last good one, marked as old, when the worker breaks, and can be asked for again', () => {
    const { result, worker, rerender } = held(asked());
    worker().says({ kind: 'done', heat });
    rerender({ of: asked({ thickness: 0.025 }) });
    worker().breaks();
    expect(result.current).toMatchObject({ heat, old: true, working: null });
    expect(result.current.trouble).toMatch(/broke off/);
    act(() => result.current.again());
    expect(result.current).toMatchObject({ trouble: null, working: 0 });
    expect(HeldWorker.made).toHaveLength(3);
  });

  it('stops when told, with its worker, and begins anew when asked', () => {
    const { result, worker } = held(asked());
    const first = worker();
    act(() => result.current.stop());
    expect(first.ended).toBe(true);
    expect(result.current).toMatchObject({ stopped: true, working: null, heat: null });
    act(() => result.current.again());
    expect(result.current.working).toBe(0);
    expect(HeldWorker.made).toHaveLength(2);
  });

  it('ends with the page', () => {
    const { worker, unmount } = held(asked());
    const only = worker();
    unmount();
    expect(only.ended).toBe(true);
  });

  it('runs the worker’s own code where nothing is held', async () => {
    const mine = asked();
    const { result } = renderHook(() => usePlateHeat(mine));
    await waitFor(() => expect(result.current.heat).not.toBeNull());
  });
});
