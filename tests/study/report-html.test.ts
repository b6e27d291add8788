import { describe, expect, it } from 'vitest';
import { auditRecords, inventedRecords } from '../../scripts/invented-records.js';
import { RecordCounts, type RecordReport } from '../../src/study/record-report.js';
import { reportHtml } from '../../src/study/report-html.js';
import { barPlot, escapeHtml } from '../../src/study/report-html-plots.js';
import { inventedRecord, inventedSeries } from './records.js';

const around = { chosen: '', damaged: 0, files: 1, current: new Map([['liver-3t', 3]]), suggestions: [] };

function pageOf(report: RecordReport): string {
  return reportHtml(report, around);
}

function reportOf(records: Iterable<Parameters<RecordCounts['add']>[0]>): RecordReport {
  const counts = new RecordCounts();
  for (const record of records) counts.add(record);
  return counts.report();
}

describe('reportHtml', () => {
  it('needs nothing else: no script, no address, no style or picture from outside', () => {
    const html = pageOf(reportOf(inventedRecords(120)));
    expect(html).not.toMatch(/<script|https?:|\bon\w+=|<link rel="stylesheet|<img|@import|url\(/i);
    expect(html.match(/<svg /g)!.length).toBeGreaterThan(20);
  });

  it('has the counts in words beside every plot', () => {
    const html = pageOf(reportOf(auditRecords()));
    expect(html).toContain('rewritten 16 of 40 (40 %)');
    expect(html).toContain('aria-label="Reasons: breath-hold short 15, NO REASON GIVEN 1"');
    expect(html).toContain('aria-label="slice thickness, used instead: 4 mm 12, 5 mm 3, 6 mm 1"');
    expect(html).toContain('8 from rev 2, current rev 3 (32 sessions)');
    expect(html).toContain('ACCEPTED BY NOBODY');
    expect(html).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('shows what a hostile record says as text', () => {
    const nasty = '<script>alert(1)</script>"\'&';
    const series = { ...inventedSeries, id: nasty, reason: nasty, crossed: [{ rule: nasty, role: nasty }] };
    const record = { ...inventedRecord, preset: { ...inventedRecord.preset, id: nasty }, region: nasty, role: nasty, series: [series] };
    const html = reportHtml(reportOf([record]), { ...around, chosen: nasty });
    expect(html).not.toContain('<script');
    expect(html).toContain(escapeHtml(nasty));
  });

  it('says so where there is nothing', () => {
    const html = pageOf(reportOf([]));
    expect(html).toContain('0 sessions recorded, no days recorded');
  });

  it('draws bars in proportion to their counts', () => {
    const widths = [
      ...barPlot('t', [
        { label: 'a', value: 10 },
        { label: 'b', value: 5 },
        { label: 'c', value: 0 },
      ]).matchAll(/width="([\d.]+)" height/g),
    ].map(([, w]) => Number(w));
    expect([widths[1]! / widths[0]!, widths[2]]).toEqual([0.5, 0]);
    expect(barPlot('t', [])).toBe('');
  });
});
