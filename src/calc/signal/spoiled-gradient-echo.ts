/**
 * Signal of an ideally spoiled gradient echo for proton density 1: `sin a (1 - E1) / (1 - E1 cos a) e^(-TE/T2*)`
 * (Ernst & Anderson, Rev Sci Instrum 1966;37:93; Haase, J Magn Reson 1986;67:258). Times in ms, angle in degrees.
 *
 * @example spoiledGradientEchoSignal(8, 3, 10, 1084, 69) //=> 0.054494
 */
export function spoiledGradientEchoSignal(
  repetitionTimeMs: number,
  echoTimeMs: number,
  flipAngleDeg: number,
  t1Ms: number,
  t2StarMs: number,
): number {
  const angle = (flipAngleDeg * Math.PI) / 180;
  const e1 = Math.exp(-repetitionTimeMs / t1Ms);
  return ((Math.sin(angle) * (1 - e1)) / (1 - e1 * Math.cos(angle))) * Math.exp(-echoTimeMs / t2StarMs);
}

/**
 * Angle of most signal in degrees, `arccos e^(-TR/T1)` (Ernst & Anderson 1966).
 *
 * @example ernstAngleDeg(30, 1084) //=> 13.418
 */
export function ernstAngleDeg(repetitionTimeMs: number, t1Ms: number): number {
  return (Math.acos(Math.exp(-repetitionTimeMs / t1Ms)) * 180) / Math.PI;
}
