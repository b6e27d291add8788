import { classRow } from '../calc/classes.js';
import { fatShiftHz, gammaBarMhzPerT } from '../calc/constants.js';
import { guardedCeil } from '../calc/rounding.js';
import { type CarrySetting, settle } from './carry-setting.js';

/** Bandwidths in Hz per pixel that may be asked for at the new field. */
export interface BandwidthChoice {
  /** Keeps the displacement of fat in pixels; null in echo-planar classes, where fat moves along phase. */
  readonly equalShiftHz: number | null;
  /** Most that the gradients can read at this field of view. */
  readonly mostHz: number;
  /** What is proposed. */
  readonly proposedHz: number;
  /** Why that is not the one of equal shift. */
  readonly because: 'gradients' | 'time' | 'train' | null;
}

/** A TE that sets contrast may move by this share when its whole echo moves. */
const echoShare = 0.05;

/**
 * Bandwidth for equal chemical shift, `BW x (3.4 ppm gamma-bar B0 new) / (the same at the old field)`, in whole Hz and never less than keeps it;
 * within what the readout gradient gives, `G gamma-bar FOV / matrix`. It is lowered only as far as the slower readout lets TE stay within 5 %
 * and asks for no further split; where no series may take longer it is never lowered.
 */
export function carriedBandwidth(setting: CarrySetting): BandwidthChoice {
  const { series, baseline, to, aim } = setting;
  const p = series.parameters;
  const mostHz = Math.min(50_000, Math.floor((to.gradientMtPerM * gammaBarMhzPerT * p.fieldOfViewMm) / p.matrixRead));
  if (classRow(baseline.model.key).echoPlanar) return { equalShiftHz: null, mostHz, proposedHz: p.pixelBandwidthHz, because: null };
  const exact = (p.pixelBandwidthHz * fatShiftHz(to.fieldT)) / fatShiftHz(baseline.model.scanner.fieldT);
  const equalShiftHz = Math.max(5, guardedCeil(exact));
  if (equalShiftHz >= p.pixelBandwidthHz) {
    // A preset that already asks for more than the gradients give is no worse off with its own bandwidth.
    const proposedHz = Math.min(equalShiftHz, Math.max(mostHz, p.pixelBandwidthHz));
    return { equalShiftHz, mostHz, proposedHz, because: proposedHz < equalShiftHz ? 'gradients' : null };
  }
  if (aim === 'time') return { equalShiftHz, mostHz, proposedHz: p.pixelBandwidthHz, because: 'time' };
  if (aim === 'shift' || fits(setting, equalShiftHz)) return { equalShiftHz, mostHz, proposedHz: equalShiftHz, because: null };
  let [low, high] = [equalShiftHz, p.pixelBandwidthHz];
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (fits(setting, middle)) high = middle;
    else low = middle;
  }
  return { equalShiftHz, mostHz, proposedHz: high, because: 'train' };
}

/** True where the slower readout leaves the timing possible, and neither splits the slices further nor moves a TE that sets contrast. */
function fits(setting: CarrySetting, pixelBandwidthHz: number): boolean {
  const before = setting.series.parameters;
  const { parameters, model } = settle(setting, { pixelBandwidthHz });
  if (parameters.rounds > before.rounds || model.impossible !== null) return false;
  const row = classRow(setting.baseline.model.key);
  // A longer train of readouts moves what the inversion time means.
  if (row.family === 'inversion-prepared-gradient-echo') return parameters.echoSpacingMs <= before.echoSpacingMs * (1 + echoShare) + 1e-9;
  if (row.gradientEcho) return true;
  return Math.abs(parameters.echoTimeMs / before.echoTimeMs - 1) <= echoShare + 1e-9;
}
