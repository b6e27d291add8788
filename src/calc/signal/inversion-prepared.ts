/** Timing of one inversion-prepared cycle; times in ms, angle in degrees. */
export interface InversionPreparedTiming {
  /** The whole cycle. */
  readonly repetitionTimeMs: number;
  readonly inversionTimeMs: number;
  readonly flipAngleDeg: number;
  /** Readouts of the cycle and the one at the centre of k-space, counted from 0. */
  readonly readouts: number;
  readonly centre: number;
  readonly echoSpacingMs: number;
}

/** Time from the inversion to the first readout, and from the last readout to the next inversion, ms. Negative ones do not fit. */
export function inversionPreparedDelaysMs(s: InversionPreparedTiming): { readonly beforeMs: number; readonly afterMs: number } {
  const beforeMs = s.inversionTimeMs - s.centre * s.echoSpacingMs;
  return { beforeMs, afterMs: s.repetitionTimeMs - beforeMs - s.readouts * s.echoSpacingMs };
}

/**
 * Signed signal at the central readout for proton density 1, T2* left aside
 * (Mugler & Brookeman, Magn Reson Med 1990;15:152; Deichmann, NeuroImage 2000;12:112; closed form of the steady state derived here).
 *
 * @example inversionPreparedSignal({ repetitionTimeMs: 2300, inversionTimeMs: 900, flipAngleDeg: 9, readouts: 176, centre: 88, echoSpacingMs: 7 }, 838) //=> 0.046769
 */
export function inversionPreparedSignal(s: InversionPreparedTiming, t1Ms: number, inversionTimeMs = s.inversionTimeMs): number {
  const beforeMs = inversionTimeMs - s.centre * s.echoSpacingMs;
  const afterMs = s.repetitionTimeMs - beforeMs - s.readouts * s.echoSpacingMs;
  const angle = (s.flipAngleDeg * Math.PI) / 180;
  const e = Math.exp(-s.echoSpacingMs / t1Ms);
  const f = e * Math.cos(angle);
  const eBefore = Math.exp(-beforeMs / t1Ms);
  const eAfter = Math.exp(-afterMs / t1Ms);
  const fn = wholePower(f, s.centre);
  const fN = wholePower(f, s.readouts);
  const c = ((1 - e) * (1 - fN)) / (1 - f);
  const steady = (1 + ((1 - eBefore) * fN + c - 1) * eAfter) / (1 + eBefore * fN * eAfter);
  return Math.sin(angle) * ((1 - eBefore - steady * eBefore) * fn + ((1 - e) * (1 - fn)) / (1 - f));
}

/** x to a whole power by repeated squaring: the general power takes several times as long. */
function wholePower(x: number, n: number): number {
  let power = 1;
  let square = x;
  for (let rest = n; rest > 0; rest >>= 1) {
    if ((rest & 1) === 1) power *= square;
    square *= square;
  }
  return power;
}
