import type { PierceProposal } from '@/strategy/pierce/index.ts';
import type { ProposeAsked, ProposeSaid } from './propose.worker.ts';

export type ProposalWatch = {
  /** How far it is, 0 to 1. */
  readonly onProgress: (share: number) => void;
  readonly onDone: (proposal: PierceProposal) => void;
  /** It could not be worked out at all. */
  readonly onRefused: (why: string) => void;
};

/** Works out a proposal beside the page, in a worker, where the reader of house rules is at hand; the function given back stops it. */
export function proposalRun(asked: ProposeAsked, { onProgress, onDone, onRefused }: ProposalWatch): () => void {
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
  worker.postMessage(asked);
  return stop;
}
