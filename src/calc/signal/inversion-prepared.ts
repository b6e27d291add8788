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
export function inversionPreparedSignal(s: InversionPreparedTiming, t1Ms: number): number {
  return signalAfterInversion(s, t1Ms, readoutsOf(s, t1Ms), s.inversionTimeMs);
}

/** What the readouts of a cycle do to longitudinal magnetisation, whenever they begin. */
export interface Readouts {
  readonly sine: number;
  /** What is left of M by all readouts, and by those before the centre. */
  readonly keptByAll: number;
  readonly keptByCentre: number;
  /** What recovers meanwhile. */
  readonly gainedByAll: number;
  readonly gainedByCentre: number;
}

/** The readouts of a cycle for one T1. */
export function readoutsOf(s: InversionPreparedTiming, t1Ms: number): Readouts {
  const angle = (s.flipAngleDeg * Math.PI) / 180;
  const e = Math.exp(-s.echoSpacingMs / t1Ms);
  const f = e * Math.cos(angle);
  // One logarithm and two exponentials are quicker than two powers; beyond 90 degrees each readout turns M over.
  const decay = Math.log(f);
  const keptByAll = f > 0 ? Math.exp(s.readouts * decay) : wholePower(f, s.readouts);
  const keptByCentre = f > 0 ? Math.exp(s.centre * decay) : wholePower(f, s.centre);
  const share = (1 - e) / (1 - f);
  return {
    sine: Math.sin(angle),
    keptByAll,
    keptByCentre,
    gainedByAll: share * (1 - keptByAll),
    gainedByCentre: share * (1 - keptByCentre),
  };
}

/** The same signal with the inversion `inversionTimeMs` before the centre. */
export function signalAfterInversion(s: InversionPreparedTiming, t1Ms: number, readouts: Readouts, inversionTimeMs: number): number {
  const beforeMs = inversionTimeMs - s.centre * s.echoSpacingMs;
  const afterMs = s.repetitionTimeMs - beforeMs - s.readouts * s.echoSpacingMs;
  const eBefore = Math.exp(-beforeMs / t1Ms);
  const eAfter = Math.exp(-afterMs / t1Ms);
  const { sine, keptByAll, keptByCentre, gainedByAll, gainedByCentre } = readouts;
  const steady = (1 + ((1 - eBefore) * keptByAll + gainedByAll - 1) * eAfter) / (1 + eBefore * keptByAll * eAfter);
  return sine * ((1 - eBefore - steady * eBefore) * keptByCentre + gainedByCentre);
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
