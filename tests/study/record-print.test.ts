import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noRecordedLimits } from '../../src/study/record.js';
import { figureWords, parameterWords } from '../../src/study/record-changes.js';
import { tidyRecord } from '../../src/study/record-line.js';
import { predictionError } from '../../src/study/record-prediction.js';
import { recordPage } from '../../src/study/record-print.js';
import { anyRecord, inventedRecord, inventedSeries } from './records.js';

const untouched = {
  ...inventedSeries,
  id: 't2',
  reason: '',
  used: inventedSeries.planned,
  crossed: [],
  readings: { before: null, after: null },
};
const linesOf = (page: string) => page.trimEnd().split('\n');

describe('recordPage', () => {
  it('prints only what changed, planned to used, with who accepted what was crossed', () => {
    expect(recordPage({ ...inventedRecord, series: [inventedSeries, untouched] })).toBe(
      [
        'Record      8f3c0a5b9d21e764; 2026-03-02; holdfast 0.1.0; model 1',
        'Preset      liver-3t revision 1 (c0ffeec0ffee); liver; 3 T',
        'Where       scanner blue room; coil front and back',
        'By          technologist; ab',
        'Limits      breath-hold 11 s in expiration; 20 min left',
        'Reasons     breath-hold short',
        '',
        '* t1-3d     done; quality diagnostic; reason: breath-hold short',
        '  changed   phase matrix 256 to 224; slices 72 to 54',
        '  figures   scan time 17.0 to 10.8 s; breath-hold 17.0 to 10.8 s; SNR 1.00 to',
        '            0.87',
        '  crossed   coverage at least 200 mm: accepted by radiologist',
        '  before    time 17.2 s; SAR 0.9 W/kg',
        '  after     time 11.0 s; SAR 0.9 W/kg; mode normal; against the prediction: time',
        '            +2 %',
        '',
        'As planned  t2',
        'Advice      make this a variant',
        'Figures are computed, readings are typed. SAR and B1+rms figures are trends.',
        '',
      ].join('\n'),
    );
  });

  it('prints NO REASON GIVEN for a change without any reason, and for a series given up without its own', () => {
    const blank = { ...inventedSeries, reason: '' };
    const page = recordPage({ ...inventedRecord, reasons: [], series: [blank] });
    expect(page).toMatch(/^Reasons {5}NO REASON GIVEN$/m);
    expect(page).toMatch(/^\* t1-3d .*reason: NO REASON GIVEN$/m);
    expect(recordPage({ ...inventedRecord, series: [blank] })).not.toContain('NO REASON GIVEN');
    expect(recordPage({ ...inventedRecord, series: [{ ...untouched, outcome: 'given-up' }] })).toMatch(
      /given up; .*reason: NO REASON GIVEN/,
    );
    expect(recordPage({ ...inventedRecord, series: [{ ...untouched, outcome: 'repeated' }] })).toContain('NO REASON GIVEN');
    expect(recordPage({ ...inventedRecord, reasons: [], series: [untouched] })).not.toContain('NO REASON GIVEN');
  });

  it('says when nobody accepted what was crossed', () => {
    expect(
      recordPage({ ...inventedRecord, series: [{ ...inventedSeries, crossed: [{ rule: 'slice at most 5 mm', role: null }] }] }),
    ).toContain('slice at most 5 mm: ACCEPTED BY NOBODY');
  });

  it('stays on one page of 60 lines for twelve series that all changed', () => {
    const series = Array.from({ length: 12 }, (_, index) => ({
      ...inventedSeries,
      id: `series-${index}`,
      crossed: [],
      readings: { before: null, after: null },
    }));
    const page = recordPage({ ...inventedRecord, series });
    expect(linesOf(page).length).toBeLessThanOrEqual(60);
    for (const { id } of series) expect(page).toContain(`* ${id} `);
  });

  it('prints any record that can be written, and keeps to 80 columns where words have a usual length', () => {
    const usual = fc.stringMatching(/^[a-z ]{0,40}$/);
    fc.assert(
      fc.property(anyRecord, usual, (record, text) => {
        const page = recordPage(
          tidyRecord({ ...record, id: text, limits: { ...noRecordedLimits, labelConditions: [text, text] }, reasons: [text] }),
        );
        expect(page).not.toMatch(/undefined|NaN|\[object/);
      }),
    );
    const long = { ...inventedRecord, reasons: ['a reason of several words', 'and another one that is rather long', 'and one more'] };
    for (const line of linesOf(recordPage(long))) expect(line.length).toBeLessThanOrEqual(80);
  });
});

describe('predictionError', () => {
  const errorOf = (figures: object, before: object | null, after: object | null) =>
    predictionError({ ...inventedSeries, used: { parameters: {}, figures }, readings: { before, after } });

  it('compares time and B1+rms with the figures used', () => {
    expect(errorOf({ scanTimeS: 100, b1PlusRmsUt: 2 }, null, { timeS: 105, b1rmsUt: 1.8 })).toEqual({
      time: expect.closeTo(0.05, 9) as number,
      b1rms: expect.closeTo(-0.1, 9) as number,
      sar: null,
    });
  });

  it('compares SAR with the reading before times the predicted trend, and finds nothing inside its range', () => {
    const trend = { sarTrendLow: 0.5, sarTrendHigh: 0.8 };
    expect(errorOf(trend, { sarWkg: 2 }, { sarWkg: 1.3 }).sar).toBe(0);
    expect(errorOf(trend, { sarWkg: 2 }, { sarWkg: 2 }).sar).toBeCloseTo(0.25, 9);
    expect(errorOf(trend, { sarWkg: 2 }, { sarWkg: 0.9 }).sar).toBeCloseTo(-0.1, 9);
    expect(errorOf(trend, null, { sarWkg: 1 }).sar).toBe(null);
  });
});

describe('parameterWords and figureWords', () => {
  it.each([
    [parameterWords('sliceThicknessMm', 3.5), '3.5 mm'],
    [parameterWords('sliceThicknessMm', 3.25), '3.25 mm'],
    [parameterWords('inversionTimeMs', undefined), 'none'],
    [parameterWords('ellipticalSampling', true), 'yes'],
    [parameterWords('phaseDirection', 'AP'), 'AP'],
    [
      parameterWords('pacing', { kind: 'respiratory-trigger', periodMs: 4000, windowMs: 1500 }),
      'respiratory trigger 4000 ms window 1500 ms',
    ],
    [parameterWords('diffusion', { bValuesSPerMm2: [50, 800], directions: 3, averages: [1, 4] }), 'b 50/800, 3 directions, averages 1/4'],
    [figureWords('scanTimeS', 148), '2:28 min'],
    [figureWords('scanTimeS', 59.94), '59.9 s'],
    [figureWords('scanTimeS', 119.7), '2:00 min'],
    [figureWords('holdTimeS', null), 'none'],
  ])('%s', (given, expected) => expect(given).toBe(expected));
});
