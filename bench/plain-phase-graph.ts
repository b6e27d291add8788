/** Buffers for 1024 echoes, kept: the yardstick shall not be slow for want of memory. Real and imaginary parts apart. */
const orders = 2050;
const fpRe = new Float64Array(orders);
const fpIm = new Float64Array(orders);
const fmRe = new Float64Array(orders);
const fmIm = new Float64Array(orders);
const zRe = new Float64Array(orders);
const zIm = new Float64Array(orders);

/**
 * Yardstick: one pass of a refocused train through the extended phase graph as the textbooks write it (Weigel, J Magn Reson
 * Imaging 2015;41:266): complex F+, F-, Z for every order filled so far, recovery of Z at order 0, half a spacing of relaxation
 * and dephasing before and after each pulse, no state dropped, no symmetry used. Gives the magnitude of the last echo.
 */
export function plainPhaseGraph(echoes: number, refocusingAngleDeg: number, echoSpacingMs: number, t1Ms: number, t2Ms: number): number {
  const angle = (refocusingAngleDeg * Math.PI) / 180;
  const c2 = Math.cos(angle / 2) ** 2;
  const s2 = Math.sin(angle / 2) ** 2;
  const s = Math.sin(angle);
  const c = Math.cos(angle);
  const e1 = Math.exp(-echoSpacingMs / 2 / t1Ms);
  const e2 = Math.exp(-echoSpacingMs / 2 / t2Ms);

  /** Orders 0 to `filled` - 1 hold something; one more does afterwards. */
  const relaxAndShift = (filled: number) => {
    for (let k = 0; k < filled; k += 1) {
      fpRe[k]! *= e2;
      fpIm[k]! *= e2;
      fmRe[k]! *= e2;
      fmIm[k]! *= e2;
      zRe[k]! *= e1;
      zIm[k]! *= e1;
    }
    zRe[0]! += 1 - e1;
    for (let k = filled; k > 0; k -= 1) {
      fpRe[k] = fpRe[k - 1]!;
      fpIm[k] = fpIm[k - 1]!;
    }
    for (let k = 0; k < filled; k += 1) {
      fmRe[k] = fmRe[k + 1]!;
      fmIm[k] = fmIm[k + 1]!;
    }
    // F+(0) is the conjugate of F-(0).
    fpRe[0] = fmRe[0]!;
    fpIm[0] = -fmIm[0]!;
  };

  // Excited by 90 degrees onto the axis of the refocusing pulses (x).
  for (const state of [fpRe, fpIm, fmRe, fmIm, zRe, zIm]) state.fill(0, 0, 2 * echoes + 2);
  fpRe[0] = 1;
  fmRe[0] = 1;
  for (let echo = 0; echo < echoes; echo += 1) {
    relaxAndShift(2 * echo + 1);
    for (let k = 0; k < 2 * echo + 2; k += 1) {
      const pr = fpRe[k]!;
      const pi = fpIm[k]!;
      const mr = fmRe[k]!;
      const mi = fmIm[k]!;
      const zr = zRe[k]!;
      const zi = zIm[k]!;
      // Pulse about x: F+' = c2 F+ + s2 F- - i s Z; F-' = s2 F+ + c2 F- + i s Z; Z' = -i/2 s F+ + i/2 s F- + c Z.
      fpRe[k] = c2 * pr + s2 * mr + s * zi;
      fpIm[k] = c2 * pi + s2 * mi - s * zr;
      fmRe[k] = s2 * pr + c2 * mr - s * zi;
      fmIm[k] = s2 * pi + c2 * mi + s * zr;
      zRe[k] = 0.5 * s * (pi - mi) + c * zr;
      zIm[k] = 0.5 * s * (mr - pr) + c * zi;
    }
    relaxAndShift(2 * echo + 2);
  }
  return Math.hypot(fpRe[0]!, fpIm[0]!);
}
