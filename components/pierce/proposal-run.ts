import { piercePropose, type PierceProposal, type ProposeInput } from '@/strategy/pierce/index.ts';
import type { ProposeSaid } from './propose.worker.ts';

export type ProposalWatch = {
  /** How far it is, 0 to 1. */
  readonly onProgress: (share: number) => void;
  readonly onDone: (proposal: PierceProposal) => void;
  /** It could not be worked out at all. */
  readonly onRefused: (why: string) => void;
};

/** Works out a proposal beside the page, in a worker; the function given back stops it. Without workers it is done in one go. */
export function proposalRun(input: ProposeInput, watch: ProposalWatch): () => void {
  return typeof Worker === 'undefined' ? runHere(input, watch) : runBeside(input, watch);
}

function runBeside(input: ProposeInput, { onProgress, onDone, onRefused }: ProposalWatch): () => void {
  const worker = new Worker(new URL('./propose.worker.ts', import.meta.url));
  const stop = () => worker.terminate();
  worker.onmessage = ({ data }: MessageEvent<ProposeSaid>) => {
    if (data.kind === 'progress') return onProgress(data.share);
    stop();
    if (data.kind === 'done') onDone(data.proposal);
    else onRefused(data.why);
  };
  worker.onerror = (event) => {
    stop();
    onRefused(event.message);
  };
  worker.postMessage(input);
  return stop;
}

function runHere(input: ProposeInput, { onDone, onRefused }: ProposalWatch): () => void {
  // after the page has said that it is at work
  const timer = setTimeout(() => {
    try {
      onDone(piercePropose(input));
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      onRefused(error.message);
    }
  }, 0);
  return () => clearTimeout(timer);
}
