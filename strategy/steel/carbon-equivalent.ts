/** Ladle or product analysis, mass per cent, as a certificate prints it. What is not listed counts as none. */
export type SteelAnalysis = {
  readonly carbon: number;
  readonly manganese?: number;
  readonly chromium?: number;
  readonly molybdenum?: number;
  readonly vanadium?: number;
  readonly nickel?: number;
  readonly copper?: number;
};

/**
 * Carbon equivalent CEV, mass per cent: C + Mn/6 + (Cr + Mo + V)/5 + (Ni + Cu)/15. IIW; EN 10025-1, 7.2.3.
 * RangeError when a content is not within 0…100 %.
 */
export function carbonEquivalentCev(analysis: SteelAnalysis): number {
  const { c, mn, cr, mo, v, ni, cu } = contents(analysis);
  return c + mn / 6 + (cr + mo + v) / 5 + (ni + cu) / 15;
}

/**
 * Carbon equivalent CET, mass per cent: C + (Mn + Mo)/10 + (Cr + Cu)/20 + Ni/40. EN 1011-2, C.3 (from memory).
 * RangeError when a content is not within 0…100 %.
 */
export function carbonEquivalentCet(analysis: SteelAnalysis): number {
  const { c, mn, cr, mo, ni, cu } = contents(analysis);
  return c + (mn + mo) / 10 + (cr + cu) / 20 + ni / 40;
}

function contents(analysis: SteelAnalysis) {
  return {
    c: content('carbon', analysis.carbon),
    mn: content('manganese', analysis.manganese),
    cr: content('chromium', analysis.chromium),
    mo: content('molybdenum', analysis.molybdenum),
    v: content('vanadium', analysis.vanadium),
    ni: content('nickel', analysis.nickel),
    cu: content('copper', analysis.copper),
  };
}

function content(name: string, percent = 0): number {
  if (!(percent >= 0 && percent <= 100)) throw new RangeError(`${name} ${percent} % is outside [0, 100] %`);
  return percent;
}
