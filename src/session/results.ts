import type { Baseline } from '../calc/baseline.js';
import type { Body } from '../calc/body.js';
import { type Readings, readingKeys } from '../calc/reading.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters } from '../calc/series.js';
import { endedBy } from '../study/reading-conditions.js';
import type { ReadingConditions } from '../study/record.js';
import type { StudySeries } from '../study/study.js';
import { equipmentNow, scannerNow } from './equipment.js';
import { presetBaseline, type SeriesResult, seriesResult } from './series-result.js';
import type { SessionSeries } from './session.js';
import type { State } from './state.js';

const noReadings: Readings = {};

/** How many results of one series are kept: the present one, its neighbours, a chart. */
const mostKept = 160;

interface Kept {
  readonly baseline: Baseline;
  /** Results by what they hang on, oldest first. */
  readonly results: Map<string, SeriesResult>;
  /** The result last asked for with these very values: most questions come with the same object. */
  readonly latest: WeakMap<
    GivenParameters,
    {
      readonly series: SessionSeries['before'];
      readonly frontBackMm: number | null;
      readonly leftRightMm: number | null;
      readonly rules: State['rules'];
      readonly scanner: Scanner | null;
      readonly result: SeriesResult;
    }
  >;
}

/** What was worked out for a series of a study, for as long as the study is open. */
const kept = new WeakMap<StudySeries, Kept>();

/** The series of the study behind a series of the session. */
export function studySeries(state: State, id: string): StudySeries {
  const found = state.opened?.study.series.find((series) => series.id === id);
  if (found === undefined) throw new Error(`no series ${id} in the study`);
  return found;
}

/** The series of the session by its id. */
export function sessionSeries(state: State, id: string): SessionSeries {
  const found = state.session?.series.find((series) => series.id === id);
  if (found === undefined) throw new Error(`no series ${id} in the session`);
  return found;
}

function keptOf(state: State, series: StudySeries): Kept {
  let known = kept.get(series);
  if (known === undefined) {
    known = {
      baseline: presetBaseline(series, state.opened?.study.fieldT ?? series.parameters.repetitionTimeMs, state.opened?.scanner.pauses),
      results: new Map(),
      latest: new WeakMap(),
    };
    kept.set(series, known);
  }
  return known;
}

/** What the scanner displayed for the preset, as the model takes it: without what no longer holds for this coil, body or field. */
export function readingsOf(state: State, { before }: SessionSeries): Readings {
  if (before === null) return noReadings;
  const now = conditionsNow(state);
  const readings: { -readonly [K in keyof Readings]: Readings[K] } = {};
  for (const key of readingKeys) {
    const value = before[key];
    if (value !== undefined && endedBy(before, key, now) === null) readings[key] = value;
  }
  return readings;
}

/** What a number that is typed now was read with. */
export function conditionsNow(state: State): ReadingConditions {
  const equipment = equipmentNow(state);
  const { frontBackMm, leftRightMm } = bodyOf(state);
  return { coil: equipment?.coilName || null, fieldT: equipment?.scanner.fieldT ?? 0, frontBackMm, leftRightMm };
}

/** This patient's extents. */
export function bodyOf(state: State): Body {
  return { frontBackMm: state.session?.limits.frontBackMm ?? null, leftRightMm: state.session?.limits.leftRightMm ?? null };
}

/**
 * Everything there is to say about a series with some values set. Worked out once for the same values: a key press costs only what
 * it changed.
 */
export function resultWith(state: State, id: string, set: GivenParameters): SeriesResult {
  const series = studySeries(state, id);
  const own = keptOf(state, series);
  const { before } = sessionSeries(state, id);
  const body = bodyOf(state);
  const scanner = scannerNow(state);
  const last = own.latest.get(set);
  if (
    last !== undefined &&
    last.series === before &&
    last.frontBackMm === body.frontBackMm &&
    last.leftRightMm === body.leftRightMm &&
    last.rules === state.rules &&
    last.scanner === scanner
  )
    return last.result;
  const result = keptResult(state, series, own, set, body, readingsOf(state, sessionSeries(state, id)));
  own.latest.set(set, { series: before, ...body, rules: state.rules, scanner, result });
  return result;
}

/** Scanners by a number of their own: what is worked out on one is nothing for another. */
const scannerNumbers = new WeakMap<Scanner, number>();
let scannersSeen = 0;

function numberOf(scanner: Scanner): number {
  let number = scannerNumbers.get(scanner);
  if (number === undefined) {
    scannersSeen += 1;
    number = scannersSeen;
    scannerNumbers.set(scanner, number);
  }
  return number;
}

/** The same by what the values say, not by which object holds them. */
function keptResult(
  state: State,
  series: StudySeries,
  own: Kept,
  set: GivenParameters,
  body: Body,
  readings: Readings,
  scanner = scannerNow(state) ?? own.baseline.model.scanner,
): SeriesResult {
  const key = JSON.stringify([set, readings, body, state.rules.size, numberOf(scanner)]);
  const known = own.results.get(key);
  if (known !== undefined) return known;
  // The plain scanner of the preset's own field is the baseline's own: nothing is carried.
  const same = scanner.name === own.baseline.model.scanner.name && scanner.fieldT === own.baseline.model.scanner.fieldT;
  const circumstances = { scanner: same ? own.baseline.model.scanner : scanner, body, rules: state.rules };
  const result = seriesResult(series, set, own.baseline, circumstances, { readings });
  if (own.results.size >= mostKept) own.results.delete(own.results.keys().next().value as string);
  own.results.set(key, result);
  return result;
}

/** A series as it stands now. */
export function resultNow(state: State, id: string): SeriesResult {
  return resultWith(state, id, sessionSeries(state, id).set);
}

const nothingSet: GivenParameters = {};

/** The preset of a series as the model alone has it, whatever was read. */
export function modelOfPreset(state: State, id: string): SeriesResult {
  const series = studySeries(state, id);
  return keptResult(state, series, keptOf(state, series), nothingSet, bodyOf(state), noReadings);
}

/** The preset of a series under the same circumstances. */
export function resultOfPreset(state: State, id: string): SeriesResult {
  return resultWith(state, id, nothingSet);
}

/** The preset of a series as its file has it, at its own field, whatever scanner the session is on. */
export function resultOnOwnField(state: State, id: string): SeriesResult {
  const series = studySeries(state, id);
  const own = keptOf(state, series);
  const readings = readingsOf(state, sessionSeries(state, id));
  return keptResult(state, series, own, nothingSet, bodyOf(state), readings, own.baseline.model.scanner);
}
