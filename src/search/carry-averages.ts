import { guardedCeil } from '../calc/rounding.js';
import type { Parameters } from '../calc/series.js';
import type { AveragesCarry } from './carry.js';
import { digits } from './carry-words.js';

/** What an evaluation with other averages says. */
export type WithAverages = (averages: number) => { readonly snr: number | null; readonly scanTimeS: number | null };

/** Averages of the highest b-value, or of the series. */
function averagesOf(p: Parameters): number {
  return p.diffusion === undefined ? p.averages : 1;
}

/**
 * Averages that give the preset's SNR, `averages / (SNR / SNR of the preset)^2` (SNR grows with the square root of averages; Macovski, MRM
 * 1996;36:494), and what the whole numbers on either side of them give.
 */
export function carriedAverages(p: Parameters, snr: number | null, withAverages: WithAverages): AveragesCarry {
  if (snr === null || snr <= 0) return { snr, factor: null, choices: [], words: 'SNR is not known here, so averages are left as they are' };
  const factor = 1 / snr ** 2;
  const equal = averagesOf(p) * factor;
  const said = `SNR x${digits(snr, 2)} at the preset's averages`;
  if (p.diffusion !== undefined) {
    return { snr, factor, choices: [], words: `${said}: equal SNR takes x${digits(factor, 2)} of the averages of each b-value` };
  }
  const around = [...new Set([Math.max(1, Math.floor(equal + 1e-9)), Math.max(1, guardedCeil(equal)), p.averages])].sort((a, b) => a - b);
  const choices = around.flatMap((averages) => {
    const { snr: at, scanTimeS } = withAverages(averages);
    return at === null || scanTimeS === null ? [] : [{ averages, snr: at, scanTimeS }];
  });
  const list = choices.map((choice) => `${digits(choice.averages, 1)} gives x${digits(choice.snr, 2)} in ${digits(choice.scanTimeS, 1)} s`);
  return { snr, factor, choices, words: `${said}: equal SNR takes ${digits(equal, 2)} averages; ${list.join(', ')}` };
}

/** Averages for at least the preset's SNR: the next whole number, never under one; a fraction stays where the preset has one. */
export function averagesForEqualSnr(p: Parameters, factor: number): Pick<Parameters, 'averages' | 'diffusion'> {
  if (p.diffusion !== undefined) {
    const averages = p.diffusion.averages.map((count) => Math.min(256, Math.max(1, guardedCeil(count * factor))));
    return { averages: p.averages, diffusion: { ...p.diffusion, averages } };
  }
  const equal = p.averages * factor;
  const step = Number.isInteger(p.averages) ? 1 : 0.1;
  const averages = Math.min(256, Math.max(Math.min(1, p.averages), Number((guardedCeil(equal / step) * step).toFixed(6))));
  return { averages, diffusion: undefined };
}
