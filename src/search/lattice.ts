import { classRow } from '../calc/classes.js';
import { geometryOf } from '../calc/geometry.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { guardedCeil, same } from '../calc/rounding.js';
import { classOf, type GivenParameters } from '../calc/series.js';
import type { Range, StudySeries } from '../study/study.js';
import { isOpen, type StepCircumstances, type StepValue, stepValues } from './lattice-values.js';
import { hasRfCap } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';

/** One thing a search may change. The first value is where it starts; choosing another is one change. */
export interface LatticeVariable {
  readonly key: ParameterKey;
  readonly values: readonly StepValue[];
  /** Slices that go with each value, where slices follow thickness at constant coverage. */
  readonly sliceCounts: readonly number[] | null;
}

/** Values that the preset's own range allows, or null where it has none for this parameter. */
function rangeValues(range: Range | undefined): readonly StepValue[] | null {
  if (range === undefined) return null;
  if (!('step' in range)) return range;
  const values: number[] = [];
  for (let i = 0; range.min + i * range.step <= range.max + 1e-9; i += 1) values.push(Math.round((range.min + i * range.step) * 1e6) / 1e6);
  return values;
}

function within(range: Range | undefined, value: number): boolean {
  if (range === undefined) return true;
  return 'step' in range ? value >= range.min - 1e-9 && value <= range.max + 1e-9 : range.includes(value);
}

/** What a value must be in any file: bounds of the table of parameters. */
function allowedByTable(key: ParameterKey, value: StepValue): boolean {
  const row = parameterRow(key);
  if (row.kind !== 'number') return true;
  if (typeof value !== 'number') return false;
  const inside = value <= row.max && (row.aboveMin === true ? value > row.min : value >= row.min);
  return inside && (row.whole !== true || Number.isInteger(value));
}

/**
 * The fewest slices of this thickness that cover what the preset covers, by 2 in 3D.
 *
 * @example slicesThatCover({ ...72 partitions of 3 mm }, 5) //=> 44
 */
function slicesThatCover(series: Pick<StudySeries, 'acquisition' | 'parameters'>, thicknessMm: number): number {
  const p = series.parameters;
  const { coverageMm } = geometryOf(series.acquisition, p);
  if (series.acquisition === '3D') return 2 * guardedCeil(coverageMm / thicknessMm / 2);
  return guardedCeil((coverageMm + p.sliceGapMm) / (thicknessMm + p.sliceGapMm));
}

/** Values in a stated order: where the search starts, then the others by size (or as listed). */
function ordered(start: StepValue, values: readonly StepValue[]): StepValue[] {
  const isStart = (value: StepValue) => (typeof value === 'number' && typeof start === 'number' ? same(value, start) : value === start);
  const others = [...new Set(values)].filter((value) => !isStart(value));
  if (others.every((value) => typeof value === 'number')) (others as number[]).sort((a, b) => a - b);
  return [start, ...others];
}

/** True when the preset or the user opened a parameter. */
export function isOpened(key: ParameterKey, { series, opened }: Pick<SearchProblem, 'series' | 'opened'>): boolean {
  return series.opened.includes(key) || opened.includes(key);
}

/**
 * What a search may change in a series and the values it may take, in the order of the table of parameters.
 * A range of the preset replaces the steps; `locked` and values set by hand take a parameter out; after contrast nothing may change.
 */
export function latticeOf(problem: SearchProblem): LatticeVariable[] {
  const { series, set, frozen } = problem;
  if (frozen) return [];
  const has = classRow(classOf(series)).parameters;
  const rfCap = hasRfCap(problem.limits);
  const coverageOpened = isOpened('sliceCount', problem);
  const variables: LatticeVariable[] = [];
  for (const key of parameterKeys) {
    if (!has.includes(key) || series.locked.includes(key) || set[key] !== undefined) continue;
    const start = series.parameters[key];
    if (start === undefined || typeof start === 'object') continue;
    const circumstances: StepCircumstances = {
      series,
      scanner: problem.scanner,
      body: problem.body,
      rfCap,
      opened: isOpened(key, problem),
    };
    if (!isOpen(key, circumstances)) continue;
    const follows = key === 'sliceThicknessMm' && !coverageOpened;
    if (follows && (set.sliceCount !== undefined || series.locked.includes('sliceCount'))) continue;
    const wanted = rangeValues(series.ranges[key]) ?? stepValues(key, circumstances);
    const values = ordered(start, wanted).filter((value, i) => i === 0 || allowedByTable(key, value));
    const variable = follows ? withSlices(series, key, values as number[]) : { key, values, sliceCounts: null };
    if (variable.values.length > 1) variables.push(variable);
  }
  return variables;
}

/** Thickness with the slices that follow it, cut by the preset's range of slices. */
function withSlices(series: StudySeries, key: ParameterKey, thicknesses: readonly number[]): LatticeVariable {
  const pairs = thicknesses.map((mm, i) => ({ mm, count: i === 0 ? series.parameters.sliceCount : slicesThatCover(series, mm) }));
  const kept = pairs.filter(
    ({ count }, i) => i === 0 || (within(series.ranges['sliceCount'], count) && allowedByTable('sliceCount', count)),
  );
  return { key, values: kept.map(({ mm }) => mm), sliceCounts: kept.map(({ count }) => count) };
}

/** Ways the lattice holds: the product of all steps, the start included. */
export function latticeSize(variables: readonly LatticeVariable[]): number {
  return variables.reduce((product, { values }) => product * values.length, 1);
}

/** Writes the values of one point of the lattice into a set of parameters; index 0 leaves a parameter as it is. */
function writePoint(variables: readonly LatticeVariable[], point: ArrayLike<number>, into: Record<string, unknown>): void {
  variables.forEach(({ key, values, sliceCounts }, i) => {
    const at = point[i] as number;
    if (at === 0) return;
    into[key] = values[at];
    if (sliceCounts !== null) into['sliceCount'] = sliceCounts[at];
  });
}

/** The parameters that a point of the lattice sets, on top of those set by hand. */
export function pointParameters(variables: readonly LatticeVariable[], point: ArrayLike<number>, set: GivenParameters): GivenParameters {
  const given: Record<string, unknown> = { ...set };
  writePoint(variables, point, given);
  return given as GivenParameters;
}

/** Number of settings that a point changes. */
export function changesOf(point: ArrayLike<number>): number {
  let changes = 0;
  for (let i = 0; i < point.length; i += 1) if (point[i] !== 0) changes += 1;
  return changes;
}
