import { describe, expect, it } from 'vitest';
import { auditRecords, inventedRecords, shippedStudy } from '../../scripts/invented-records.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { RecordedSeries, SessionRecord } from '../../src/study/record.js';
import { RecordCounts, type RecordReport, revisionWords } from '../../src/study/record-report.js';
import { suggestVariant } from '../../src/study/record-report-suggestion.js';
import { writePreset } from '../../src/study/write-preset.js';
import { inventedRecord, inventedSeries } from './records.js';

function reportOf(records: Iterable<SessionRecord>): RecordReport {
  const counts = new RecordCounts();
  for (const record of records) counts.add(record);
  return counts.report();
}

const asPlanned: RecordedSeries = { ...inventedSeries, used: inventedSeries.planned, reason: '', crossed: [] };
const session = (series: RecordedSeries, more: Partial<SessionRecord> = {}): SessionRecord => ({
  ...inventedRecord,
  reasons: [],
  series: [series],
  ...more,
});

describe('a report over records', () => {
  // Scenario of the trade: forty liver sessions, 12 with 4 mm, 3 with 5 mm, 1 with 6 mm beyond the must-keep and without a reason.
  const study = { ...shippedStudy('liver-3t'), revision: 3 };
  const report = reportOf(auditRecords(study));
  const preset = report.presets[0]!;
  const series = preset.series[0]!;

  it('counts by direction and reason', () => {
    expect([report.sessions, series.run, series.rewritten, series.rates.rewritten]).toEqual([40, 40, 16, 0.4]);
    const thickness = series.parameters.find(({ key }) => key === 'sliceThicknessMm')!;
    expect([thickness.times, thickness.up, thickness.down]).toEqual([16, 16, 0]);
    expect(thickness.used).toEqual([
      { value: 4, count: 12 },
      { value: 5, count: 3 },
      { value: 6, count: 1 },
    ]);
    // 12 times +1, 3 times +2, once +3: the 8th and 9th are 1, the 12th and 13th 1 and 2 (quartile at 11.25 from 0).
    expect(thickness.difference).toEqual({ count: 16, least: 1, lowQuartile: 1, median: 1, highQuartile: 1.25, most: 3 });
    expect(series.reasons).toEqual([
      { word: 'breath-hold-short', count: 15 },
      { word: '', count: 1 },
    ]);
  });

  it('lists the breach, without reason and accepted by nobody', () => {
    expect(series.crossed).toMatchObject({ times: 1, withReason: 0, withRole: 0 });
    expect(series.crossed.breaches).toHaveLength(1);
    expect(series.crossed.breaches[0]).toMatchObject({ record: '0000000000000010', reason: '', role: null });
    expect(series.crossed.breaches[0]!.rule).toContain('voxel, slice 6 mm: must be at most 5 mm');
  });

  it('says that revisions are mixed', () => {
    expect(preset.revisions).toEqual([
      { revision: 2, sessions: 8 },
      { revision: 3, sessions: 32 },
    ]);
    expect(revisionWords(preset.revisions, 3)).toContain('8 from rev 2, current rev 3');
  });

  it('suggests the short-hold variant, as a draft with its evidence and no more', () => {
    const suggested = suggestVariant(study, preset, series, new Map());
    if (suggested.kind === 'none') throw new Error(suggested.why);
    const { study: variant, rewrite, evidence, mustKeeps, after } = suggested.suggestion;
    expect(rewrite).toMatchObject({ set: { sliceThicknessMm: 4, sliceCount: 54 }, times: 12, good: 12 });
    expect([variant.status, variant.notes.startsWith(evidence)]).toEqual(['draft', true]);
    expect(variant.title).toContain('variant to review: breath-hold short');
    expect(evidence).toContain('12 of 40 (30 %) records');
    expect(evidence).toContain('Must-keeps: 1 kept');
    expect(mustKeeps.map(({ status }) => status)).toEqual(['kept']);
    // 80 x 45 lines x 3.55 ms = 12.8 s, within 5 %.
    expect(Math.abs(after.holdTimeS! / 12.8 - 1)).toBeLessThan(0.05);
    const read = readPreset(writePreset(variant), 'variant.json');
    expect(read.ok && read.value.series.find(({ id }) => id === 't1-3d')?.parameters.sliceThicknessMm).toBe(4);
  });

  it('suggests nothing that crosses a must-keep, is there already, or was done fewer than five times', () => {
    const why = (records: readonly SessionRecord[], now = study) => {
      const own = reportOf(records).presets[0]!;
      const suggested = suggestVariant(now, own, own.series[0]!, new Map());
      return suggested.kind === 'none' ? suggested.why : suggested.suggestion.evidence;
    };
    const all = auditRecords(study);
    expect(why(all.slice(12))).toContain('fewer than 5');
    expect(why(all.slice(16))).toBe('it was never rewritten');
    const dynamic = study.series.find(({ id }) => id === 't1-3d')!;
    const strict = { ...dynamic, mustKeep: [{ figure: 'voxelSliceMm', atMost: 3.5, source: 'invented' } as const] };
    expect(why(all, { ...study, series: [strict] })).toContain('crosses a must-keep: voxel, slice 4 mm');
    const changed = { ...dynamic, parameters: { ...dynamic.parameters, sliceThicknessMm: 4, sliceCount: 54 } };
    expect(why(all, { ...study, series: [changed] })).toContain('has the change made most often already');
  });

  it('counts a small file as one counts it by hand', () => {
    const accepted = { ...inventedSeries, reason: '', crossed: [{ rule: 'coverage at least 200 mm', role: 'radiologist' }] };
    const records = [
      session(inventedSeries, { day: '2026-01-03' }),
      session(accepted, { day: '2026-01-01', reasons: ['late-slot', 'pain'], role: 'trainee' }),
      session({ ...asPlanned, outcome: 'repeated', quality: 'limited' }, { day: null, preset: { ...inventedRecord.preset, revision: 2 } }),
      session({ ...asPlanned, outcome: 'given-up', reason: 'claustrophobia', quality: null, readings: { before: null, after: null } }),
      session(asPlanned, { preset: { ...inventedRecord.preset, id: 'knee-3t' } }),
    ];
    const counted = reportOf(records);
    expect([counted.sessions, counted.withoutDay, counted.from, counted.to]).toEqual([5, 1, '2026-01-01', '2026-03-02']);
    expect(counted.presets.map(({ preset: id, sessions }) => [id, sessions])).toEqual([
      ['liver-3t', 4],
      ['knee-3t', 1],
    ]);
    const liver = counted.presets[0]!;
    expect(liver.roles).toEqual([
      { word: 'technologist', count: 3 },
      { word: 'trainee', count: 1 },
    ]);
    const [only] = liver.series;
    expect(only).toMatchObject({ recorded: 4, run: 3, done: 2, repeated: 1, givenUp: 1, rewritten: 2 });
    expect(only!.rates).toEqual({ rewritten: null, repeated: null, givenUp: null });
    expect(only!.reasons).toEqual([
      { word: '', count: 1 },
      { word: 'breath-hold-short', count: 1 },
      { word: 'claustrophobia', count: 1 },
      { word: 'late-slot', count: 1 },
      { word: 'pain', count: 1 },
    ]);
    expect(only!.parameters.map(({ key, times, down }) => [key, times, down])).toEqual([
      ['matrixPhase', 2, 2],
      ['sliceCount', 2, 2],
    ]);
    expect(only!.quality).toEqual({
      rewritten: { diagnostic: 2, limited: 0, not: 0, notSaid: 0 },
      asPlanned: { diagnostic: 0, limited: 1, not: 0, notSaid: 1 },
    });
    expect(only!.crossed).toMatchObject({ times: 2, withReason: 2, withRole: 2, rules: [{ word: 'coverage at least 200 mm', count: 2 }] });
    // Read 11.0 s against 10.8 s twice, and 11.0 s against the 17 s of the repeated one.
    const time = only!.prediction.time!;
    expect([time.spread.count, time.spread.median, time.spread.least]).toEqual([3, 0.019, -0.353]);
    expect(time.drift).toBeNull();
  });

  it('says how a prediction drifts, from the first to the last month with five readings', () => {
    const read = (day: string, timeS: number) => session({ ...inventedSeries, readings: { before: null, after: { timeS } } }, { day });
    const months = ['2026-01', '2026-02', '2026-03'];
    const records = months.flatMap((month, m) =>
      Array.from({ length: m === 1 ? 4 : 5 }, (_, i) => read(`${month}-0${i + 1}`, 10.8 * (1.03 + 0.01 * m))),
    );
    const { time } = reportOf(records).presets[0]!.series[0]!.prediction;
    expect(time!.months.map(({ month, count, median }) => [month, count, median])).toEqual([
      ['2026-01', 5, 0.03],
      ['2026-02', 4, 0.04],
      ['2026-03', 5, 0.05],
    ]);
    expect(time!.drift).toEqual({ from: '2026-01', to: '2026-03', change: 0.02 });
  });

  it('keeps its size whatever the records say', () => {
    const counts = new RecordCounts();
    const hostile = (i: number): SessionRecord => {
      const used = { ...inventedSeries.used, parameters: { ...inventedSeries.used.parameters, repetitionTimeMs: 4 + i * 0.01 } };
      const series = {
        ...inventedSeries,
        id: `s${i % 300}`,
        reason: `reason ${i}`,
        used,
        crossed: [{ rule: `rule ${i}`, role: `role ${i}` }],
      };
      return session(series, { preset: { id: `p${i % 700}`, revision: i, hash: '' }, role: `role ${i}` });
    };
    for (let i = 0; i < 20_000; i += 1) counts.add(hostile(i));
    const bounded = counts.report();
    expect(bounded.sessions).toBe(20_000);
    expect(bounded.presets.length).toBe(500);
    expect(bounded.leftOut.sessions).toBeGreaterThan(0);
    const one = new RecordCounts();
    for (let i = 0; i < 20_000; i += 1)
      one.add({ ...hostile(i), preset: inventedRecord.preset, series: [{ ...hostile(i).series[0]!, id: 'same' }] });
    const [only] = one.report().presets[0]!.series;
    expect(only!.recorded).toBe(20_000);
    expect(JSON.stringify(only).length).toBeLessThan(200_000);
    expect(only!.parameters.find(({ key }) => key === 'repetitionTimeMs')!.used.length).toBeLessThanOrEqual(512);
  });

  it('invented records say that they are, and are the same for the same seed', () => {
    const some = [...inventedRecords(20, 5)];
    expect(some).toEqual([...inventedRecords(20, 5)]);
    for (const { tool, scanner } of [...some, ...auditRecords()])
      expect([tool.endsWith('invented'), scanner.startsWith('invented')]).toEqual([true, true]);
  });
});
