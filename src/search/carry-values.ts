import { classRow } from '../calc/classes.js';
import { fatShiftHz } from '../calc/constants.js';
import { type ParameterKey, parameterKeys } from '../calc/parameters.js';
import type { AveragesCarry, CarriedValue, ContrastCarry, NullCarry } from './carry.js';
import { mostSignalAngleDeg } from './carry-angle.js';
import type { BandwidthChoice } from './carry-bandwidth.js';
import type { EchoPair } from './carry-echo-pair.js';
import { type CarrySetting, nullsByInversion, type Settled } from './carry-setting.js';
import { digits } from './carry-words.js';

/** All that is known when the reasons are written down. */
export interface CarryFacts {
  readonly setting: CarrySetting;
  readonly settled: Settled;
  readonly bandwidth: BandwidthChoice;
  readonly pair: EchoPair | null | undefined;
  readonly contrast: ContrastCarry;
  readonly nulls: NullCarry | null;
  readonly averages: AveragesCarry;
}

type Reason = Pick<CarriedValue, 'why' | 'formula' | 'source' | 'numbers'>;

const timingSource =
  'timing carried by difference; fastest timing estimated from trapezoids (Bernstein, King & Zhou, Handbook of MRI Pulse Sequences, 2004)';
const shiftSource = 'gamma-bar CODATA 2022; fat at 3.4 ppm, common practice, value from memory';
const signalSource = "the class's signal equation with the published tissue table (population values, not this patient)";

/** Why bandwidth becomes what it becomes. */
function bandwidthReason({ setting, settled, bandwidth }: CarryFacts): Reason {
  const { series, baseline, to, aim } = setting;
  const [fromT, toT] = [baseline.model.scanner.fieldT, to.fieldT];
  const before = series.parameters.pixelBandwidthHz;
  const now = settled.parameters.pixelBandwidthHz;
  const shift = `fat moves ${digits(baseline.model.shift.chemicalShiftPx, 2)} px at ${digits(fromT, 3)} T and ${digits(settled.model.shift.chemicalShiftPx, 2)} px at ${digits(toT, 3)} T`;
  const numbers = {
    presetHz: before,
    ...(bandwidth.equalShiftHz === null ? {} : { equalShiftHz: bandwidth.equalShiftHz }),
    mostHz: bandwidth.mostHz,
    fatShiftFromHz: fatShiftHz(fromT),
    fatShiftToHz: fatShiftHz(toT),
  };
  const formula = 'BW = BW preset x (3.4 ppm x gamma-bar x B0 new) / (3.4 ppm x gamma-bar x B0 old)';
  const with_ = (why: string): Reason => ({ why, formula, source: shiftSource, numbers });
  if (classRow(baseline.model.key).echoPlanar) return with_(`stays: fat moves along phase in this class (${shift})`);
  if (aim === 'snr' && now > bandwidth.proposedHz) {
    return {
      why: `more than equal shift asks for (${bandwidth.equalShiftHz} Hz/px): it spends the SNR that averages do not; ${shift}`,
      formula: 'BW = BW equal shift x (SNR / SNR preset)^2',
      source: 'SNR ~ 1 / sqrt(BW) (Macovski, Magn Reson Med 1996;36:494; value from memory)',
      numbers,
    };
  }
  switch (bandwidth.because) {
    case 'gradients':
      return with_(
        `as far as the readout gradient goes, ${bandwidth.mostHz} Hz/px; equal shift would take ${bandwidth.equalShiftHz}: ${shift}`,
      );
    case 'time':
      return with_(`not lowered, so that no series takes longer; equal shift would allow ${bandwidth.equalShiftHz} Hz/px: ${shift}`);
    case 'train':
      return with_(
        `lowered towards the ${bandwidth.equalShiftHz} Hz/px of equal shift, as far as TE and train stay within 5 % and the slices need no further split: ${shift}`,
      );
    case null:
      return with_(`equal chemical shift: ${shift}`);
  }
}

function nullReason({ nulls, setting }: CarryFacts): Reason | null {
  if (nulls === null || !nullsByInversion(setting)) return null;
  const { tissue, ownFromMs, ownToMs, simpleFromMs, simpleToMs } = nulls;
  return {
    why: `null of ${tissue} by the class's own equation ${digits(ownFromMs, 0)} to ${digits(ownToMs, 0)} ms, by the textbook's T1 ln(2 / (1 + e^(-TR/T1))) ${digits(simpleFromMs, 0)} to ${digits(simpleToMs, 0)} ms; the preset's distance from its null is kept`,
    formula: 'TI = TI preset x null new / null old',
    source: 'Bydder & Young 1985; Haacke et al., Magnetic Resonance Imaging, 1999; T1 from the published tissue table',
    numbers: { ownFromMs, ownToMs, simpleFromMs, simpleToMs },
  };
}

function pairReason({ pair, setting }: CarryFacts): Reason | null {
  if (pair === null || pair === undefined) return null;
  const hz = fatShiftHz(setting.to.fieldT);
  const later = pair.opposedLater ? '; the opposed echo comes later: T2* decay reads as fat' : '';
  return {
    why: `water and fat ${digits(hz, 1)} Hz apart at ${digits(setting.to.fieldT, 3)} T: opposed at ${digits(pair.opposedMs, 2)} ms, in phase at ${digits(pair.inMs, 2)} ms${later}`,
    formula: 'TE = n / (3.4 ppm x gamma-bar x B0), n a half: opposed, n whole: in phase',
    source: `Dixon, Radiology 1984;153:189; ${shiftSource}`,
    numbers: { fatShiftHz: hz, opposedMs: pair.opposedMs, inMs: pair.inMs },
  };
}

function contrastReason({ contrast, setting, settled }: CarryFacts, key: ParameterKey): Reason {
  const { series } = setting;
  const part = contrast.solved.find((one) => one.key === key);
  const numbers: Record<string, number> = {};
  if (contrast.from !== null) numbers.ratioFrom = contrast.from;
  if (contrast.to !== null) numbers.ratioTo = contrast.to;
  if (part !== undefined)
    Object.assign(numbers, { root: part.x, bracketLow: part.bracket[0], bracketHigh: part.bracket[1], residual: part.residual });
  if (key === 'flipAngleDeg' && contrast.status === 'unsolvable') {
    const [before, after] = [mostSignalAngleDeg(setting.baseline.model), mostSignalAngleDeg(settled.model)];
    const formula = series.family === 'balanced-steady-state' ? 'cos a = (T1/T2 - 1) / (T1/T2 + 1)' : 'a = arccos e^(-TR/T1)';
    if (before !== null && after !== null) Object.assign(numbers, { mostSignalFromDeg: before, mostSignalToDeg: after });
    return {
      why: contrast.words,
      formula: `angle = angle preset x angle of most signal new / old, ${formula}`,
      source: 'Ernst & Anderson 1966; Freeman & Hill 1971',
      numbers,
    };
  }
  return {
    why: contrast.words,
    formula: `S(${series.target}) / S(${series.comparison}) as in the preset, S = proton density x signal: bracketed root, residual 1e-4, then rounded; kept within 1 %`,
    source: signalSource,
    numbers,
  };
}

/** Why one parameter becomes what it becomes, or why it stays. */
function reasonOf(facts: CarryFacts, key: ParameterKey): Reason {
  const { setting, settled, contrast, averages } = facts;
  const before = setting.series.parameters[key];
  const moved = before !== settled.parameters[key];
  if (key === 'pixelBandwidthHz') return bandwidthReason(facts);
  if (key === 'echoTimeMs' || key === 'secondEchoTimeMs') {
    const pair = pairReason(facts);
    if (pair !== null) return pair;
  }
  if (key === 'inversionTimeMs') {
    const byNull = nullReason(facts);
    if (byNull !== null) return byNull;
  }
  if (key === 'averages' || key === 'diffusion') {
    const numbers: Record<string, number> = {};
    if (averages.snr !== null) numbers.snr = averages.snr;
    if (averages.factor !== null) numbers.factor = averages.factor;
    return {
      why: moved ? averages.words : `stays; ${averages.words}`,
      formula: 'averages = averages preset / (SNR / SNR preset)^2',
      source:
        'SNR ~ B0 sqrt(averages) (Macovski, Magn Reson Med 1996;36:494, value from memory; B0: Wang et al., Magn Reson Med 2025, doi 10.1002/mrm.70202)',
      numbers,
    };
  }
  const carried = settled.carried.find((one) => one.key === key);
  if (carried !== undefined) {
    const formula = key === 'rounds' ? 'slices / slices that fit in one TR, rounded up' : 'new = old + (fastest new - fastest old)';
    return { why: carried.because, formula, source: timingSource, numbers: { from: carried.from, to: carried.to } };
  }
  if (
    key === 'echoTimeMs' &&
    setting.series.family === 'single-shot-fast-spin-echo' &&
    !contrast.solved.some((one) => one.key === 'echoTimeMs')
  ) {
    return {
      why: 'the lines fix which echo is the centre: TE follows the spacing',
      formula: 'TE = echo x spacing',
      source: timingSource,
      numbers: {},
    };
  }
  if (key === 'echoSpacingMs' && moved) {
    return {
      why: 'stretched, so that an echo falls where TE is wanted',
      formula: 'spacing = TE / echo',
      source: timingSource,
      numbers: {},
    };
  }
  const reason = contrastReason(facts, key);
  return moved || contrast.status === 'unsolvable' ? reason : { ...reason, why: `stays; ${reason.why}` };
}

/** Parameters that are always shown, changed or not, where the class has them. */
const always: readonly ParameterKey[] = [
  'pixelBandwidthHz',
  'repetitionTimeMs',
  'echoTimeMs',
  'secondEchoTimeMs',
  'inversionTimeMs',
  'averages',
];

/** What each parameter becomes and why, in the order of the table: all that move, and those that a change of field is about. */
export function carriedValues(facts: CarryFacts): readonly CarriedValue[] {
  const { setting, settled } = facts;
  const row = classRow(setting.baseline.model.key);
  const before = setting.series.parameters;
  return parameterKeys
    .filter((key) => row.parameters.includes(key))
    .filter((key) => {
      const shown = always.includes(key) || (key === 'flipAngleDeg' && row.gradientEcho);
      return before[key] !== settled.parameters[key] || (shown && before[key] !== undefined);
    })
    .map((key): CarriedValue => ({ key, from: before[key], to: settled.parameters[key], ...reasonOf(facts, key) }));
}
