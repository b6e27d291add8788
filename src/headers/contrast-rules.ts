import { type ClassKey, classRow } from '../calc/classes.js';
import type { Attributes } from './attribute-table.js';
import type { CollectedSeries } from './collected-series.js';
import { derivedAs, type Found, guessedAs, missingFor, readAs } from './found.js';
import { gatedWords } from './gated-words.js';
import { firstNumber, heldNowhere, says, type ValueRule } from './value-rule.js';

/** Inversion times under this null fat and not fluid, ms: fat 140 to 260, fluid over 1500 from 0.5 to 3 T (common practice). */
const fatNullMs = 400;

/** A refocused class with an angle over this gives the refocusing angle: excitation is about 90 (common practice). */
const largestExcitationDeg = 100;

function isRefocused(key: ClassKey | null): boolean {
  return key !== null && !classRow(key).gradientEcho;
}

function findFlip(series: CollectedSeries, key: ClassKey | null): Found {
  const found = firstNumber(series, 'FlipAngle');
  if (isRefocused(key) && found.origin === 'read' && (found.value as number) > largestExcitationDeg) {
    return missingFor(`FlipAngle ${String(found.value)} is taken for the refocusing angle`);
  }
  return found;
}

function findRefocusing(series: CollectedSeries, key: ClassKey | null): Found {
  const angle = series.attributes.FlipAngle?.[0];
  if (isRefocused(key) && angle !== undefined && angle > largestExcitationDeg) {
    return guessedAs(angle, `FlipAngle ${angle} of a refocused class: too large for the excitation`);
  }
  return missingFor('no standard attribute holds it');
}

function findFatSuppression({ attributes: a }: CollectedSeries, key: ClassKey | null): Found {
  const stated = a.SpectrallySelectedSuppression?.[0];
  if (stated === 'FAT' || stated === 'FAT_AND_WATER') return readAs('spectral', `SpectrallySelectedSuppression ${stated}`);
  if (a.SpectrallySelectedExcitation?.[0] === 'WATER') return readAs('water-excitation', 'SpectrallySelectedExcitation WATER');
  if (says(a.ScanOptions, 'FS')) return readAs('spectral', 'ScanOptions FS');
  const inversion = a.InversionTime?.[0] ?? a.InversionTimes?.[0] ?? 0;
  if (isRefocused(key) && inversion > 0 && inversion < fatNullMs) {
    return derivedAs('inversion', `an inversion time of ${inversion} ms nulls fat`);
  }
  if (stated === 'NONE') return readAs('none', 'SpectrallySelectedSuppression NONE');
  if (listed(a)) return derivedAs('none', 'not among the ScanOptions that are listed');
  return missingFor('SpectrallySelectedSuppression is not stated');
}

/**
 * True where a header lists options, all of them the standard's: what is not among them was not used. An empty list says nothing, and
 * a word of a maker's own may mean any of them.
 */
function listed(a: Attributes): boolean {
  return a.ScanOptions !== undefined && a.UnlistedScanOptions === undefined;
}

function findBands({ attributes: a }: CollectedSeries): Found {
  const count = a.SaturationBandCount?.[0];
  const stated = a.SpatialPresaturation?.[0];
  if (stated === 'NONE') return readAs(0, 'SpatialPresaturation NONE');
  if (count !== undefined && count > 0) return derivedAs(count, `items of MRSpatialSaturationSequence: ${count}`);
  if (stated === 'SLAB') return missingFor('SpatialPresaturation SLAB: at least one, how many is not stated');
  if (says(a.ScanOptions, 'SP')) return missingFor('ScanOptions SP: at least one, how many is not stated');
  return listed(a) ? derivedAs(0, 'not among the ScanOptions that are listed') : missingFor('SpatialPresaturation is not stated');
}

function findFlowCompensation({ attributes: a }: CollectedSeries): Found {
  const stated = a.FlowCompensation?.[0];
  if (stated !== undefined) return readAs(stated !== 'NONE', `FlowCompensation ${stated}`);
  if (says(a.ScanOptions, 'FC')) return readAs(true, 'ScanOptions FC');
  return listed(a) ? derivedAs(false, 'not among the ScanOptions that are listed') : missingFor('FlowCompensation is not stated');
}

const breathing = ['GATING', 'REALTIME', 'TRACKING'];

function findPacing({ attributes: a }: CollectedSeries): Found {
  const breath = a.RespiratoryMotionCompensationTechnique?.[0];
  const held = breath === 'BREATH_HOLD';
  const gatedBy = gatedWords(a);
  if (gatedBy !== null) {
    const interval = a.NominalInterval?.[0] ?? 0;
    const rate = a.HeartRate?.[0] ?? 0;
    const periodMs = interval > 0 ? interval : rate > 0 ? Math.round(60000 / rate) : undefined;
    const period = periodMs === undefined ? 'the beat is not stated' : interval > 0 ? 'NominalInterval' : '60 s / HeartRate';
    const value = { kind: 'cardiac-gate', ...(periodMs === undefined ? {} : { periodMs }), ...(held ? { breathHold: true } : {}) };
    return readAs(value, `${gatedBy}; ${period}${held ? '; BREATH_HOLD' : ''}`);
  }
  if (held) return readAs({ kind: 'breath-hold' }, 'RespiratoryMotionCompensationTechnique BREATH_HOLD');
  if (breath !== undefined && breathing.includes(breath)) {
    return readAs({ kind: 'respiratory-trigger' }, `RespiratoryMotionCompensationTechnique ${breath}; the period is not stated`);
  }
  if (says(a.ScanOptions, 'RG')) return readAs({ kind: 'respiratory-trigger' }, 'ScanOptions RG; the period is not stated');
  if (a.CardiacSynchronizationTechnique?.[0] === 'NONE' && breath === 'NONE')
    return readAs({ kind: 'none' }, 'both synchronisation attributes NONE');
  return missingFor('ScanOptions name no gate, and breath-holds are not stated');
}

export const contrastRules = {
  flipAngleDeg: { from: ['FlipAngle'], fields: ['FlipAngle'], how: 'as it stands; not when over 100 in a refocused class', find: findFlip },
  refocusingAngleDeg: {
    ...heldNowhere(['FlipAngle']),
    from: ['FlipAngle'],
    how: 'guessed where FlipAngle is over 100; else typed',
    find: findRefocusing,
  },
  fatSuppression: {
    from: ['SpectrallySelectedSuppression', 'SpectrallySelectedExcitation', 'ScanOptions', 'InversionTime'],
    fields: ['ScanOptions', 'InversionTime'],
    how: 'FAT and FS are spectral, excited WATER is water excitation, a short inversion time is inversion',
    find: findFatSuppression,
  },
  fatSuppressionEveryLines: heldNowhere(),
  saturationBands: {
    from: ['SpatialPresaturation', 'SaturationBandCount', 'ScanOptions'],
    fields: ['ScanOptions'],
    how: 'NONE is 0; else the items that describe bands',
    find: findBands,
  },
  flowCompensation: {
    from: ['FlowCompensation', 'ScanOptions'],
    fields: ['ScanOptions'],
    how: 'NONE is no; FC is yes',
    find: findFlowCompensation,
  },
  slabSelective: heldNowhere(),
  rfPulseStretch: heldNowhere(),
  reconstruction: heldNowhere(),
  pacing: {
    from: ['ScanOptions', 'CardiacSynchronizationTechnique', 'RespiratoryMotionCompensationTechnique', 'NominalInterval', 'HeartRate'],
    fields: ['ScanOptions'],
    how: 'CG and PPG gate, RG triggers, BREATH_HOLD holds; the beat from NominalInterval',
    find: findPacing,
  },
  roundsPerHold: heldNowhere(),
} as const satisfies Readonly<Record<string, ValueRule>>;
