import type { ProposeAsked, ProposeSaid } from '@/components/pierce/propose.worker.ts';

/**
 * Stands in for the browser's worker that looks for proposals, since the tests' page has none: the same code, handed copies as a worker
 * is, and answering later. What cannot be copied throws as in a browser.
 */
export class ProposalWorker {
  onmessage: ((event: { readonly data: ProposeSaid }) => void) | null = null;
  onerror: ((event: { readonly message: string }) => void) | null = null;
  private ended = false;

  constructor(address: URL) {
    if (!address.pathname.endsWith('/propose.worker.ts')) throw new Error(`no stand-in for ${address.pathname}`);
  }

  postMessage(asked: ProposeAsked): void {
    const sent = structuredClone(asked);
    void import('@/components/pierce/propose.worker.ts').then(({ proposeAnswer }) => {
      if (this.ended) return;
      proposeAnswer(sent, (said) => {
        if (!this.ended) this.onmessage?.({ data: structuredClone(said) });
      });
    });
  }

  terminate(): void {
    this.ended = true;
  }
}
