/**
 * Extended phase graph of a refocused train (Hennig, J Magn Reson 1988;78:397; Weigel, J Magn Reson Imaging 2015;41:266).
 *
 * One unit of dephasing is half an echo spacing; refocusing pulses are about the axis of the excited magnetisation (CPMG).
 * A pulse mixes F(k), F*(-k) and Z(k); from one pulse to the next F moves up by two orders.
 * Magnetisation excited at the start sits at odd orders whenever a pulse is played, and at order 0 at the echoes.
 * What recovers, or was never excited, sits at even orders then and at odd ones at every echo: it never reaches the echo axis,
 * and matters only for the longitudinal magnetisation at the end. So the two are followed apart, each with the orders it can use.
 */

/** Buffers shared by all passes: nothing is allocated per echo. They grow to the longest train seen. */
let room = 0;
let up = new Float64Array(0);
let down = new Float64Array(0);
let along = new Float64Array(0);

function reserve(orders: number): void {
  if (orders <= room) return;
  room = Math.max(64, orders * 2);
  up = new Float64Array(room);
  down = new Float64Array(room);
  along = new Float64Array(room);
}

/** Angle and decays of one train; times in ms. */
export interface TrainPhysics {
  readonly refocusingAngleDeg: number;
  readonly echoSpacingMs: number;
  readonly t1Ms: number;
  readonly t2Ms: number;
}

/**
 * Amplitude of echo `echo` (counted from 1) of a unit of transverse magnetisation excited half a spacing before the first pulse.
 * Orders that can no longer come back to the axis by that echo are dropped.
 *
 * @example echoAmplitude({ refocusingAngleDeg: 120, echoSpacingMs: 10, t1Ms: 1e12, t2Ms: 1e12 }, 1) //=> 0.75
 */
export function echoAmplitude(train: TrainPhysics, echo: number): number {
  const angle = (train.refocusingAngleDeg * Math.PI) / 180;
  const cosine = Math.cos(angle);
  const sine = Math.sin(angle);
  const kept = (1 + cosine) / 2; // cos^2(a/2)
  const turned = (1 - cosine) / 2; // sin^2(a/2)
  const stored = sine / 2;
  const e1 = Math.exp(-train.echoSpacingMs / train.t1Ms);
  const e2 = Math.exp(-train.echoSpacingMs / train.t2Ms);
  const halfE2 = Math.sqrt(e2);
  reserve(echo + 2);
  // Index j holds order 2 j + 1 when a pulse is played.
  up[0] = halfE2;
  down[0] = 0;
  along[0] = 0;
  for (let n = 1; n < echo; n += 1) {
    // After pulse n order k needs k half-spacings to the axis, and echo `echo` lies 2 (echo - n) + 1 of them away.
    const filled = Math.min(n, echo - n + 1);
    for (let j = 0; j < filled; j += 1) {
      const f = up[j] as number;
      const g = down[j] as number;
      const z = along[j] as number;
      up[j] = kept * f + turned * g + sine * z;
      down[j] = turned * f + kept * g - sine * z;
      along[j] = stored * (g - f) + cosine * z;
    }
    const next = Math.min(n + 1, echo - n);
    // F(-1) crosses the axis (that is the echo) and comes out at F(+1).
    const crossing = (down[0] as number) * e2;
    for (let j = next - 1; j >= 1; j -= 1) up[j] = (up[j - 1] as number) * e2;
    up[0] = crossing;
    for (let j = 0; j < next; j += 1) {
      down[j] = j + 1 < filled ? (down[j + 1] as number) * e2 : 0;
      along[j] = j < filled ? (along[j] as number) * e1 : 0;
    }
  }
  // The last pulse: only what it turns into F(-1) reaches the echo, half a spacing later.
  return (turned * (up[0] as number) + kept * (down[0] as number) - sine * (along[0] as number)) * halfE2;
}

/**
 * Longitudinal magnetisation at the end of a train of `echoes` spacings that begins with `start` of it (equilibrium is 1).
 * The transverse magnetisation of the excitation has no part in it.
 *
 * @example longitudinalAfterTrain({ refocusingAngleDeg: 180, echoSpacingMs: 10, t1Ms: 10, t2Ms: 5 }, 1, 0) //=> (1 - e^-0.5)^2
 */
export function longitudinalAfterTrain(train: TrainPhysics, echoes: number, start: number): number {
  const angle = (train.refocusingAngleDeg * Math.PI) / 180;
  const cosine = Math.cos(angle);
  const sine = Math.sin(angle);
  const kept = (1 + cosine) / 2;
  const turned = (1 - cosine) / 2;
  const stored = sine / 2;
  const e1 = Math.exp(-train.echoSpacingMs / train.t1Ms);
  const e2 = Math.exp(-train.echoSpacingMs / train.t2Ms);
  const halfE1 = Math.sqrt(e1);
  reserve(echoes + 2);
  // Index j holds order 2 j when a pulse is played. Recovered magnetisation comes out of a pulse a quarter turn from the
  // excited one: its F are imaginary where those are real, which turns the sign of the sine, and F*(-0) is -F(0).
  up[0] = 0;
  along[0] = start * halfE1 + 1 - halfE1;
  for (let n = 1; n < echoes; n += 1) {
    const filled = Math.min(n, echoes - n + 1);
    const axis = up[0] as number;
    up[0] = cosine * axis - sine * (along[0] as number);
    along[0] = sine * axis + cosine * (along[0] as number);
    for (let j = 1; j < filled; j += 1) {
      const f = up[j] as number;
      const g = down[j] as number;
      const z = along[j] as number;
      up[j] = kept * f + turned * g - sine * z;
      down[j] = turned * f + kept * g + sine * z;
      along[j] = stored * (f - g) + cosine * z;
    }
    const next = Math.min(n + 1, echoes - n);
    const crossing = filled > 1 ? -(down[1] as number) * e2 : 0;
    for (let j = next - 1; j >= 1; j -= 1) up[j] = (up[j - 1] as number) * e2;
    up[0] = crossing;
    along[0] = (along[0] as number) * e1 + 1 - e1;
    for (let j = 1; j < next; j += 1) {
      down[j] = j + 1 < filled ? (down[j + 1] as number) * e2 : 0;
      along[j] = j < filled ? (along[j] as number) * e1 : 0;
    }
  }
  return (sine * (up[0] as number) + cosine * (along[0] as number)) * halfE1 + 1 - halfE1;
}
