/** Round values from 0 to at most `most`, no more than `count` of them after the first, a step of 1, 2 or 5 times a power of ten. */
export function niceTicks(most: number, count: number): number[] {
  if (!(most > 0) || !Number.isFinite(most)) return [0];
  const rough = most / Math.max(1, count);
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = power * ([1, 2, 5].find((factor) => factor * power >= rough * (1 - 1e-9)) ?? 10);
  const ticks: number[] = [];
  for (let i = 0; i * step <= most * (1 + 1e-9); i++) ticks.push(Number((i * step).toPrecision(12)));
  return ticks;
}

/** The least round value not below `value`: the top of an axis that starts at 0. */
export function niceCeiling(value: number): number {
  if (!(value > 0) || !Number.isFinite(value)) return 1;
  const power = 10 ** Math.floor(Math.log10(value));
  return power * ([1, 1.5, 2, 3, 4, 5, 6, 8].find((factor) => factor * power >= value * (1 - 1e-9)) ?? 10);
}
