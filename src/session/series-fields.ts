import { classRow } from '../calc/classes.js';
import { type ParameterGroup, type ParameterKey, parameterGroups, parameterKeys, parameterRow, type Unit } from '../calc/parameters.js';
import { classOf, type Parameters } from '../calc/series.js';
import { type InnerRow, innerKeys } from '../study/inner-keys.js';
import type { StudySeries } from '../study/study.js';

/** One line of the series screen: a parameter, or a value inside `pacing` or `diffusion`. */
export interface SeriesField {
  /** `averages`, `pacing.periodMs`: the key as `--set` takes it. */
  readonly path: string;
  readonly key: ParameterKey;
  readonly inner: string | null;
  readonly group: ParameterGroup;
  readonly label: string;
  /** At most 16 characters. */
  readonly shortLabel: string;
  readonly unit: Unit;
  readonly kind: 'number' | 'flag' | 'choice' | 'numbers';
  readonly choices: readonly string[];
  readonly min: number;
  readonly max: number;
  readonly whole: boolean;
  readonly digits: number;
  readonly help: string;
}

/** Labels that are too long for the narrow column. */
const shortLabels: Readonly<Record<string, string>> = {
  phaseFieldOfViewPercent: 'phase field',
  phaseOversamplingPercent: 'phase oversample',
  sliceOversamplingPercent: 'slice oversample',
  parallelFactorPhase: 'accelerate phase',
  parallelFactorSlice: 'accelerate slice',
  partialFourierPhase: 'partial F. phase',
  partialFourierSlice: 'partial F. slice',
  ellipticalSampling: 'elliptical',
  simultaneousSlices: 'slices at once',
  flowCompensation: 'flow compensated',
};

const innerLabels: Readonly<Record<string, string>> = {
  'pacing.kind': 'paced by',
  'pacing.periodMs': 'breath or beat',
  'pacing.windowMs': 'quiet window',
  'pacing.breathHold': 'in breath-holds',
  'diffusion.bValuesSPerMm2': 'b-values',
  'diffusion.directions': 'directions',
  'diffusion.averages': 'b-value averages',
};

const fieldsOfClass = new Map<string, readonly SeriesField[]>();

/** Every field of a series, grouped as one thinks, in the order of the table. */
export function seriesFields(series: Pick<StudySeries, 'family' | 'acquisition'>, parameters: Parameters): readonly SeriesField[] {
  const diffusion = parameters.diffusion !== undefined;
  const paced = parameters.pacing.kind;
  const key = `${classOf(series)} ${diffusion} ${paced}`;
  const known = fieldsOfClass.get(key);
  if (known !== undefined) return known;
  const own = classRow(classOf(series)).parameters;
  const fields = parameterGroups.flatMap((group) =>
    parameterKeys
      .filter((name) => own.includes(name) && parameterRow(name).group === group)
      .flatMap((name) => fieldsOf(name, diffusion, paced)),
  );
  fieldsOfClass.set(key, fields);
  return fields;
}

function fieldsOf(key: ParameterKey, hasDiffusion: boolean, paced: string): SeriesField[] {
  const row = parameterRow(key);
  if (row.kind === 'object') {
    if (key === 'diffusion' && !hasDiffusion) return [];
    return Object.entries(innerKeys[key as 'pacing' | 'diffusion'])
      .filter(([inner]) => key !== 'pacing' || appliesTo(inner, paced))
      .map(([inner, innerRow]) => innerField(key, inner, innerRow, row.group));
  }
  const number = row.kind === 'number' ? row : null;
  return [
    {
      path: key,
      key,
      inner: null,
      group: row.group,
      label: row.label,
      shortLabel: shortLabels[key] ?? row.label,
      unit: number?.unit ?? '',
      kind: row.kind,
      choices: row.kind === 'choice' ? row.choices : [],
      min: number?.min ?? 0,
      max: number?.max ?? 0,
      whole: number?.whole === true,
      digits: number?.digits ?? 0,
      help: row.help,
    },
  ];
}

/** A breath interval means nothing without a trigger, a quiet window nothing without a breath. */
function appliesTo(inner: string, paced: string): boolean {
  if (inner === 'periodMs') return paced === 'respiratory-trigger' || paced === 'cardiac-gate';
  if (inner === 'windowMs') return paced === 'respiratory-trigger';
  if (inner === 'breathHold') return paced === 'cardiac-gate';
  return true;
}

function innerField(key: ParameterKey, inner: string, row: InnerRow, group: ParameterGroup): SeriesField {
  const path = `${key}.${inner}`;
  const bounded = 'min' in row ? row : null;
  return {
    path,
    key,
    inner,
    group,
    label: innerLabels[path] ?? inner,
    shortLabel: innerLabels[path] ?? inner,
    unit: bounded?.unit ?? '',
    kind: row.kind,
    choices: 'choices' in row ? row.choices : [],
    min: bounded?.min ?? 0,
    max: bounded?.max ?? 0,
    whole: bounded?.whole === true,
    digits: 0,
    help: row.help,
  };
}

/** The value of a field. */
export function fieldValue(field: SeriesField, parameters: Parameters): unknown {
  const outer = parameters[field.key];
  return field.inner === null ? outer : (Object(outer) as Record<string, unknown>)[field.inner];
}

/** The values to set so that a field has another value: `pacing` and `diffusion` are set whole. */
export function withField(field: SeriesField, value: unknown, parameters: Parameters): Readonly<Record<string, unknown>> {
  if (field.inner === null) return { [field.key]: value };
  return { [field.key]: { ...(Object(parameters[field.key]) as object), [field.inner]: value } };
}
