/** What one case of the bench says, as one line of JSON. */
export type BenchLine = {
  readonly case: string;
  /** Ours and the peer's figure, in `unit`. */
  readonly ours: number;
  readonly peer: number;
  readonly unit: string;
  /** Above 1 ours is the better one. */
  readonly ratio: number;
  /** Relative errors of ours; null where a case has none. */
  readonly errorMean: number | null;
  readonly errorMax: number | null;
  /** How the work grows with size; null where a case has one size. */
  readonly exponent: number | null;
};

export function sayLine(line: BenchLine): void {
  console.log(JSON.stringify(line));
}

/** Numbers in [0, 1) that are the same in each run (mulberry32). */
export function seededNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

/** Time of one call, ms: the median of some rounds after a warm-up. What `work` returns is added up, so that it is done. */
export function timeOf(
  work: () => number,
  { warmUp, rounds, calls }: { warmUp: number; rounds: number; calls: number },
): number {
  let used = 0;
  for (let i = 0; i < warmUp; i++) used += work();
  const times: number[] = [];
  for (let round = 0; round < rounds; round++) {
    const start = performance.now();
    for (let i = 0; i < calls; i++) used += work();
    times.push((performance.now() - start) / calls);
  }
  if (!Number.isFinite(used)) throw new Error('the work came to no number');
  times.sort((a, b) => a - b);
  return times[Math.floor(times.length / 2)] ?? Number.NaN;
}
