import { type ClassKey, classKeys, classRow } from './classes.js';
import { type ParameterKey, parameterKeys } from './parameters.js';
import { defaultOf, type Parameters, type Series } from './series.js';

/** Parameters without a neutral value: an angle or a spacing that a class has not got would mean nothing. */
const withoutNeutral: readonly ParameterKey[] = ['refocusingAngleDeg', 'echoSpacingMs', 'flipAngleDeg', 'slabSelective'];

/** What a class has no use for: numbers, flags and choices with a neutral value that it would silently ignore. */
const ignoredByClass = Object.fromEntries(
  classKeys.map((key) => [
    key,
    parameterKeys
      .filter((name) => !classRow(key).parameters.includes(name) && !withoutNeutral.includes(name))
      .map((name) => ({ name, neutral: defaultOf(name, key) })),
  ]),
) as unknown as Readonly<Record<ClassKey, readonly { readonly name: ParameterKey; readonly neutral: unknown }[]>>;

type Usable = Readonly<Record<ParameterKey, boolean>>;

/** Whether a class has a use for each parameter. */
const usableByClass = Object.fromEntries(
  classKeys.map((key) => [
    key,
    Object.fromEntries(parameterKeys.map((name) => [name, !ignoredByClass[key].some((entry) => entry.name === name)])),
  ]),
) as unknown as Readonly<Record<ClassKey, Usable>>;

const noneIgnored: readonly ParameterKey[] = [];

/** The parameters that are set to something this class cannot use. */
export function ignoredIn(key: ClassKey, p: Parameters): readonly ParameterKey[] {
  if (nothingIgnored(p, usableByClass[key])) return noneIgnored;
  return ignoredByClass[key].filter(({ name, neutral }) => p[name] !== neutral).map(({ name }) => name);
}

/**
 * True when all that some class cannot use is neutral or of use here. Written out name by name, because every evaluation asks and a
 * read by a fixed name is many times quicker than one by a changing name; a test holds it against the tables.
 */
function nothingIgnored(p: Parameters, usable: Usable): boolean {
  return (
    (p.phaseFieldOfViewPercent === 100 || usable.phaseFieldOfViewPercent) &&
    (p.phaseOversamplingPercent === 0 || usable.phaseOversamplingPercent) &&
    (p.sliceGapMm === 0 || usable.sliceGapMm) &&
    (p.sliceOversamplingPercent === 0 || usable.sliceOversamplingPercent) &&
    (p.slabs === 1 || usable.slabs) &&
    (p.rounds === 1 || usable.rounds) &&
    (p.diffusion === undefined || usable.diffusion) &&
    (p.parallelFactorSlice === 1 || usable.parallelFactorSlice) &&
    (p.referenceLines === 0 || usable.referenceLines) &&
    (p.partialFourierPhase === 1 || usable.partialFourierPhase) &&
    (p.partialFourierSlice === 1 || usable.partialFourierSlice) &&
    (p.ellipticalSampling === false || usable.ellipticalSampling) &&
    (p.simultaneousSlices === 1 || usable.simultaneousSlices) &&
    (p.secondEchoTimeMs === undefined || usable.secondEchoTimeMs) &&
    (p.inversionTimeMs === undefined || usable.inversionTimeMs) &&
    (p.echoTrainLength === 1 || usable.echoTrainLength) &&
    (p.linesPerBeat === undefined || usable.linesPerBeat) &&
    (p.fatSuppressionEveryLines === undefined || usable.fatSuppressionEveryLines)
  );
}

/** The same series with what its class cannot use set back to its neutral value, so that it has no effect on anything. */
export function withoutIgnored(series: Series, key: ClassKey, ignored: readonly ParameterKey[]): Series {
  if (ignored.length === 0) return series;
  const neutral = ignoredByClass[key].filter((entry) => ignored.includes(entry.name)).map((entry) => [entry.name, entry.neutral]);
  return { ...series, parameters: { ...series.parameters, ...Object.fromEntries(neutral) } };
}
