/** Proton gyromagnetic ratio over 2 pi, MHz/T (CODATA 2022, free proton: 42.577478461(18)). */
export const gammaBarMhzPerT = 42.577478461;

/** Shift between water and the main fat line, parts per million, at body temperature (common practice, value from memory). */
export const fatShiftPpm = 3.4;

/**
 * Larmor frequency in MHz at a field in tesla: f = gamma-bar x B0.
 *
 * @example larmorMhz(1.5) //=> 63.866217692
 */
export function larmorMhz(fieldT: number): number {
  return gammaBarMhzPerT * fieldT;
}

/**
 * Frequency difference between water and fat in Hz at a field in tesla.
 *
 * @example fatShiftHz(3) //=> 434.290280302
 */
export function fatShiftHz(fieldT: number): number {
  return fatShiftPpm * gammaBarMhzPerT * fieldT;
}
