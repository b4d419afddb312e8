/** What test cuts say of some parameters of a model. Plain JSON: whoever fits test cuts makes it. */
export type ParameterFit<Name extends string> = {
  /** Fitted values; the others stay at their defaults. */
  readonly parameters: { readonly [name in Name]?: number };
  /** The fitted ones, in the order of the covariance. */
  readonly names: readonly Name[];
  /**
   * Covariance, row by row and without unit, of u = ln((x − min)/(max − x)) of each: the coordinate in which a parameter that cannot leave
   * its range has no end to run into.
   */
  readonly covariance: readonly (readonly number[])[];
  /** Standard deviations that the interval reaches to either side, as a fit with its degrees of freedom asks for. */
  readonly coverage: number;
};

/** Range of a parameter, in its own unit. */
export type ParameterBounds = { readonly min: number; readonly max: number };

/** A variance this much below nothing is rounding. */
const ROUNDING = 1e-9;

/** Throws RangeError with what is wrong for a fit whose names, values, covariance or coverage don't go together. */
export function mustBeFit<Name extends string>({ parameters, names, covariance, coverage }: ParameterFit<Name>): void {
  if (new Set(names).size !== names.length) throw new RangeError('a fit names a parameter twice');
  const missing = names.find((name) => parameters[name] === undefined);
  if (missing !== undefined) throw new RangeError(`the fit has no value for ${missing}`);
  const square = covariance.length === names.length && covariance.every((row) => row.length === names.length);
  if (!square) throw new RangeError(`covariance is not ${names.length} by ${names.length}`);
  covariance.forEach((row, i) => {
    row.forEach((entry, j) => {
      const across = covariance[j]?.[i] ?? Number.NaN;
      if (!(Math.abs(entry - across) <= 1e-9 * (Math.abs(entry) + Math.abs(across)))) {
        throw new RangeError(`covariance ${entry} and ${across} of ${names[i]} and ${names[j]} differ`);
      }
    });
    if (!((row[i] ?? Number.NaN) >= 0)) throw new RangeError(`variance ${row[i]} of ${names[i]} is negative`);
  });
  if (!(coverage > 0 && coverage <= 100)) throw new RangeError(`coverage ${coverage} is outside (0, 100]`);
}

/** Why a fit that took a parameter to the end of its range says nothing of how sure it is: there its coordinate u has no end. */
export const fitAtEnd = (name: string): string =>
  `The fit took ${name} to the end of its range, so it does not say how sure it is.`;

/** A value, in its own unit, moved by `by` in its coordinate u; unmoved it is the value to the last bit. */
export const movedInRange = (value: number, { min, max }: ParameterBounds, by: number): number =>
  by === 0 ? value : min + (max - min) / (1 + ((max - value) / (value - min)) * Math.exp(-by));

/**
 * The likeliest way, in the coordinates u, to a figure that is off by one standard deviation: C·g/√(gᵀ·C·g) with the figure's slopes g (JCGM 100:2008, 5.1 and 5.2, for the
 * linear form). Null where the fit leaves the figure no freedom. Throws RangeError for a covariance that gives a negative variance.
 */
export function likeliestWay(
  covariance: ParameterFit<string>['covariance'],
  slopes: readonly number[],
): number[] | null {
  const way = covariance.map((row) => row.reduce((sum, entry, i) => sum + entry * (slopes[i] ?? 0), 0));
  const variance = way.reduce((sum, entry, i) => sum + entry * (slopes[i] ?? 0), 0);
  const size = way.reduce((sum, entry, i) => sum + Math.abs(entry * (slopes[i] ?? 0)), 0);
  if (variance < -ROUNDING * size) throw new RangeError(`covariance gives a variance of ${variance}`);
  return variance > 0 ? way.map((entry) => entry / Math.sqrt(variance)) : null;
}
