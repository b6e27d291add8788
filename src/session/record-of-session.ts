import { classRow } from '../calc/classes.js';
import type { Figures } from '../calc/figures.js';
import { modelVersion } from '../calc/model-version.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { classOf } from '../calc/series.js';
import { type RecordedSeries, type RecordedValues, recordVersion, type SessionRecord } from '../study/record.js';
import { comparedReadings } from '../study/record-prediction.js';
import type { SeriesOutcome } from '../study/record-words.js';
import type { Study, StudySeries } from '../study/study.js';
import { toolVersion } from '../study/tool-version.js';
import { equipmentNow, scannerNow } from './equipment.js';
import { filedStudy } from './judged-study.js';
import { modelOfPreset, resultNow, resultOfPreset, sessionSeries, studySeries } from './results.js';
import type { SeriesResult } from './series-result.js';
import type { SessionSeries } from './session.js';
import type { State } from './state.js';

/** How a series goes into the record: as was said, else as its state and its changes say. */
export function outcomeOf(series: SessionSeries): SeriesOutcome | 'left-out' {
  if (series.outcome !== null) return series.outcome;
  if (series.state === 'repeated') return 'repeated';
  if (series.state === 'not-done' || series.state === 'stopped-early') return 'given-up';
  if (series.state === 'done' || series.state === 'running') return 'done';
  return Object.keys(series.set).length > 0 ? 'done' : 'left-out';
}

/** The must-keeps that a series crosses, in words. */
function crossedRules(state: State, id: string): readonly string[] {
  return resultNow(state, id)
    .mustKeeps.filter(({ status }) => status === 'crossed')
    .map(({ text }) => text);
}

/** One series as the record holds it. */
export function recordedSeries(state: State, id: string): RecordedSeries {
  const series = sessionSeries(state, id);
  const outcome = outcomeOf(series);
  const used = valuesOf(studySeries(state, id), resultNow(state, id));
  const { before, after } = series;
  const compared = comparedReadings(modelOfPreset(state, id).evaluation.figures, used.figures, { before, after });
  return {
    id,
    class: classOf(studySeries(state, id)),
    outcome: outcome === 'left-out' ? 'given-up' : outcome,
    reason: series.reason,
    quality: series.quality,
    planned: valuesOf(studySeries(state, id), resultOfPreset(state, id)),
    used,
    crossed: crossedRules(state, id).map((rule) => ({ rule, role: series.accepted[rule] ?? null })),
    readings: { before, after, ...(compared === null ? {} : { compared }) },
  };
}

/** The session as a record: series that were left untouched are left out. Its id and day are given when it is saved. */
export function recordOfSession(state: State): Omit<SessionRecord, 'id' | 'day'> | null {
  const { session, opened } = state;
  if (session === null || opened === null) return null;
  const { study } = opened;
  const { scanner, scannerName, coilName } = equipmentNow(state) ?? opened;
  return {
    format: 'holdfast record',
    version: recordVersion,
    tool: toolVersion,
    model: modelVersion,
    preset: { id: study.id, revision: study.revision, hash: opened.hash },
    region: study.region,
    fieldT: scanner.fieldT,
    scanner: scannerName,
    coil: coilName === '' ? null : coilName,
    role: session.role,
    initials: session.initials === '' ? null : session.initials,
    reasons: session.reasons,
    limits: session.limits,
    series: session.series.filter((series) => outcomeOf(series) !== 'left-out').map(({ id }) => recordedSeries(state, id)),
    recommendation: session.recommendation,
  };
}

/** Parameters of the class and all figures. */
function valuesOf(series: StudySeries, { parameters, evaluation }: SeriesResult): RecordedValues {
  const own = classRow(classOf(series)).parameters;
  const given = Object.fromEntries(
    Object.entries(parameters as Parameters).filter(([key, value]) => value !== undefined && (own as readonly string[]).includes(key)),
  );
  return { parameters: given as GivenParameters, figures: evaluation.figures as Partial<Figures> };
}

/** The study with the values of this session in place: what is saved as a draft preset. */
export function studyOfSession(state: State): Study | null {
  const { opened, session } = state;
  if (opened === null || session === null) return null;
  const study = filedStudy(opened);
  const used = scannerNow(state)?.fieldT ?? study.fieldT;
  // A magnet a few percent off its name is still one of that field.
  const fieldT = Math.abs(used - study.fieldT) > 0.05 * study.fieldT ? used : study.fieldT;
  return { ...study, fieldT, series: study.series.map((series) => ({ ...series, parameters: resultNow(state, series.id).parameters })) };
}
