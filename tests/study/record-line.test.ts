import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { crc32 } from '../../src/study/crc32.js';
import { withSum } from '../../src/study/line-sum.js';
import { noRecordedLimits } from '../../src/study/record.js';
import { recordLine, tidyRecord } from '../../src/study/record-line.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';
import { anyRecord, inventedRecord, inventedSeries } from './records.js';

const bytesOf = (text: string) => new TextEncoder().encode(text);

function codeOf(line: string): string | null {
  const outcome = readRecordLine(line);
  return outcome.ok ? null : (outcome.problems[0]?.code ?? 'no problem given');
}

describe('recordLine', () => {
  it('writes the keys of the format in their order, sum last', () => {
    const line = JSON.parse(recordLine(inventedRecord)) as Record<string, unknown> & {
      preset: object;
      series: { readings: object; crossed: object[] }[];
    };
    expect(Object.keys(line)).toEqual([
      'format',
      'version',
      'id',
      'tool',
      'model',
      'day',
      'preset',
      'region',
      'fieldT',
      'scanner',
      'coil',
      'role',
      'initials',
      'reasons',
      'limits',
      'series',
      'recommendation',
      'sum',
    ]);
    expect(Object.keys(line.preset)).toEqual(['id', 'revision', 'hash']);
    expect(Object.keys(line.series[0]!)).toEqual(['id', 'outcome', 'reason', 'quality', 'planned', 'used', 'crossed', 'readings']);
    expect(Object.keys(line.series[0]!.readings)).toEqual(['before', 'after']);
    expect(Object.keys(line.series[0]!.crossed[0]!)).toEqual(['rule', 'role']);
  });

  it('sums the UTF-8 bytes before ,"sum" as eight lower-case hexadecimal digits', () => {
    const line = recordLine({ ...inventedRecord, scanner: 'salle bleue, étage 2 µ' });
    const [, body, sum] = /^(.*),"sum":"([0-9a-f]{8})"\}$/.exec(line)!;
    expect(Number.parseInt(sum!, 16)).toBe(crc32(bytesOf(body!)));
    expect(withSum('{"a":1}')).toBe('{"a":1,"sum":"a702fc6e"}');
  });

  it('is one line without control characters, whatever was typed', () => {
    fc.assert(fc.property(anyRecord, (record) => !/[\p{Cc}\p{Zl}\p{Zp}]/u.test(recordLine(record))));
  });

  it('keeps free text to 80 characters', () => {
    const long = 'x'.repeat(200);
    const tidy = tidyRecord({
      ...inventedRecord,
      reasons: [long],
      series: [{ ...inventedSeries, reason: long }],
      limits: { ...noRecordedLimits, labelConditions: [long] },
    });
    expect([tidy.reasons[0], tidy.series[0]!.reason, tidy.limits.labelConditions[0]].map((text) => text!.length)).toEqual([80, 80, 80]);
  });

  it('names nobody and no moment: every key is one of those the format lists', () => {
    const keys = new Set<string>();
    JSON.stringify(JSON.parse(recordLine(inventedRecord)), (key, value: unknown) => {
      keys.add(key);
      return value;
    });
    for (const forbidden of ['name', 'patient', 'birthDate', 'accession', 'referrer', 'time', 'date', 'serial', 'host', 'user']) {
      expect(
        [...keys].filter(
          (key) =>
            key.toLowerCase().includes(forbidden.toLowerCase()) &&
            !['repetitionTimeMs', 'echoTimeMs', 'scanTimeS', 'holdTimeS', 'nullTimeMs', 'timeS'].includes(key),
        ),
      ).toEqual([]);
    }
    expect(recordLine(inventedRecord)).not.toMatch(/\d\d:\d\d/);
  });
});

describe('tidyRecord', () => {
  it('leaves out a parameter that is no number, whole, and writes such a figure as null', () => {
    const used = {
      parameters: { averages: Number.NaN, sliceCount: 5, diffusion: { bValuesSPerMm2: [0, Number.NaN], directions: 3, averages: [1, 1] } },
      figures: { scanTimeS: Number.POSITIVE_INFINITY, holds: 2 },
    };
    const tidy = tidyRecord({ ...inventedRecord, series: [{ ...inventedSeries, used }] });
    expect(tidy.series[0]!.used).toEqual({ parameters: { sliceCount: 5 }, figures: { scanTimeS: null, holds: 2 } });
  });
});

describe('readRecordLine', () => {
  it('gives back any record that recordLine wrote, cleaned', () => {
    fc.assert(
      fc.property(anyRecord, (record) => {
        const outcome = readRecordLine(recordLine(record));
        expect(outcome).toEqual({ ok: true, value: tidyRecord(record) });
      }),
    );
  });

  it('writes what it read as the very same line', () => {
    fc.assert(
      fc.property(anyRecord, (record) => {
        const line = recordLine(record);
        const outcome = readRecordLine(line);
        expect(outcome.ok && recordLine(outcome.value)).toBe(line);
      }),
    );
  });

  it('notices every single byte that changed', () => {
    const line = recordLine({ ...inventedRecord, scanner: 'étage 2' });
    const bytes = bytesOf(line);
    for (let at = 0; at < bytes.length; at += 1) {
      for (const flip of [0x01, 0x20, 0x80, 0xff]) {
        const harmed = bytes.slice();
        harmed[at]! ^= flip;
        expect(readRecordLine(new TextDecoder().decode(harmed), harmed).ok, `byte ${at} flipped by ${flip}`).toBe(false);
      }
    }
  });

  it('notices a line cut anywhere', () => {
    const line = recordLine(inventedRecord);
    for (let length = 0; length < line.length; length += 1) expect(readRecordLine(line.slice(0, length)).ok).toBe(false);
  });

  it('says which kind of damage it met', () => {
    const line = recordLine(inventedRecord);
    const json = line.replace(/,"sum".*/, '}');
    expect(codeOf(line)).toBe(null);
    expect(codeOf(`${line}\r`)).toBe(null);
    expect(codeOf(json)).toBe('record-cut-short');
    expect(codeOf(line.replace('blue room', 'grey room'))).toBe('record-sum-differs');
    expect(codeOf(withSum('{"format":}'))).toBe('record-not-json');
    expect(codeOf(withSum(json.replace('"version":1', '"version":2')))).toBe('record-of-later-version');
    expect(codeOf(withSum('{"format":"something else","version":1}'))).toBe('record-shape');
    expect(codeOf(withSum('[1]'))).toBe('record-not-json');
  });

  it.each([
    ['2024-02-29', true],
    ['2000-02-29', true],
    ['2100-02-29', false],
    ['2026-02-29', false],
    ['2026-04-31', false],
    ['2026-13-01', false],
    ['2026-00-10', false],
    ['2026-12-31', true],
    ['2026-1-1', false],
  ])('takes the day %s for one of the calendar: %s', (day, expected) => {
    expect(readRecordLine(recordLine({ ...inventedRecord, day })).ok).toBe(expected);
  });

  it.each([
    ['day', (json: string) => json.replace('2026-03-02', '2026-02-30')],
    ['day', (json: string) => json.replace('2026-03-02', '2026-03-02T10:11:12')],
    ['series.0.outcome', (json: string) => json.replace('"done"', '"finished"')],
    ['series.0.used.figures.scanTimeS', (json: string) => json.replace('"scanTimeS":10.8', '"scanTimeS":"10.8"')],
    ['series.0.used.parameters.sliceCount', (json: string) => json.replace('"sliceCount":54', '"sliceCount":null')],
    ['series.0.used.parameters.pacing.kind', (json: string) => json.replace('"sliceCount":54', '"pacing":{}')],
    ['series.0.used.parameters.pacing', (json: string) => json.replace('"sliceCount":54', '"pacing":"none"')],
    ['limits.holdState', (json: string) => json.replace('"expiration"', '"half way"')],
    ['reasons.0', (json: string) => json.replace('"reasons":["breath-hold-short"]', '"reasons":[3]')],
    ['series', (json: string) => json.replace(/"series":.*,"recommendation"/, '"series":{},"recommendation"')],
    ['recommendation', (json: string) => json.replace('make-this-a-variant', 'release')],
  ])('names %s as the place where the shape is wrong', (path, change) => {
    const json = recordLine(inventedRecord).replace(/,"sum".*/, '}');
    expect(change(json)).not.toBe(json);
    const outcome = readRecordLine(withSum(change(json)));
    expect(outcome.ok ? null : outcome.problems[0]).toMatchObject({ code: 'record-shape', path });
  });
});
