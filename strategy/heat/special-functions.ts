/**
 * Modified Bessel function K₀(x) for x > 0, dimensionless, to about 1e-14 relative: the integral ∫₀^∞ exp(−x cosh t) dt by the trapezoid rule,
 * which converges faster than any power of the step here (Abramowitz and Stegun 9.6.24). Throws RangeError for x ≤ 0.
 */
export function besselK0(x: number): number {
  return Math.exp(-x) * besselK0Scaled(x);
}

/** exp(x)·K₀(x): stays finite where K₀ itself underflows. */
export function besselK0Scaled(x: number): number {
  if (!(x > 0)) throw new RangeError(`K0 of ${x} is outside (0, ∞)`);
  if (x === Infinity) return 0;
  const reach = Math.acosh(1 + 40 / x);
  // the integrand's singularities lie π/2 off the axis; for large x it is a bell of width 1/√x
  const step = Math.min(0.1, 0.35 / Math.sqrt(x));
  let sum = 0.5;
  for (let t = step; t < reach; t += step) sum += Math.exp(-2 * x * Math.sinh(t / 2) ** 2);
  return sum * step;
}

const eulerGamma = 0.57721566490153286;

/**
 * Exponential integral E₁(x) = ∫ₓ^∞ e^(−u)/u du for x > 0, dimensionless: the power series up to 1, the continued fraction above (Abramowitz and
 * Stegun 5.1.11 and 5.1.22). Throws RangeError for x ≤ 0.
 */
export function exponentialIntegral(x: number): number {
  if (!(x > 0)) throw new RangeError(`E1 of ${x} is outside (0, ∞)`);
  if (x <= 1) {
    let sum = -eulerGamma - Math.log(x);
    let term = 1;
    for (let n = 1; n < 40; n++) {
      term *= -x / n;
      sum -= term / n;
    }
    return sum;
  }
  // Lentz's method on 1/(x+1 − 1/(x+3 − 4/(x+5 − …)))
  let b = x + 1;
  let c = Infinity;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < 500; n++) {
    const a = -n * n;
    b += 2;
    d = 1 / (a * d + b);
    c = b + a / c;
    const factor = c * d;
    h *= factor;
    if (Math.abs(factor - 1) < 1e-16) break;
  }
  return h * Math.exp(-x);
}

/** Complementary error function, dimensionless: series below 2.5, continued fraction above (Abramowitz and Stegun 7.1.6, 7.1.14). */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x < 2.5) {
    // erf = 2/√π e^(−x²) Σ 2ⁿ x^(2n+1)/(1·3·…·(2n+1)): all terms positive, so nothing cancels
    let term = x;
    let sum = x;
    for (let n = 1; n < 80; n++) {
      term *= (2 * x * x) / (2 * n + 1);
      sum += term;
      if (term < sum * 1e-17) break;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  let fraction = 0;
  for (let n = 80; n >= 1; n--) fraction = n / 2 / (x + fraction);
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / (x + fraction);
}

// Coefficients of Lanczos' approximation for g = 7, nine terms (C. Lanczos, SIAM J. Numer. Anal. B 1 (1964) 86), from memory
const lanczos = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];

/** ln Γ(x) for x > 0, to about 1e-14. */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`ln Γ of ${x} is outside (0, ∞)`);
  const y = x - 1;
  let sum = lanczos[0] ?? 1;
  for (let i = 1; i < lanczos.length; i++) sum += (lanczos[i] ?? 0) / (y + i);
  const t = y + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (y + 0.5) * Math.log(t) - t + Math.log(sum);
}

/**
 * exp(−z)·I_ν(z), dimensionless, for real ν ≥ 0 and z ≥ 0: the power series (Abramowitz and Stegun 9.6.10), all of whose terms are positive,
 * summed outwards from its largest term, which is found in logarithms.
 */
export function besselIScaled(order: number, z: number): number {
  if (!(order >= 0 && z >= 0)) throw new RangeError(`I of order ${order} at ${z}: both must be at least 0`);
  if (z === 0) return order === 0 ? 1 : 0;
  const quarter = (z * z) / 4;
  const top = Math.max(0, Math.floor((-order + Math.sqrt(order * order + z * z)) / 2));
  const largest = Math.exp((2 * top + order) * Math.log(z / 2) - logGamma(top + 1) - logGamma(top + order + 1) - z);
  if (largest === 0) return 0;
  let sum = 1;
  let term = 1;
  for (let k = top + 1; term > 1e-17 * sum; k++) {
    term *= quarter / (k * (k + order));
    sum += term;
  }
  term = 1;
  for (let k = top; k >= 1 && term > 1e-17 * sum; k--) {
    term *= (k * (k + order)) / quarter;
    sum += term;
  }
  return largest * sum;
}
