/**
 * Idempotency keys of requests that have no definite answer yet. The same content sent again after a lost connection is the
 * same attempt and takes the same key, so that it happens once; after a definite answer the next one is a new attempt.
 */
export class Attempts {
  readonly #open = new Map<string, string>();
  readonly #newKey: () => string;

  constructor(newKey: () => string) {
    this.#newKey = newKey;
  }

  /** The key of this attempt. */
  keyFor(fingerprint: string): string {
    const open = this.#open.get(fingerprint);
    if (open !== undefined) return open;
    const key = this.#newKey();
    this.#open.set(fingerprint, key);
    return key;
  }

  /** A definite answer has come. */
  settle(fingerprint: string): void {
    this.#open.delete(fingerprint);
  }
}
