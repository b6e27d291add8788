import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readPreset } from '../../src/study/read-preset.js';
import { givenOf, writePreset } from '../../src/study/write-preset.js';
import { arbitraryStudy } from './study-arbitrary.js';

const parse = await loadParser();

describe('writePreset', () => {
  it('reads back to the same study, and writes that the same way again', () => {
    fc.assert(
      fc.property(arbitraryStudy, (study) => {
        const text = writePreset(study);
        const read = readPreset(text, 'random.json', parse);
        expect(read).toEqual({ ok: true, value: study });
        expect(read.ok && writePreset(read.value)).toBe(text);
      }),
      { numRuns: 120 },
    );
  });

  it('leaves out what a reader fills in, a train length that follows from the lines included', () => {
    const text = (
      more: string,
    ) => `{ "format": "holdfast preset", "version": 1, "id": "a", "title": "A", "region": "brain", "fieldT": 3, "series": [
      { "id": "s", "title": "S", "family": "single-shot-fast-spin-echo", "acquisition": "2D", "target": "CSF", "comparison": "liver",
        "parameters": { "repetitionTimeMs": 1000, "echoTimeMs": 90, "fieldOfViewMm": 240, "matrixRead": 256, "matrixPhase": 200, "sliceCount": 20,
          "sliceThicknessMm": 5, "pixelBandwidthHz": 500, "averages": 1, "pacing": { "kind": "none" }, "echoTrainLength": ${more} } } ] }`;
    const given = (more: string) => {
      const read = readPreset(text(more), 'a.json');
      if (!read.ok) throw new Error(JSON.stringify(read.problems));
      return Object.keys(givenOf(read.value.series[0] as (typeof read.value.series)[number]));
    };
    const required = ['fieldOfViewMm', 'matrixRead', 'matrixPhase', 'sliceCount', 'sliceThicknessMm'];
    expect(given('200')).toEqual([...required, 'repetitionTimeMs', 'echoTimeMs', 'pixelBandwidthHz']);
    expect(given('120')).toEqual([...required, 'repetitionTimeMs', 'echoTimeMs', 'echoTrainLength', 'pixelBandwidthHz']);
  });
});
