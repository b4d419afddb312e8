import { piercePropose, type ProposeInput } from '@/strategy/pierce/index.ts';

/** What the worker says: how far it is, the answer, or why the question cannot be asked. */
export type ProposeSaid =
  | { kind: 'progress'; share: number }
  | { kind: 'done'; proposal: ReturnType<typeof piercePropose> }
  | { kind: 'refused'; why: string };

const say = (said: ProposeSaid) => globalThis.postMessage(said);

globalThis.onmessage = ({ data }: MessageEvent<ProposeInput>) => {
  try {
    say({ kind: 'done', proposal: piercePropose(data, (share) => say({ kind: 'progress', share })) });
  } catch (error) {
    say({ kind: 'refused', why: error instanceof Error ? error.message : String(error) });
  }
};
