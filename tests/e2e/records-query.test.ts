import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { DuckDBInstance, listValue } from '@duckdb/node-api';
import { describe, expect, it } from 'vitest';
import { auditRecords, inventedRecords, shippedStudy } from '../../scripts/invented-records.js';
import type { SessionRecord } from '../../src/study/record.js';
import { recordLine } from '../../src/study/record-line.js';
import type { PresetReport } from '../../src/study/record-report.js';
import type { SeriesReport } from '../../src/study/record-report-series.js';
import { runCommand } from '../commands/run-command.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { inventedRecord, inventedSeries } from '../study/records.js';

/** The documented query, asked of files by DuckDB. */
async function asked(files: readonly string[]): Promise<Record<string, unknown>[]> {
  const database = await DuckDBInstance.create(':memory:', { autoinstall_known_extensions: 'false' });
  const connection = await database.connect();
  const reader = await connection.runAndReadAll(readFileSync('scripts/records-by-series.sql', 'utf8'), { files: listValue([...files]) });
  const rows = reader.getRowObjectsJson().map((row) =>
    // Whole numbers of 64 bits come as text.
    Object.fromEntries(
      Object.entries(row).map(([key, value]) => [key, typeof value === 'string' && /^-?\d+$/.test(value) ? Number(value) : value]),
    ),
  );
  connection.closeSync();
  return rows;
}

/** The report's own counts in the form of the query. */
function countedBy(preset: PresetReport, series: SeriesReport): Record<string, unknown> {
  const thickness = series.parameters.find(({ key }) => key === 'sliceThicknessMm');
  return {
    preset: preset.preset,
    series: series.series,
    recorded: series.recorded,
    run: series.run,
    repeated: series.repeated,
    given_up: series.givenUp,
    rewritten: series.rewritten,
    rewritten_diagnostic: series.quality.rewritten.diagnostic,
    without_reason: series.reasons.find(({ word }) => word === '')?.count ?? 0,
    crossed: series.crossed.times,
    thicker: thickness?.up ?? 0,
    thicker_median_mm: thickness?.difference?.median ?? null,
    thicker_high_quartile_mm: thickness?.difference?.highQuartile ?? null,
    times_read: series.prediction.time?.spread.count ?? 0,
  };
}

async function reported(files: readonly string[]): Promise<Record<string, unknown>[]> {
  const { exit, out } = await runCommand(['records', 'report', ...files, '--json'], { homeFolder: '/nonexistent-home' });
  expect(exit).toBe(0);
  const { presets } = JSON.parse(out) as { presets: PresetReport[] };
  const rows = presets.flatMap((preset) => preset.series.map((series) => countedBy(preset, series)));
  const name = ({ preset, series }: Record<string, unknown>) => `${String(preset)} ${String(series)}`;
  return rows.sort((a, b) => (name(a) < name(b) ? -1 : 1));
}

function fileOf(name: string, records: Iterable<SessionRecord>, after = ''): string {
  const path = join(temporaryFolder(), name);
  writeFileSync(path, `${[...records].map((record) => `\n${recordLine(record)}\n`).join('')}${after}`);
  return path;
}

describe('the documented query', () => {
  it('gives the counts of the report: two presets, two files, a line cut short', async () => {
    const one = fileOf('a.jsonl', inventedRecords(400, 11), recordLine(auditRecords()[0]!).slice(0, 700));
    const two = fileOf('b.jsonl', inventedRecords(300, 12, shippedStudy('knee-3t')));
    const rows = await asked([one, two]);
    expect(rows.length).toBeGreaterThan(7);
    expect(rows).toEqual(await reported([one, two]));
  });

  it('gives those of forty liver sessions, and of a file counted by hand', async () => {
    const audit = fileOf('audit.jsonl', auditRecords());
    const [row] = await asked([audit]);
    expect(row).toMatchObject({
      recorded: 40,
      run: 40,
      rewritten: 16,
      without_reason: 1,
      crossed: 1,
      thicker: 16,
      thicker_median_mm: 1,
      thicker_high_quartile_mm: 1.25,
    });
    expect([row]).toEqual(await reported([audit]));

    const plain = { ...inventedSeries, used: inventedSeries.planned, reason: '', crossed: [] };
    const byHand = fileOf('hand.jsonl', [
      { ...inventedRecord, series: [inventedSeries, { ...plain, id: 'dwi', outcome: 'given-up' }] },
      { ...inventedRecord, reasons: [' '], series: [{ ...inventedSeries, reason: '' }] },
      { ...inventedRecord, reasons: [], series: [plain] },
    ]);
    const rows = await asked([byHand]);
    expect(rows).toMatchObject([
      { preset: 'liver-3t', series: 'dwi', recorded: 1, run: 0, given_up: 1, rewritten: 0, without_reason: 0, crossed: 0 },
      { preset: 'liver-3t', series: 't1-3d', recorded: 3, run: 3, given_up: 0, rewritten: 2, without_reason: 1, crossed: 2, times_read: 3 },
    ]);
    expect(rows).toEqual(await reported([byHand]));
  });
});
