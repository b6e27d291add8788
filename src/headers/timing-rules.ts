import { type ClassKey, classRow } from '../calc/classes.js';
import type { CollectedSeries } from './collected-series.js';
import { derivedAs, type Found, missingFor, plainNumber, readAs } from './found.js';
import { firstNumber, heldNowhere, numberIn, type ValueRule } from './value-rule.js';

const prepared: ClassKey = 'inversion-prepared-gradient-echo/3D';

function inversionMs({ attributes: a }: CollectedSeries): number | undefined {
  return a.InversionTime?.[0] ?? a.InversionTimes?.[0];
}

function findRepetition(series: CollectedSeries, key: ClassKey | null): Found {
  if (key !== prepared) {
    const excitation = firstNumber(series, 'RepetitionTimeExcitation');
    return series.attributes.RepetitionTime === undefined && excitation.origin === 'read'
      ? excitation
      : firstNumber(series, 'RepetitionTime');
  }
  const cycle = firstNumber(series, 'RepetitionTimePreparation');
  if (cycle.origin === 'read') return cycle;
  const stated = firstNumber(series, 'RepetitionTime');
  const inversion = inversionMs(series);
  if (stated.origin === 'read' && inversion !== undefined && (stated.value as number) < inversion) {
    return missingFor(
      `RepetitionTime ${String(stated.value)} ms is under the inversion time: it is the time between readouts, not the cycle`,
    );
  }
  return stated;
}

function echoTimesOf(series: CollectedSeries): { readonly times: readonly number[]; readonly by: string } {
  const by = series.attributes.EffectiveEchoTime === undefined ? 'EchoTime' : 'EffectiveEchoTime';
  return { times: series.echoTimes, by };
}

function findEcho(series: CollectedSeries, key: ClassKey | null): Found {
  const { times, by } = echoTimesOf(series);
  if (times.length === 0) return missingFor('EchoTime is not stated');
  const kept = key === null || classRow(key).parameters.includes('secondEchoTimeMs') ? 2 : 1;
  const left =
    times.length > kept ? `; ${times.length} different ones: those after the first ${kept === 1 ? 'are' : 'two are'} left out` : '';
  return readAs(times[0], `${by}${left}`);
}

function findSecondEcho(series: CollectedSeries): Found {
  const { times, by } = echoTimesOf(series);
  if (times.length === 0) return missingFor('EchoTime is not stated');
  return times.length === 1 ? derivedAs(undefined, `one ${by}`) : readAs(times[1], `${by} of the second echo`);
}

function findInversion(series: CollectedSeries, key: ClassKey | null): Found {
  const stated = inversionMs(series);
  if (stated !== undefined && stated > 0)
    return readAs(stated, series.attributes.InversionTime === undefined ? 'InversionTimes' : 'InversionTime');
  if (key === prepared) return missingFor('InversionTime is not stated');
  if (series.attributes.InversionRecovery?.[0] === 'YES' || series.attributes.ScanningSequence?.includes('IR') === true) {
    return missingFor('an inversion is stated, its time is not');
  }
  return derivedAs(undefined, 'no inversion is stated');
}

function findTrain(series: CollectedSeries, key: ClassKey | null): Found {
  const { attributes: a } = series;
  const keyword =
    key !== null && classRow(key).gradientEcho && a.GradientEchoTrainLength !== undefined
      ? 'GradientEchoTrainLength'
      : a.RFEchoTrainLength !== undefined && (key === null || classRow(key).train)
        ? 'RFEchoTrainLength'
        : 'EchoTrainLength';
  const found = firstNumber(series, keyword);
  if (found.origin === 'missing') return found;
  const takesAll = key !== null && classRow(key).otherwise.echoTrainLength === 'lines';
  // Headers of trains that read all their lines in one go often say 1.
  if (takesAll && (found.value as number) <= 1) return missingFor(`${keyword} ${String(found.value)}: follows from the lines instead`);
  return (found.value as number) < 1 ? missingFor(`${keyword} is 0`) : found;
}

function findSpacing(series: CollectedSeries, key: ClassKey | null): Found {
  const { attributes: a } = series;
  const effective = a.EffectiveEchoSpacing?.[0];
  if (key !== null && classRow(key).echoPlanar && effective !== undefined && effective > 0) {
    const factor = a.ParallelReductionFactorInPlane?.[0];
    if (factor === undefined) return missingFor(`EffectiveEchoSpacing ${effective} ms, but not the acceleration it is divided by`);
    return derivedAs(plainNumber(effective * factor), `EffectiveEchoSpacing ${effective} ms times acceleration ${factor}`);
  }
  if (key === prepared) {
    const between = a.RepetitionTimeExcitation?.[0] ?? a.RepetitionTime?.[0];
    const inversion = inversionMs(series);
    const named = a.RepetitionTimeExcitation === undefined ? 'RepetitionTime' : 'RepetitionTimeExcitation';
    if (between !== undefined && inversion !== undefined && between < inversion)
      return derivedAs(between, `${named}: between readouts of one cycle`);
  }
  return missingFor('no standard attribute holds it');
}

export const timingRules = {
  repetitionTimeMs: {
    from: ['RepetitionTime'],
    fields: ['RepetitionTime', 'RepetitionTimePreparation', 'RepetitionTimeExcitation'],
    how: 'as it stands; inversion-prepared: the whole cycle',
    find: findRepetition,
  },
  echoTimeMs: {
    from: ['EffectiveEchoTime', 'EchoTime'],
    fields: ['EchoTime'],
    how: 'the shortest of the series; effective in trains',
    find: findEcho,
  },
  secondEchoTimeMs: {
    from: ['EffectiveEchoTime', 'EchoTime'],
    fields: ['EchoTime'],
    how: 'the second shortest; absent when there is one',
    find: findSecondEcho,
  },
  inversionTimeMs: {
    from: ['InversionTime', 'InversionTimes', 'InversionRecovery'],
    fields: ['InversionTime'],
    how: 'as it stands; absent when no inversion is stated',
    find: findInversion,
  },
  echoTrainLength: {
    from: ['EchoTrainLength', 'RFEchoTrainLength', 'GradientEchoTrainLength'],
    fields: ['EchoTrainLength'],
    how: 'as it stands; trains that read all lines: not when 1',
    find: findTrain,
  },
  echoSpacingMs: {
    ...heldNowhere(['EffectiveEchoSpacing', 'ParallelReductionFactorInPlane', 'RepetitionTimeExcitation']),
    find: findSpacing,
  },
  pixelBandwidthHz: numberIn('PixelBandwidth', ['PixelBandwidth']),
  linesPerBeat: heldNowhere(),
} as const satisfies Readonly<Record<string, ValueRule>>;
