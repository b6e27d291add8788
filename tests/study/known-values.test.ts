import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { KnownValues } from '../../src/study/known-values.js';
import { recordLine } from '../../src/study/record-line.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';

const lines = [...inventedRecords(40, 7)].map(recordLine);

describe('KnownValues', () => {
  it('parses every line as JSON.parse does', () => {
    const known = new KnownValues();
    for (const line of lines) expect(known.parse(line)).toEqual(JSON.parse(line));
  });

  it('gives planned values that came before as the same object, and used ones where they are equal', () => {
    const known = new KnownValues();
    type Parsed = { series: { id: string; planned: object; used: object }[] };
    const [first, second] = [known.parse(lines[0]!) as Parsed, known.parse(lines[1]!) as Parsed];
    const liver = (record: Parsed) => record.series.find(({ id }) => id === 't1-3d')!;
    expect(liver(first).planned).toBe(liver(second).planned);
    const all = lines.flatMap((line) => (known.parse(line) as Parsed).series);
    const unchanged = all.filter(({ planned, used }) => JSON.stringify(planned) === JSON.stringify(used));
    expect(unchanged.length).toBeGreaterThan(10);
    for (const { planned, used } of unchanged) expect(used).toBe(planned);
    expect(all.some(({ planned, used }) => planned !== used)).toBe(true);
  });

  it('gives up for a while where no plan comes twice, and reads on as before', () => {
    const known = new KnownValues();
    const [line] = lines as [string];
    const again = () => (known.parse(line) as { series: { planned: object }[] }).series[0]!.planned;
    expect(again()).toBe(again());
    for (let at = 0; at < 200; at += 1) {
      const other = line.replace('"planned":{"parameters":{', `"planned":{"parameters":{"at":${at},`);
      expect(known.parse(other)).toEqual(JSON.parse(other));
    }
    expect(again()).not.toBe(again());
    for (let at = 0; at < 5000; at += 1) known.parse('{}');
    expect(again()).toBe(again());
  });

  it.each([
    ['a key that a later program put between', '{"series":[{"id":"a","planned":{"x":1},"later":2,"used":{"x":1},"crossed":[]}]}'],
    ['another order', '{"series":[{"used":{"x":1},"crossed":[],"planned":{"x":2}}]}'],
    ['values deeper than they belong', '{"series":[{"deep":{"a":1,"planned":{"x":1},"used":{"x":2},"crossed":[]}}]}'],
    ['a stray pair beside the series', '{"a":1,"planned":{"x":1},"used":{"x":2},"crossed":[],"series":[]}'],
    ['texts that look like keys', '{"series":[{"id":"\\",\\"planned\\":","planned":{"x":1},"used":{"x":2},"crossed":[]}]}'],
    [
      'the signs themselves',
      '{"series":[{"id":1,"planned":"~0","used":"~1","crossed":[],"z":{"b":1,"planned":{},"used":{},"crossed":[]}}]}',
    ],
    ['no values at all', '{"series":[{"id":1}]}'],
    ['no object', '[1,2]'],
  ])('is not misled by %s', (_what, line) => {
    const known = new KnownValues();
    for (let time = 0; time < 2; time += 1) expect(known.parse(line)).toEqual(JSON.parse(line));
  });

  it('throws exactly where JSON.parse does, whatever is cut out of a line or put into it', () => {
    const known = new KnownValues();
    fc.assert(
      fc.property(
        fc.constantFrom(...lines.slice(0, 6)),
        fc.nat(30_000),
        fc.nat(60),
        fc.constantFrom('', '"', ',', '{', '}', ',"planned":', ',"used":{', ',"crossed":', '~', '\\', '"~0"'),
        (line, at, length, put) => {
          const text = line.slice(0, at % line.length) + put + line.slice((at % line.length) + length);
          const outcome = (parse: () => unknown) => {
            try {
              return JSON.stringify(parse());
            } catch {
              return 'throws';
            }
          };
          expect(outcome(() => known.parse(text))).toBe(outcome(() => JSON.parse(text)));
        },
      ),
      { numRuns: 600 },
    );
  });

  it('does not let a damaged used value through because its plan was right', () => {
    const known = new KnownValues();
    const [line] = lines as [string];
    expect(readRecordLine(line, undefined, undefined, known).ok).toBe(true);
    const { sum: _sum, ...record } = JSON.parse(line);
    record.series[0].used.parameters.matrixRead = 'wide';
    const wrong = recordLine(record);
    const read = readRecordLine(wrong, undefined, undefined, known);
    expect(read.ok).toBe(false);
    if (!read.ok) expect(read.problems[0]).toMatchObject({ code: 'record-shape', path: 'series.0.used.parameters.matrixRead' });
  });
});
