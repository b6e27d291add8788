import { classRow } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { classOf } from '../calc/series.js';
import { parameterClashes } from '../study/parameter-checks.js';
import type { StudySeries } from '../study/study.js';
import { carriedKeys } from './carried-keys.js';
import { edit, say } from './change.js';
import { resultNow, resultWith, sessionSeries, studySeries } from './results.js';
import { sayField } from './say-field.js';
import { fieldValue, type SeriesField, withField } from './series-fields.js';
import type { Session, SessionSeries } from './session.js';
import type { State } from './state.js';

/** Whether a preset locks a parameter and nobody has opened it by hand. */
export function isLocked(state: State, id: string, key: ParameterKey): boolean {
  return studySeries(state, id).locked.includes(key) && !sessionSeries(state, id).opened.includes(key);
}

/** Series that are edited together with one: those it names, and those that name it. */
export function pairedSeries(state: State, id: string): readonly StudySeries[] {
  const own = studySeries(state, id);
  return (state.opened?.study.series ?? []).filter(
    (other) => other.id !== id && (own.pairedWith.includes(other.id) || other.pairedWith.includes(id)),
  );
}

/** Whether a series was acquired: what it was acquired with changes no more by itself. */
function isAcquired(state: State, id: string): boolean {
  return ['done', 'repeated', 'stopped-early'].includes(sessionSeries(state, id).state);
}

/** Gives a field of a series another value, in its pairs too, as one step; says what it did or why not. */
export function setField(state: State, id: string, field: SeriesField, value: unknown): State {
  if (isLocked(state, id, field.key)) return say(state, `${field.label} is locked in the preset: l opens it`, 'trouble');
  const before = resultNow(state, id).parameters;
  const given = withMatchingAverages(withField(field, value, before), before);
  const clash = parameterClashes({ ...before, ...given } as GivenParameters)[0];
  if (clash !== undefined) return say(state, `${clash.given}; expected ${clash.expected}`, 'trouble');
  const all = pairedSeries(state, id).filter(
    (other) => classRow(classOf(other)).parameters.includes(field.key) && !isLocked(state, other.id, field.key),
  );
  const pairs = all.filter((other) => !isAcquired(state, other.id));
  const unmatched = all.filter((other) => isAcquired(state, other.id)).map((other) => other.id);
  const from = sayField(field, fieldValue(field, before));
  const to = sayField(field, value);
  if (from === to && JSON.stringify(fieldValue(field, before)) === JSON.stringify(value))
    return say(state, `${field.label} is ${to} already`);
  const words = `${field.label} ${from} to ${to}${pairs.length === 0 ? '' : `, also in ${pairs.map((pair) => pair.id).join(', ')}`}${unmatched.length === 0 ? '' : `; no longer matches ${unmatched.join(', ')}, acquired already`}`;
  const touched = new Set([id, ...pairs.map((pair) => pair.id)]);
  return edit(state, words, (session) =>
    eachSeries(session, touched, (series) => ({ ...series, set: tidySet(state, series.id, { ...series.set, ...given }, field.key) })),
  );
}

/** Puts a field back to what the preset, and what follows from the other values, says. */
export function unsetField(state: State, id: string, field: SeriesField): State {
  if (sessionSeries(state, id).set[field.key] === undefined) return say(state, `${field.label} was not set by hand`);
  return edit(state, `${field.label} back to the preset`, (session) =>
    eachSeries(session, new Set([id]), (series) => {
      const { [field.key]: _gone, ...set } = series.set;
      return { ...series, set };
    }),
  );
}

/** Changes some series of a session. */
export function eachSeries(session: Session, ids: ReadonlySet<string>, change: (series: SessionSeries) => SessionSeries): Session {
  return { ...session, series: session.series.map((series) => (ids.has(series.id) ? change(series) : series)) };
}

/** A value that is the same without being set is not set: the preset's own, or the carried one. */
function tidySet(state: State, id: string, set: GivenParameters, key: ParameterKey): GivenParameters {
  const { [key]: value, ...rest } = set;
  const without = carriedKeys.includes(key) ? resultWith(state, id, rest).parameters : studySeries(state, id).parameters;
  return JSON.stringify(without[key]) === JSON.stringify(value) ? rest : set;
}

/** Another number of b-values brings averages for each: the last one is repeated. */
function withMatchingAverages(given: Readonly<Record<string, unknown>>, before: Parameters): GivenParameters {
  const { diffusion } = given as GivenParameters;
  if (diffusion === undefined || before.diffusion === undefined) return given as GivenParameters;
  const count = diffusion.bValuesSPerMm2.length;
  if (diffusion.averages.length === count || diffusion.averages !== before.diffusion.averages) return given as GivenParameters;
  const averages = Array.from({ length: count }, (_, i) => diffusion.averages[i] ?? diffusion.averages.at(-1) ?? 1);
  return { ...given, diffusion: { ...diffusion, averages } } as GivenParameters;
}
