import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { atMost } from '../calc/rounding.js';
import type { Bands } from './bands.js';

/**
 * Side effects that the balanced loss does not weigh, and how far they may grow against the preset before it has to be said: by a quarter
 * (common practice, no source). A way that passes it names it, and a budget chooses such a way only where none without it is as short.
 */
export const sideEffectBands = { chemicalShiftPx: 1.25, distortionPxPer100Hz: 1.25 } as const satisfies Bands;

const keys = Object.keys(sideEffectBands) as (keyof typeof sideEffectBands)[];

type SideEffects = Pick<Figures, keyof typeof sideEffectBands>;

/** Side effects that grow beyond their bound. */
export function grownSideEffects(now: SideEffects, preset: SideEffects): readonly FigureKey[] {
  return keys.filter((figure) => {
    const [to, from] = [now[figure], preset[figure]];
    return to !== null && from !== null && from > 0 && !atMost(to, from * sideEffectBands[figure]);
  });
}

/**
 * What has grown, in one sentence.
 *
 * @example sayGrown(['distortionPxPer100Hz'], now, preset) //=> 'distortion grows from 3.84 to 7.68 px: ...'
 */
export function sayGrown(figures: readonly FigureKey[], now: Figures, preset: Figures): string {
  const parts = figures.map((figure) => {
    const { label, unit, digits } = figureTable[figure];
    return `${label} grows from ${(preset[figure] ?? 0).toFixed(digits)} to ${(now[figure] ?? 0).toFixed(digits)} ${unit}`;
  });
  return `${parts.join(', ')}: the balanced loss does not weigh it`;
}
