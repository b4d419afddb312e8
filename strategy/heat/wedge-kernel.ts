import { besselIScaled } from './special-functions.ts';

/** Steps of the trapezoid rule over the diffracted part, and its reach in widths of the bell exp(−zu²/2). */
const STEP = 0.9;
const REACH = 5.8;

/** So near to grazing the tip an image counts half and nothing is diffracted, rad. */
const GRAZING = 1e-9;

/** Below this argument, more for a sharp wedge, the series of Bessel functions needs few terms. */
const SMALL = 0.6;

/**
 * How a wedge of angle `angle` rad with insulated edges changes what a line source in it gives, dimensionless: the rise is
 * Q′/(4πkt)·e^(−(r² + rs²)/4αt)·`value`·e^z with z = r·rs/2αt, at `r`, `theta` from a source at `rs`, `source`; this is `value`. Equal to
 * the series of Bessel functions (Carslaw and Jaeger, ch. 14), evaluated as the sources that are seen directly or as images, and what is diffracted at
 * the tip as an integral (Carslaw, Proc. London Math. Soc. (2) 18 (1919) 291, from memory): about twenty exponentials for any angle up to 2π and any z.
 */
export function wedgeKernelScaled(angle: number, theta: number, source: number, z: number): number {
  const order = Math.PI / angle;
  return oneSided(order, theta - source, z) + oneSided(order, theta + source, z);
}

/**
 * The same for a place on the bisector and a source on an edge, with the straight way between them counted: the rise is Q′/(4πkt)·e^(−d²/4αt) times this,
 * dimensionless: 2π/β for small z, about 2 for large.
 */
export const bisectorKernel = (angle: number, z: number): number =>
  2 * oneSided(Math.PI / angle, angle / 2, z) * Math.exp(2 * z * Math.sin(angle / 4) ** 2);

/** ν·[I₀(z) + 2ΣI_mν(z)·cos(mνφ)]·e^(−z) for ν = π/β. */
function oneSided(order: number, phi: number, z: number): number {
  if (z < Math.max(SMALL, (order * order) / 40)) return smallSeries(order, phi, z);
  const period = (2 * Math.PI) / order; // 2β
  let seen = 0;
  const first = Math.ceil((-Math.PI - phi) / period - 1e-9);
  for (let k = first; phi + k * period <= Math.PI + 1e-9; k++) {
    const turn = phi + k * period;
    const weight = order * Math.abs(Math.PI - Math.abs(turn)) < GRAZING ? 0.5 : 1;
    const half = Math.sin(turn / 2);
    seen += weight * Math.exp(-2 * z * half * half);
  }
  const angles = [reduced(order * (Math.PI + phi)), reduced(order * (Math.PI - phi))] as const;
  return (
    seen -
    (order / (2 * Math.PI)) * Math.exp(-2 * z) * (diffracted(order, angles[0], z) + diffracted(order, angles[1], z))
  );
}

/** An angle brought into (−π, π]. */
const reduced = (x: number): number => x - 2 * Math.PI * Math.round(x / (2 * Math.PI));

/**
 * ∫₀^∞ e^(−z(cosh y − 1))·sin x/(cosh νy − cos x) dy. With u = 2 sinh(y/2) the exponential is the bell e^(−zu²/2); the pole nearest to the path, at
 * u = ±i·2 sin(x/2ν), is taken off and integrated by the complementary error function, so that the trapezoid rule meets a smooth rest.
 */
function diffracted(order: number, x: number, z: number): number {
  if (Math.abs(x) < GRAZING) return 0;
  const sine = Math.sin(x);
  const halfSine = Math.sin(x / 2);
  const width = 1 / Math.sqrt(z);
  // the poles left over lie 2π/ν and more off the path, the branch points of sinh⁻¹ 2
  const step = Math.min(STEP * width, 0.75, 1.6 / order);
  const reach = REACH * width;
  const near = poleAt(Math.abs(x), order);
  const far = poleAt(2 * Math.PI - Math.abs(x), order);
  const weight = (2 / order) * Math.sign(x);
  let sum = 0;
  for (let i = 0; i * step <= reach; i++) {
    const u = i * step;
    const s = Math.sinh(order * Math.asinh(u / 2));
    const whole = sine / (2 * (s * s + halfSine * halfSine)) / Math.sqrt(1 + (u * u) / 4);
    const poles = weight * (lorentz(near, u) - lorentz(far, u));
    sum += (i === 0 ? 0.5 : 1) * Math.exp((-z * u * u) / 2) * (whole - poles);
  }
  // ∫₀^∞ e^(−zu²/2)/(u² + a²) du = π/(2a)·e^(za²/2)·erfc(a√(z/2))
  const atPole = (a: number) => (a > 0 ? (Math.PI / 2) * erfcScaled(a * Math.sqrt(z / 2)) : 0);
  return step * sum + weight * (atPole(near) - atPole(far));
}

/** a/(u² + a²), or nothing for a pole that is left where it is. */
const lorentz = (a: number, u: number): number => (a > 0 ? a / (u * u + a * a) : 0);

/** Place of a pole on the imaginary axis of u = 2 sinh(y/2), for the angle it stands for; 0 for one so far off that it does not matter. */
const poleAt = (x: number, order: number): number => (x < Math.PI * order ? 2 * Math.sin(x / (2 * order)) : 0);

/** e^(x²)·erfc(x) for x ≥ 0, relative error below 1.2e-7: W. J. Cody's kind of fit in the form of Numerical Recipes, from memory. */
function erfcScaled(x: number): number {
  const t = 1 / (1 + x / 2);
  const c = [
    -1.26551223, 1.00002368, 0.37409196, 0.09678418, -0.18628806, 0.27886807, -1.13520398, 1.48851587, -0.82215223,
    0.17087277,
  ];
  let p = 0;
  for (let i = c.length - 1; i >= 0; i--) p = p * t + (c[i] ?? 0);
  return t * Math.exp(p);
}

function smallSeries(order: number, phi: number, z: number): number {
  let sum = besselIScaled(0, z);
  for (let m = 1; m < 60; m++) {
    const bessel = besselIScaled(m * order, z);
    sum += 2 * bessel * Math.cos(m * order * phi);
    if (bessel < 1e-9) break;
  }
  return order * sum;
}
