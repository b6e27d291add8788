/**
 * Signal of a balanced steady state on resonance for proton density 1:
 * `sin a (1 - E1) / (1 - (E1 - E2) cos a - E1 E2) e^(-TE/T2)` (Freeman & Hill, J Magn Reson 1971;4:366;
 * Scheffler & Lehnhardt, Eur Radiol 2003;13:2409). Times in ms, angle in degrees.
 *
 * @example balancedSignal(4, 2, 40, 1932, 275) //=> 0.188515
 */
export function balancedSignal(repetitionTimeMs: number, echoTimeMs: number, flipAngleDeg: number, t1Ms: number, t2Ms: number): number {
  const angle = (flipAngleDeg * Math.PI) / 180;
  const e1 = Math.exp(-repetitionTimeMs / t1Ms);
  const e2 = Math.exp(-repetitionTimeMs / t2Ms);
  return ((Math.sin(angle) * (1 - e1)) / (1 - (e1 - e2) * Math.cos(angle) - e1 * e2)) * Math.exp(-echoTimeMs / t2Ms);
}
