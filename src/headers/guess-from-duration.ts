import { type ClassKey, classRow } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import { guessedAs, type ReadValue } from './found.js';
import { lackingForTime, timeOfValues } from './time-of-values.js';

/** Amounts that scanners offer of what a header says is there (common practice). */
const usual: Readonly<Partial<Record<ParameterKey, readonly number[]>>> = {
  partialFourierPhase: [0.625, 0.75, 0.875],
  partialFourierSlice: [0.625, 0.75, 0.875],
  phaseOversamplingPercent: [10, 20, 25, 30, 40, 50, 60, 70, 75, 80, 90, 100],
  sliceOversamplingPercent: [10, 12.5, 15, 20, 25, 33, 50, 100],
};

/** What a header may leave unsaid and time hangs on as well: tried beside. */
const unsaid: Readonly<Partial<Record<ParameterKey, readonly number[]>>> = {
  parallelFactorPhase: [1, 2, 3, 4],
  rounds: [1, 2, 3, 4],
};

/** Real series run up to 6 % over the rules (published series against them), and hardly under. */
const shortest = 0.94;
const longest = 1.01;
/** Real series run this much over on average: of several explanations the nearest to it is the best. */
const average = 0.98;
/** Explanations that differ by less cannot be told apart. */
const indistinguishable = 0.02;

interface Explanation {
  readonly values: Readonly<Partial<Record<ParameterKey, number>>>;
  readonly ratio: number;
}

/** Every combination of one value of each key. */
function combinations(keys: readonly (readonly [ParameterKey, readonly number[]])[]): Partial<Record<ParameterKey, number>>[] {
  return keys.reduce<Partial<Record<ParameterKey, number>>[]>(
    (all, [key, values]) => all.flatMap((one) => values.map((value) => ({ ...one, [key]: value }))),
    [{}],
  );
}

/**
 * Amounts that a header says are there but does not give (partial Fourier, oversampling), from AcquisitionDuration: the one that
 * explains it becomes a guess, marked as one; where several do equally well, they are named and it stays missing; where nothing does,
 * that is said.
 *
 * @param values What is known of each parameter of the class.
 * @param durationS AcquisitionDuration; nothing is guessed without it.
 * @param fieldT Field, for the pulses that time may count.
 */
export function guessFromDuration(
  key: ClassKey,
  values: readonly ReadValue[],
  durationS: number | undefined,
  fieldT: unknown,
): readonly ReadValue[] {
  const wanted = values.filter(({ key: name, some }) => some === true && usual[name] !== undefined).map(({ key: name }) => name);
  if (wanted.length === 0) return values;
  const bounded = (why: string) =>
    values.map((value) => (wanted.includes(value.key) ? { ...value, words: `${value.words}; ${why}` } : value));
  if (durationS === undefined || !(durationS > 0)) return bounded('AcquisitionDuration is not stated, which could bound it');
  const given = Object.fromEntries(values.flatMap((one) => (one.value === undefined ? [] : [[one.key, one.value]]))) as GivenParameters;
  const lacking = lackingForTime(key, given);
  if (lacking.length > 0) return bounded(`AcquisitionDuration could bound it if ${lacking.join(', ')} were stated`);
  const explanations = explain(key, given, values, wanted, durationS, fieldT);
  const said = `AcquisitionDuration ${Number(durationS.toFixed(1))} s`;
  if (explanations.length === 0) return bounded(`no usual amount explains ${said}`);
  const best = explanations.reduce((a, b) => (distance(b) < distance(a) ? b : a));
  const asGood = explanations.filter((one) => distance(one) < distance(best) + indistinguishable);
  return values.map((value) => {
    if (!wanted.includes(value.key)) return value;
    const valuesOf = (some: readonly Explanation[]) =>
      [...new Set(some.map((one) => one.values[value.key] as number))].sort((a, b) => a - b);
    const candidates = valuesOf(asGood);
    if (candidates.length > 1) return { ...value, words: `${value.words}; ${said} allows ${candidates.join(' or ')}` };
    const others = valuesOf(explanations).filter((one) => one !== candidates[0]);
    const beside = others.length === 0 ? 'no other usual amount does' : `less well would ${others.join(', ')}`;
    return { key: value.key, ...guessedAs(candidates[0], `explains ${said}${besideWords(best, wanted)}; ${beside}. ${value.words}`) };
  });
}

function distance({ ratio, values }: Explanation): number {
  // Of explanations that fit alike, the one that supposes least.
  return Math.abs(ratio - average) + 0.02 * ((values.rounds ?? 1) - 1) + 0.02 * ((values.parallelFactorPhase ?? 1) - 1);
}

function besideWords({ values }: Explanation, wanted: readonly ParameterKey[]): string {
  const beside = Object.entries(values).filter(([name, value]) => !wanted.includes(name as ParameterKey) && value !== 1);
  return beside.map(([name, value]) => ` if ${name} is ${value}`).join('');
}

function explain(
  key: ClassKey,
  given: GivenParameters,
  values: readonly ReadValue[],
  wanted: readonly ParameterKey[],
  durationS: number,
  fieldT: unknown,
): readonly Explanation[] {
  const open = (Object.keys(unsaid) as ParameterKey[]).filter((name) => values.some((one) => one.key === name && one.origin === 'missing'));
  const tried = combinations([...wanted, ...open].map((name) => [name, (usual[name] ?? unsaid[name]) as readonly number[]]));
  return tried.flatMap((one) => {
    // Slices that share no repetition are not split over several.
    if ((one.rounds ?? 1) > 1 && classRow(key).interleaving !== 'interleaved') return [];
    const ratio = timeOfValues(key, { ...given, ...one } as GivenParameters, fieldT) / durationS;
    return ratio >= shortest && ratio <= longest ? [{ values: one, ratio }] : [];
  });
}
