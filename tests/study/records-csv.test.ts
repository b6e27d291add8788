import { describe, expect, it } from 'vitest';
import { csvCell, recordsCsvHead, recordsCsvRows } from '../../src/study/records-csv.js';
import { inventedRecord } from './records.js';

describe('records as a table', () => {
  it.each([
    ['plain', 'plain'],
    ['a, b', '"a, b"'],
    ['say "so"', '"say ""so"""'],
    ['=HYPERLINK("x")', '"\'=HYPERLINK(""x"")"'],
    ['-1', "'-1"],
    [-1, '-1'],
    [null, ''],
    [undefined, ''],
    [true, 'true'],
  ])('%j is the cell %s', (value, cell) => {
    expect(csvCell(value)).toBe(cell);
  });

  it('has as many cells in every row as in its head, also for a session without series', () => {
    const columns = recordsCsvHead.split(',').length;
    const row = recordsCsvRows({ ...inventedRecord, reasons: [] });
    expect(row.endsWith('\r\n')).toBe(true);
    expect(
      row
        .trimEnd()
        .replace(/"[^"]*"/g, '')
        .split(','),
    ).toHaveLength(columns);
    expect(recordsCsvRows({ ...inventedRecord, series: [] })).toBe('');
  });
});
