import fc from 'fast-check';
import type { ClassKey } from '../../../src/calc/classes.js';
import type { TissueSignal } from '../../../src/calc/evaluate.js';
import type { GivenParameters } from '../../../src/calc/series.js';
import { edit, seriesOf } from '../series-of.js';

/** Fixed, so that a failure can be repeated; it stands in the name of every test that draws with it. */
export const seed = 20240517;

/** Relaxation times that the model is given and the propagation uses, ms. */
export interface Relaxation {
  readonly t1Ms: number;
  readonly t2Ms: number;
  readonly t2StarMs: number;
}

/** A number between two, drawn evenly. */
export const within = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/** Relaxation times of soft tissue and fluid, T1 evenly over its logarithm. */
export const relaxations: fc.Arbitrary<Relaxation> = fc
  .tuple(within(Math.log(200), Math.log(4500)), within(0.02, 0.6), within(0.2, 1))
  .map(([logT1, ratio, star]) => ({ t1Ms: Math.exp(logT1), t2Ms: Math.exp(logT1) * ratio, t2StarMs: Math.exp(logT1) * ratio * star }));

/** What the model says of a tissue with these relaxation times. */
export function modelSignal(key: ClassKey, given: GivenParameters, tissue: Relaxation): TissueSignal & { readonly signal: number } {
  const { signals, codes } = edit(seriesOf(key, given, { tissueOverrides: { liver: { ...tissue } } }));
  const target = signals[0] as TissueSignal;
  if (target.signal === null) throw new Error(`no signal: ${codes.join(', ')} for ${JSON.stringify(given)}`);
  return { ...target, signal: target.signal };
}

/** Difference of two signals over the simulated one; near a null over a thousandth of the equilibrium. */
export function deviation(model: number, simulated: number): number {
  return Math.abs(model - Math.abs(simulated)) / Math.max(Math.abs(simulated), 1e-3);
}
