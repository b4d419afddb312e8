import { useEffect, useState } from 'react';
import { heatText } from '@/components/text/heat.ts';
import { heatRun } from './heat-run.ts';
import type { PlateHeat } from './heat-field.ts';
import type { HeatAsked } from './heat.worker.ts';

/** The plate's heat as it stands: what can be shown, and what is going on. */
export type PlateHeatState = {
  /** The last that was worked out; null before the first. */
  readonly heat: PlateHeat | null;
  /** It is not of the plan on the screen. */
  readonly old: boolean;
  /** How far the new one is, 0 to 1; null while none is worked out. */
  readonly working: number | null;
  /** Why there is no new one, as a sentence. */
  readonly trouble: string | null;
  /** Somebody stopped it. */
  readonly stopped: boolean;
  readonly stop: () => void;
  readonly again: () => void;
};

type About<T> = { readonly of: HeatAsked; readonly is: T };

/** Works out the heat of a cut whenever what it follows from has changed; null while that is not known. The last good one stays until the next is there. */
export function usePlateHeat(asked: HeatAsked | null): PlateHeatState {
  const [done, setDone] = useState<About<PlateHeat> | null>(null);
  const [share, setShare] = useState<About<number> | null>(null);
  const [trouble, setTrouble] = useState<About<string> | null>(null);
  const [stopped, setStopped] = useState<HeatAsked | null>(null);
  const isStopped = asked !== null && stopped === asked;
  const isDone = asked !== null && done?.of === asked;
  const why = trouble?.of === asked ? (trouble?.is ?? null) : null;
  const runs = asked !== null && !isStopped && !isDone && why === null;

  useEffect(() => {
    if (!runs || asked === null) return undefined;
    return heatRun(asked, {
      onProgress: (is) => setShare({ of: asked, is }),
      onDone: (is) => setDone({ of: asked, is }),
      onRefused: (is) => setTrouble({ of: asked, is: heatText.refused(is) }),
      onCrash: () => setTrouble({ of: asked, is: heatText.crashed }),
    });
  }, [asked, runs]);

  return {
    heat: done?.is ?? null,
    old: done !== null && !isDone,
    working: runs ? (share?.of === asked ? share.is : 0) : null,
    trouble: why,
    stopped: isStopped,
    stop: () => setStopped(asked),
    again: () => {
      setStopped(null);
      setTrouble(null);
    },
  };
}
