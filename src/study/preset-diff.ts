import { baselineOf } from '../calc/baseline.js';
import { unknownBody } from '../calc/body.js';
import { classRow } from '../calc/classes.js';
import { evaluate } from '../calc/evaluate.js';
import { type FigureKey, type Figures, figureKeys } from '../calc/figures.js';
import { type ParameterKey, parameterKeys } from '../calc/parameters.js';
import { plainScanner } from '../calc/scanner.js';
import { classOf, type GivenParameters } from '../calc/series.js';
import type { RecordedSeries } from './record.js';
import { figureWords } from './record-changes.js';
import type { Study, StudySeries } from './study.js';

/** A parameter that differs. */
export interface ParameterDifference {
  readonly key: ParameterKey;
  readonly from: unknown;
  readonly to: unknown;
}

/** A figure that differs in the digits shown; both relative to the first of the two. */
export interface FigureDifference {
  readonly key: FigureKey;
  readonly from: number | null;
  readonly to: number | null;
}

/** Anything else that differs, as JSON. */
export interface OtherDifference {
  readonly key: string;
  readonly from: unknown;
  readonly to: unknown;
}

/** One series of two studies, side by side. */
export interface SeriesDifference {
  readonly id: string;
  readonly title: string;
  readonly kind: 'same' | 'changed' | 'added' | 'removed';
  readonly parameters: readonly ParameterDifference[];
  readonly figures: readonly FigureDifference[];
  readonly other: readonly OtherDifference[];
}

/** Two studies side by side: series in the order of the first, then those that only the second has. */
export interface StudyDifference {
  readonly head: readonly OtherDifference[];
  readonly series: readonly SeriesDifference[];
}

export const headKeys = ['id', 'title', 'region', 'fieldT', 'status', 'revision', 'released', 'notes', 'minimumSet'] as const;
export const seriesKeys = [
  'title',
  'plane',
  'purpose',
  'priority',
  'family',
  'acquisition',
  'target',
  'comparison',
  'contrastAgent',
  'nullTissue',
  'tissueOverrides',
  'ranges',
  'mustKeep',
  'pairedWith',
  'locked',
  'opened',
] as const satisfies readonly (keyof StudySeries)[];

/** Equal as a file would hold them. */
export function equalValues(a: unknown, b: unknown): boolean {
  return a === b || JSON.stringify(a) === JSON.stringify(b);
}

/**
 * What differs between two studies: parameters, and what they do to the figures. Each series of the second is evaluated at its own
 * field against the same series of the first, so that SNR, contrast and RF say what the change does.
 */
export function studyDifference(a: Study, b: Study): StudyDifference {
  const others = b.series.filter(({ id }) => !a.series.some((series) => series.id === id));
  return {
    head: differing(headKeys, a, b),
    series: [
      ...a.series.map((series) => seriesDifference(series, b.series.find(({ id }) => id === series.id) ?? null, a.fieldT, b.fieldT)),
      ...others.map(({ id, title }): SeriesDifference => ({ id, title, kind: 'added', parameters: [], figures: [], other: [] })),
    ],
  };
}

/** True when nothing at all differs but the number of the revision and who released it. */
export function isSameContent({ head, series }: StudyDifference): boolean {
  const formal = ['revision', 'released', 'status', 'id'];
  return head.every(({ key }) => formal.includes(key)) && series.every(({ kind }) => kind === 'same');
}

/** What a session planned and what it used, as a difference of one series. */
export function recordedDifference({ id, planned, used }: RecordedSeries): SeriesDifference {
  const parameters = differingParameters(planned.parameters, used.parameters, parameterKeys);
  const figures = differingFigures(planned.figures, used.figures);
  return { id, title: '', kind: parameters.length > 0 ? 'changed' : 'same', parameters, figures, other: [] };
}

function seriesDifference(a: StudySeries, b: StudySeries | null, fieldOfA: number, fieldOfB: number): SeriesDifference {
  const about = { id: a.id, title: a.title };
  if (b === null) return { ...about, kind: 'removed', parameters: [], figures: [], other: [] };
  const keys = parameterKeys.filter((key) => [a, b].some((series) => classRow(classOf(series)).parameters.includes(key)));
  const parameters = differingParameters(a.parameters, b.parameters, keys);
  const other = differing(seriesKeys, a, b);
  const baseline = baselineOf(a, plainScanner(fieldOfA));
  const before = evaluate(a, plainScanner(fieldOfA), unknownBody, baseline).figures;
  const after = evaluate(b, plainScanner(fieldOfB), unknownBody, baseline).figures;
  const figures = differingFigures(before, after);
  const kind = parameters.length + other.length + figures.length > 0 ? 'changed' : 'same';
  return { ...about, kind, parameters, figures, other };
}

function differingParameters(a: GivenParameters, b: GivenParameters, keys: readonly ParameterKey[]): ParameterDifference[] {
  return keys.flatMap((key) => (equalValues(a[key], b[key]) ? [] : [{ key, from: a[key], to: b[key] }]));
}

function differingFigures(a: Partial<Figures>, b: Partial<Figures>): FigureDifference[] {
  return figureKeys.flatMap((key) => {
    const [from, to] = [a[key] ?? null, b[key] ?? null];
    return figureWords(key, from) === figureWords(key, to) ? [] : [{ key, from, to }];
  });
}

function differing<T extends object>(keys: readonly (keyof T & string)[], a: T, b: T): OtherDifference[] {
  return keys.flatMap((key) => (equalValues(a[key], b[key]) ? [] : [{ key, from: a[key], to: b[key] }]));
}
