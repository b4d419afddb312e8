/** The code of each of the product's workers: answers what it is asked, as often as it likes. */
const answers: Readonly<Record<string, () => Promise<(asked: never, say: (said: unknown) => void) => void>>> = {
  'propose.worker.ts': async () => (await import('@/components/pierce/propose.worker.ts')).proposeAnswer,
  'heat.worker.ts': async () => (await import('@/components/corners/heat.worker.ts')).heatAnswer,
};

/**
 * Stands in for the browser's workers, since the tests' page has none: the same code, handed copies as a worker is, and answering later. What
 * cannot be copied throws as in a browser.
 */
export class PageWorker {
  onmessage: ((event: { readonly data: unknown }) => void) | null = null;
  onerror: ((event: { readonly message: string }) => void) | null = null;
  private ended = false;
  private readonly answer: () => Promise<(asked: never, say: (said: unknown) => void) => void>;

  constructor(address: URL) {
    const answer = answers[address.pathname.split('/').at(-1) ?? ''];
    if (!answer) throw new Error(`no stand-in for ${address.pathname}`);
    this.answer = answer;
  }

  postMessage(asked: unknown): void {
    const sent = structuredClone(asked);
    void this.answer().then((answer) => {
      if (this.ended) return;
      // each worker's own code knows what its page asks
      answer(sent as never, (said) => {
        if (!this.ended) this.onmessage?.({ data: structuredClone(said) });
      });
    });
  }

  terminate(): void {
    this.ended = true;
  }
}
