/** Value of a polynomial with coefficients from the constant term upwards. */
function polynomial(x: number, coefficients: readonly number[]): number {
  let value = 0;
  for (let i = coefficients.length - 1; i >= 0; i -= 1) value = value * x + (coefficients[i] as number);
  return value;
}

/** `J1(x) / x` over (x/3)^2 for x up to 3: error under 1.3e-8. */
const small = [0.5, -0.56249985, 0.21093573, -0.03954289, 0.00443319, -0.00031761, 0.00001109];
/** Amplitude times sqrt(x) over 3/x beyond: error under 4e-8. */
const amplitude = [0.79788456, 0.00000156, 0.01659667, 0.00017105, -0.00249511, 0.00113653, -0.00020033];
/** Phase less x over 3/x beyond: error under 9e-8. */
const phase = [-2.35619449, 0.12499612, 0.0000565, -0.00637879, 0.00074348, 0.00079824, -0.00029166];

/**
 * First-order Bessel function of a number from 0 upwards: polynomial to 3, amplitude and phase beyond
 * (Abramowitz & Stegun, Handbook of Mathematical Functions, 1964, 9.4.4 and 9.4.6; coefficients from memory, held against
 * Bessel's integral by a test).
 *
 * @example besselJ1(1.8411838) //=> 0.581865
 */
export function besselJ1(x: number): number {
  if (x <= 3) return x * polynomial((x / 3) ** 2, small);
  const inverse = 3 / x;
  return (polynomial(inverse, amplitude) * Math.cos(x + polynomial(inverse, phase))) / Math.sqrt(x);
}

/**
 * `2 J1(x) / x`, 1 at 0: the Fourier transform of a filled ellipse over its area.
 *
 * @example discTransform(3.8317060) //=> 0
 */
export function discTransform(x: number): number {
  if (x <= 3) return 2 * polynomial((x / 3) ** 2, small);
  return (2 * besselJ1(x)) / x;
}

/**
 * `3 (sin x - x cos x) / x^3`, 1 at 0: the Fourier transform of a filled ellipsoid over its volume
 * (Koay et al., Magn Reson Med 2007;58:430, value from memory; held against numerical integration by a test).
 */
export function ballTransform(x: number): number {
  // The closed form loses its digits where it subtracts nearly equal numbers: its series there.
  if (x < 0.1) return 1 - (x * x) / 10 + x ** 4 / 280;
  return (3 * (Math.sin(x) - x * Math.cos(x))) / x ** 3;
}
