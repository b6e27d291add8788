import { classRow } from '../calc/classes.js';
import { fatShiftHz } from '../calc/constants.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import type { CarryGap, ContrastCarry } from './carry.js';
import type { BandwidthChoice } from './carry-bandwidth.js';
import type { EchoPair } from './carry-echo-pair.js';
import { type CarrySetting, nullsByInversion, type Settled } from './carry-setting.js';
import { digits } from './carry-words.js';

/** Water and fat closer than this, Hz, are hard to tell apart by frequency (common practice, no source). */
const narrowHz = 150;
/** Fields between which the contrast agent's relaxivity and the SAR exponent have a source, tesla. */
const sourced = { min: 1.5, max: 3 } as const;

/** What of a series cannot be carried, or not as it was, and why. */
export function carryGaps(
  setting: CarrySetting,
  settled: Settled,
  {
    contrast,
    bandwidth,
    pair,
  }: { readonly contrast: ContrastCarry; readonly bandwidth: BandwidthChoice; readonly pair: EchoPair | null | undefined },
): readonly CarryGap[] {
  const { series, baseline, to } = setting;
  const { model, parameters: p } = settled;
  const before = series.parameters;
  const gaps: CarryGap[] = [];
  const add = (what: string, why: string) => gaps.push({ what, why });
  if (model.impossible !== null) add('timing', `${model.impossible} at ${digits(to.fieldT, 3)} T`);
  if (contrast.status === 'unsolvable') add('contrast ratio', contrast.words);
  if (contrast.status === 'not known') add('contrast ratio', contrast.words);
  if (bandwidth.because === 'gradients')
    add(
      'equal chemical shift',
      `it would take ${bandwidth.equalShiftHz} Hz/px, the gradients read at most ${bandwidth.mostHz} at this field of view`,
    );
  if (bandwidth.because === 'train')
    add(
      'equal chemical shift',
      `${bandwidth.equalShiftHz} Hz/px would move TE or the train by more than 5 % or split the slices further: fat moves less than in the preset`,
    );
  if (classRow(model.key).echoPlanar && to.fieldT > baseline.model.scanner.fieldT)
    add(
      'equal chemical shift',
      `fat moves along phase in this class, ${digits(model.shift.chemicalShiftPx, 1)} px now: only a shorter spacing or more acceleration brings it back`,
    );
  if (pair === null) add('in and opposed phase', 'no pair under six cycles leaves room for the shortest TE and the readout');
  const other = pair?.otherwise ?? null;
  if (other !== null)
    add(
      'in and opposed phase',
      `the shortest TE is estimated at ${digits(other.shortestMs, 2)} ms: where the scanner refuses the pair, ${digits(other.firstMs, 2)} and ${digits(other.secondMs, 2)} ms${other.opposedLater ? ', with the opposed echo later, so that T2* decay reads as fat' : ''}`,
    );
  if (series.parameters.fatSuppression === 'spectral' && fatShiftHz(to.fieldT) < narrowHz)
    add(
      'spectral fat suppression',
      `water and fat lie only ${digits(fatShiftHz(to.fieldT), 0)} Hz apart: inversion or two-point separation would hold better (common practice, no source)`,
    );
  const slice = series.acquisition === '3D' ? p.parallelFactorSlice : 1;
  if (parallelNoiseFactor(to.coil, p.parallelFactorPhase, slice) === null)
    add(
      'acceleration',
      `noise of ${digits(p.parallelFactorPhase, 1)} x ${digits(slice, 1)} is not known for ${to.coil === null ? 'the usual coil' : `coil ${to.coil.name}`}: no SNR`,
    );
  if (p.simultaneousSlices > 1 && to.simultaneousSliceG[p.simultaneousSlices] === undefined)
    add('simultaneous slices', `noise of ${p.simultaneousSlices} slices together is not known for this coil`);
  if (Object.keys(series.tissueOverrides).length > 0)
    add(
      'tissue values of the series',
      `those of ${Object.keys(series.tissueOverrides).join(', ')} were given for ${digits(baseline.model.scanner.fieldT, 3)} T and stand unchanged`,
    );
  // A magnet a few percent off its name is still one of that field.
  const beyond = to.fieldT < 0.95 * sourced.min || to.fieldT > 1.05 * sourced.max;
  if (series.contrastAgent && beyond)
    add(
      'contrast agent',
      `its relaxivity is held at the value of ${to.fieldT < sourced.min ? sourced.min : sourced.max} T: no value is kept for ${digits(to.fieldT, 3)} T`,
    );
  if (beyond) add('SAR trend', `the lower end of its range, B0^0.85, comes from models between ${sourced.min} and ${sourced.max} T`);
  if (
    before.inversionTimeMs !== undefined &&
    nullsByInversion(setting) &&
    p.inversionTimeMs === before.inversionTimeMs &&
    model.impossible !== null
  )
    add('null', 'the signal equation has no null with this timing');
  if (p.rounds > before.rounds)
    add('the split', `the slices need ${p.rounds} separate acquisitions instead of ${before.rounds}: time counts them all`);
  return gaps;
}
