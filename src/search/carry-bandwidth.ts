import { classRow } from '../calc/classes.js';
import { fatShiftHz, gammaBarMhzPerT } from '../calc/constants.js';
import { guardedCeil } from '../calc/rounding.js';
import type { CarrySetting } from './carry-setting.js';

/** Bandwidths in Hz per pixel that may be asked for at the new field. */
export interface BandwidthChoice {
  /** Keeps the displacement of fat in pixels; null in echo-planar classes, where fat moves along phase. */
  readonly equalShiftHz: number | null;
  /** Most that the gradients can read at this field of view. */
  readonly mostHz: number;
  /** What is proposed. */
  readonly proposedHz: number;
  readonly limited: boolean;
}

/**
 * Bandwidth for equal chemical shift, `BW x (3.4 ppm gamma-bar B0 new) / (the same at the old field)`, in whole Hz and never less than keeps it;
 * within what the readout gradient gives, `G gamma-bar FOV / matrix`. Where no series may take longer it is never lowered.
 */
export function carriedBandwidth({ series, baseline, to, aim }: CarrySetting): BandwidthChoice {
  const p = series.parameters;
  const mostHz = Math.min(50_000, Math.floor((to.gradientMtPerM * gammaBarMhzPerT * p.fieldOfViewMm) / p.matrixRead));
  if (classRow(baseline.model.key).echoPlanar) {
    return { equalShiftHz: null, mostHz, proposedHz: p.pixelBandwidthHz, limited: false };
  }
  const exact = (p.pixelBandwidthHz * fatShiftHz(to.fieldT)) / fatShiftHz(baseline.model.scanner.fieldT);
  const equalShiftHz = Math.max(5, guardedCeil(exact));
  const wanted = aim === 'time' ? Math.max(p.pixelBandwidthHz, equalShiftHz) : equalShiftHz;
  // A preset that already asks for more than the gradients give is no worse off with its own bandwidth.
  const most = Math.max(mostHz, Math.min(p.pixelBandwidthHz, wanted));
  return { equalShiftHz, mostHz, proposedHz: Math.min(wanted, most), limited: wanted > most };
}
