import type { HeatAsked, HeatSaid } from './heat.worker.ts';
import type { PlateHeat } from './heat-field.ts';

export type HeatWatch = {
  /** How far it is, 0 to 1. */
  readonly onProgress: (share: number) => void;
  readonly onDone: (heat: PlateHeat) => void;
  /** The question has no answer; the sentence is the model's. */
  readonly onRefused: (why: string) => void;
  /** The worker itself broke. */
  readonly onCrash: () => void;
};

/** Works out a plate's heat beside the page, in a worker; the function given back stops it. */
export function heatRun(asked: HeatAsked, { onProgress, onDone, onRefused, onCrash }: HeatWatch): () => void {
  const worker = new Worker(new URL('./heat.worker.ts', import.meta.url));
  const stop = () => worker.terminate();
  worker.onmessage = ({ data }: MessageEvent<HeatSaid>) => {
    if (data.kind === 'progress') return onProgress(data.share);
    stop();
    if (data.kind === 'done') onDone(data.heat);
    else onRefused(data.why);
  };
  worker.onerror = () => {
    stop();
    onCrash();
  };
  worker.postMessage(asked);
  return stop;
}
