/**
 * Invented records, for trying the report and for the tests and the bench: nobody was scanned. Every one says so: its `tool` ends in
 * `invented` and its scanner is an `invented scanner`. Figures are those of the model for the values that were made up.
 *
 * `node --import tsx scripts/invented-records.ts 200 > records.jsonl`, a second number is the seed; `audit` instead of the count
 * gives the forty liver sessions of the example in README.md.
 */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { unknownBody } from '../src/calc/body.js';
import { classRow } from '../src/calc/classes.js';
import { modelVersion } from '../src/calc/model-version.js';
import { plainScanner } from '../src/calc/scanner.js';
import { classOf, type GivenParameters } from '../src/calc/series.js';
import { presetBaseline, seriesResult } from '../src/session/series-result.js';
import { readPreset } from '../src/study/read-preset.js';
import { noRecordedLimits, type RecordedSeries, type SessionRecord } from '../src/study/record.js';
import { recordLine } from '../src/study/record-line.js';
import type { Study, StudySeries } from '../src/study/study.js';
import { toolVersion } from '../src/study/tool-version.js';

/** Whole numbers below a bound, the same row of them for the same seed (mulberry32, public domain). */
function chance(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return Math.floor((((t ^ (t >>> 14)) >>> 0) / 4294967296) * below);
  };
}

/** A shipped preset by its id; looked for from the project's folder, where scripts, tests and bench are run. */
export function shippedStudy(id: string): Study {
  const read = readPreset(readFileSync(`presets/${id}.json`, 'utf8'), id);
  if (!read.ok) throw new Error(read.problems[0]?.message);
  return read.value;
}

type Values = Pick<RecordedSeries, 'planned' | 'used' | 'crossed'>;

/** What a record says of a series that was planned as the preset has it and run with some values set. */
export function rewritten(study: Study, series: StudySeries, set: GivenParameters): Values {
  const baseline = presetBaseline(series, study.fieldT);
  const circumstances = { scanner: plainScanner(study.fieldT), body: unknownBody, rules: new Map() };
  const own = classRow(classOf(series)).parameters;
  const valuesWith = (values: GivenParameters) => {
    const { parameters, evaluation, mustKeeps } = seriesResult(series, values, baseline, circumstances);
    const kept = Object.entries(parameters).filter(([key, value]) => value !== undefined && (own as readonly string[]).includes(key));
    const crossed = mustKeeps.filter(({ status }) => status === 'crossed').map(({ text }) => ({ rule: text, role: null }));
    return { parameters: Object.fromEntries(kept) as GivenParameters, figures: evaluation.figures, crossed };
  };
  const { crossed: _none, ...planned } = valuesWith({});
  const { crossed, ...used } = valuesWith(set);
  return { planned, used, crossed };
}

const plain: Omit<RecordedSeries, 'id' | keyof Values> = {
  outcome: 'done',
  reason: '',
  quality: 'diagnostic',
  readings: { before: null, after: null },
};

function recordOf(study: Study, number: number, day: string | null, series: readonly RecordedSeries[]): SessionRecord {
  return {
    format: 'holdfast record',
    version: 1,
    id: number.toString(16).padStart(16, '0'),
    tool: `${toolVersion} invented`,
    model: modelVersion,
    day,
    preset: { id: study.id, revision: study.revision, hash: 'invented' },
    region: study.region,
    fieldT: study.fieldT,
    scanner: 'invented scanner',
    coil: 'invented coil',
    role: 'technologist',
    initials: null,
    reasons: [],
    limits: noRecordedLimits,
    series,
    recommendation: null,
  };
}

/**
 * Forty invented liver sessions: the dynamic series ran with slices of 4 mm twelve times and of 5 mm three times (breath-hold short),
 * once with 6 mm beyond its must-keep and without a reason, else as planned; eight sessions started from revision 2, the others from 3.
 */
export function auditRecords(study: Study = shippedStudy('liver-3t')): SessionRecord[] {
  const dynamic = study.series.find(({ id }) => id === 't1-3d');
  if (dynamic === undefined) throw new Error(`${study.id} has no series t1-3d`);
  const use = (set: GivenParameters, more: Partial<RecordedSeries>): RecordedSeries => ({
    ...plain,
    id: dynamic.id,
    class: classOf(dynamic),
    ...rewritten(study, dynamic, set),
    ...more,
  });
  const short = { reason: 'breath-hold-short' } as const;
  const four = use({ sliceThicknessMm: 4, sliceCount: 54 }, short);
  const five = use({ sliceThicknessMm: 5, sliceCount: 44 }, short);
  const six = use({ sliceThicknessMm: 6, sliceCount: 36 }, {});
  const asPlanned = use({}, {});
  return Array.from({ length: 40 }, (_, i) => {
    const series = i < 12 ? four : i < 15 ? five : i === 15 ? six : asPlanned;
    // Every fifth session had not noticed the new revision.
    const revision = i % 5 === 0 ? 2 : 3;
    return recordOf({ ...study, revision }, i + 1, dayAfter('2026-01-05', 2 * i), [series]);
  });
}

/** A day of the calendar so many days after another. */
function dayAfter(day: string, days: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
}

interface Choice extends Partial<RecordedSeries> {
  readonly set: GivenParameters;
}

/** What technologists are made to do here with any series, and how often out of twenty. */
function choicesFor(series: StudySeries): readonly Choice[] {
  const p = series.parameters;
  const thicker = { sliceThicknessMm: p.sliceThicknessMm + 1, sliceCount: Math.max(1, Math.round(p.sliceCount * 0.8)) };
  const rows: readonly (readonly [number, Choice])[] = [
    [11, { set: {} }],
    [3, { set: thicker, reason: 'breath-hold-short' }],
    [1, { set: { ...thicker, pixelBandwidthHz: p.pixelBandwidthHz + 40 }, reason: 'pain', quality: 'limited' }],
    [1, { set: { matrixPhase: p.matrixPhase - 16 }, reason: 'late-slot' }],
    [1, { set: { phaseOversamplingPercent: p.phaseOversamplingPercent + 20 }, reason: 'wrap' }],
    [1, { set: { phaseDirection: p.phaseDirection === 'AP' ? 'RL' : 'AP' }, reason: 'flow-or-csf-ghosts' }],
    [1, { set: {}, outcome: 'repeated', reason: 'repeat-for-quality', quality: 'limited' }],
    [1, { set: {}, outcome: 'given-up', reason: 'claustrophobia', quality: null }],
  ];
  return rows.flatMap(([times, choice]) => Array.from({ length: times }, () => choice));
}

/** Any number of invented sessions of one preset, one after the other over two years. The same seed gives the same records. */
export function* inventedRecords(count: number, seed = 1, study: Study = shippedStudy('liver-3t')): Generator<SessionRecord> {
  const below = chance(seed);
  const choices = study.series.map((series) => {
    return choicesFor(series).map(
      ({ set, ...more }): RecordedSeries => ({
        ...plain,
        id: series.id,
        class: classOf(series),
        ...rewritten(study, series, set),
        ...more,
      }),
    );
  });
  const roles = ['technologist', 'technologist', 'technologist', 'lead technologist', 'trainee'];
  for (let i = 0; i < count; i += 1) {
    const day = dayAfter('2024-06-03', Math.floor((i * 700) / count));
    const series = choices.map((list): RecordedSeries => {
      const chosen = list[below(list.length)] as RecordedSeries;
      const { scanTimeS, b1PlusRmsUt } = chosen.used.figures;
      if (below(4) > 0 || typeof scanTimeS !== 'number' || typeof b1PlusRmsUt !== 'number') return chosen;
      const timeS = Math.round(scanTimeS * (103 + below(4)) * 0.1) / 10;
      const sarWkg = (10 + below(10)) / 10;
      const after = { timeS, b1rmsUt: Math.round(b1PlusRmsUt * (95 + below(20))) / 100, sarWkg };
      return { ...chosen, readings: { before: { sarWkg }, after } };
    });
    const record = recordOf({ ...study, revision: 1 + below(3) }, seed * 2 ** 32 + i, day, series);
    yield {
      ...record,
      scanner: `invented scanner ${below(2) === 0 ? 'A' : 'B'}`,
      role: roles[below(roles.length)] as string,
      reasons: below(10) === 0 ? ['late-slot'] : [],
    };
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const [how = '200', seed = '1'] = process.argv.slice(2);
  for (const record of how === 'audit' ? auditRecords() : inventedRecords(Number(how), Number(seed))) {
    process.stdout.write(`\n${recordLine(record)}\n`);
  }
}
