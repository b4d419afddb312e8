import { useEffect, useRef, useState } from 'react';
import type { PierceProposal } from '@/strategy/pierce/index.ts';
import { proposalRun } from './proposal-run.ts';
import type { ProposeAsked } from './propose.worker.ts';

export type ProposalState =
  | { readonly kind: 'idle' }
  | { readonly kind: 'working'; readonly share: number }
  | { readonly kind: 'refused'; readonly why: string }
  | {
      readonly kind: 'answered';
      readonly proposal: Exclude<PierceProposal, { kind: 'stopped' }>;
      readonly asked: ProposeAsked;
    };

/** The designer's search as state: begin it, stop it, put its answer away. It stops when the page is left. */
export function useProposal() {
  const [state, setState] = useState<ProposalState>({ kind: 'idle' });
  const stop = useRef<(() => void) | null>(null);
  useEffect(() => () => stop.current?.(), []);
  const clear = () => {
    stop.current?.();
    stop.current = null;
    setState({ kind: 'idle' });
  };
  /** `then` is handed the answer in the moment it comes. */
  const begin = (asked: ProposeAsked, then?: (proposal: PierceProposal) => void) => {
    stop.current?.();
    setState({ kind: 'working', share: 0 });
    stop.current = proposalRun(asked, {
      onProgress: (share) => setState({ kind: 'working', share }),
      onDone: (proposal) => {
        setState(proposal.kind === 'stopped' ? { kind: 'idle' } : { kind: 'answered', proposal, asked });
        then?.(proposal);
      },
      onRefused: (why) => setState({ kind: 'refused', why }),
    });
  };
  return { state, begin, clear };
}
