import type { FigureKey, Figures } from '../calc/figures.js';
import type { GivenParameters } from '../calc/series.js';
import { resultNow, resultWith, sessionSeries, studySeries } from './results.js';
import { sayField } from './say-field.js';
import { sayFigure } from './say-figure.js';
import { fieldValue, type SeriesField, withField } from './series-fields.js';
import type { SeriesResult } from './series-result.js';
import type { State } from './state.js';
import { stepValue } from './step-value.js';

/** What one step would do, before it is pressed. */
export interface StepPreview {
  readonly direction: -1 | 1;
  readonly value: number | string | boolean;
  readonly result: SeriesResult;
}

/** The two steps of a field, and what to say about them. */
export interface NextStep {
  readonly down: StepPreview | null;
  readonly up: StepPreview | null;
  /** Splits, plateaus, ends of the range: one sentence each. */
  readonly sentences: readonly string[];
  /** Where time changes next when one step changes nothing; the jump key goes there. */
  readonly jump: number | null;
}

/** Steps that are looked through for the end of a plateau. */
const farthest = 80;

/** Neighbours of a result that were asked for already: the same object every time, so that nothing is worked out twice. */
const neighbours = new WeakMap<SeriesResult, Map<string, GivenParameters>>();
const steps = new WeakMap<SeriesResult, Map<string, NextStep>>();

function keptIn<K extends object, V>(kept: WeakMap<K, Map<string, V>>, owner: K, key: string, make: () => V): V {
  let map = kept.get(owner);
  if (map === undefined) {
    map = new Map();
    kept.set(owner, map);
  }
  let value = map.get(key);
  if (value === undefined) {
    value = make();
    map.set(key, value);
  }
  return value;
}

/** The set values of a series with one field at another value. */
export function setWith(state: State, id: string, field: SeriesField, value: unknown): GivenParameters {
  const now = resultNow(state, id);
  const make = () => ({ ...sessionSeries(state, id).set, ...(withField(field, value, now.parameters) as GivenParameters) });
  return keptIn(neighbours, now, `${field.path}=${String(value)}`, make);
}

function preview(state: State, id: string, field: SeriesField, value: unknown, direction: -1 | 1): StepPreview | null {
  const next = stepValue(field, value, studySeries(state, id), { direction, big: false });
  if (next === null) return null;
  return { direction, value: next, result: resultWith(state, id, setWith(state, id, field, next)) };
}

const timeOf = ({ evaluation: { figures } }: SeriesResult) => figures.scanTimeS ?? 0;
const changesTime = (a: SeriesResult, b: SeriesResult) => Math.abs(timeOf(a) - timeOf(b)) > 1e-6;

/** What one step down and one step up would do to a field of a series. */
export function nextStep(state: State, id: string, field: SeriesField): NextStep {
  const now = resultNow(state, id);
  return keptIn(steps, now, field.path, () => workedOut(state, id, field, now));
}

function workedOut(state: State, id: string, field: SeriesField, now: SeriesResult): NextStep {
  const value = fieldValue(field, now.parameters);
  const down = preview(state, id, field, value, -1);
  const up = preview(state, id, field, value, 1);
  const sentences: string[] = [];
  for (const step of [down, up]) if (step !== null) sentences.push(...sayRounds(now, step, field));
  const flat = [down, up].every((step) => step === null || !changesTime(now, step.result));
  let jump: number | null = null;
  if (flat && field.kind === 'number' && typeof value === 'number' && (down !== null || up !== null)) {
    const ends = ([-1, 1] as const).map((direction) => plateauEnd(state, id, field, value, direction));
    const shorter = ends.find((end) => end !== null && timeOf(end.result) < timeOf(now));
    const shown = shorter ?? ends.find((end) => end !== null) ?? null;
    if (shown === null) sentences.push('no change in time, however far');
    else {
      jump = shown.value;
      sentences.push(
        `no change in time${sayTrains(now)}; next change at ${sayField(field, shown.value)} (j): ${sayFigure('scanTimeS', timeOf(shown.result))}`,
      );
    }
  }
  if (down === null && up !== null && field.kind === 'number') sentences.push('no step further down');
  if (up === null && down !== null && field.kind === 'number') sentences.push('no step further up');
  return { down, up, sentences, jump };
}

/** `16 shots either way`. */
function sayTrains({ evaluation: { figures } }: SeriesResult): string {
  return figures.shots === null ? '' : `, ${figures.shots} shots either way`;
}

/** A split that a step forces or spares. */
function sayRounds(now: SeriesResult, step: StepPreview, field: SeriesField): string[] {
  const before = now.parameters.rounds;
  const after = step.result.parameters.rounds;
  if (before === after || field.key === 'rounds') return [];
  const { slicesPerRepetition, scanTimeS } = step.result.evaluation.figures;
  const fits = slicesPerRepetition === null ? '' : `only ${slicesPerRepetition} of ${step.result.parameters.sliceCount} slices fit, `;
  const times = `${sayFigure('scanTimeS', timeOf(now))} becomes ${sayFigure('scanTimeS', scanTimeS)}`;
  const words = sayField(field, step.value);
  return [after > before ? `${words}: ${fits}split into ${after}, ${times}` : `${words}: split into ${after} is enough, ${times}`];
}

function plateauEnd(
  state: State,
  id: string,
  field: SeriesField,
  from: number,
  direction: -1 | 1,
): { value: number; result: SeriesResult } | null {
  const now = resultNow(state, id);
  let value: number = from;
  for (let step = 0; step < farthest; step += 1) {
    const next = stepValue(field, value, studySeries(state, id), { direction, big: false });
    if (typeof next !== 'number') return null;
    value = next;
    const result = resultWith(state, id, setWith(state, id, field, value));
    if (changesTime(now, result)) return { value, result };
  }
  return null;
}

/** Figures that differ from the present ones in the digits that are shown. */
export function movedFigures(now: Figures, then: Figures, keys: readonly FigureKey[]): FigureKey[] {
  return keys.filter((key) => sayFigure(key, now[key]) !== sayFigure(key, then[key]));
}
