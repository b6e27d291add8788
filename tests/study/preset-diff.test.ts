import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shippedStudy } from '../../scripts/invented-records.js';
import type { Parameters } from '../../src/calc/series.js';
import { isSameContent, recordedDifference, studyDifference } from '../../src/study/preset-diff.js';
import { takeOver } from '../../src/study/preset-diff-take-over.js';
import type { Study, StudySeries } from '../../src/study/study.js';
import { inventedSeries } from './records.js';
import { arbitraryStudy } from './study-arbitrary.js';

const study = shippedStudy('liver-3t');

function edited(from: Study, id: string, parameters: Partial<Parameters>, more: Partial<StudySeries> = {}): Study {
  const series = from.series.map((one) => (one.id === id ? { ...one, ...more, parameters: { ...one.parameters, ...parameters } } : one));
  return { ...from, series: series as StudySeries[] };
}

describe('studyDifference', () => {
  it('finds nothing between a study and itself, whatever the study', () => {
    fc.assert(
      fc.property(arbitraryStudy, (any) => {
        const difference = studyDifference(any, any);
        expect(difference.head).toEqual([]);
        expect(difference.series.every(({ kind }) => kind === 'same')).toBe(true);
        expect(isSameContent(difference)).toBe(true);
      }),
      { numRuns: 20 },
    );
  });

  it('shows parameters and what they do: 4 mm instead of 3 mm makes the voxel and the SNR a third larger', () => {
    const thicker = edited(study, 't1-3d', { sliceThicknessMm: 4 });
    const { series } = studyDifference(study, thicker);
    const changed = series.filter(({ kind }) => kind === 'changed');
    expect(changed.map(({ id }) => id)).toEqual(['t1-3d']);
    expect(changed[0]!.parameters).toEqual([{ key: 'sliceThicknessMm', from: 3, to: 4 }]);
    const snr = changed[0]!.figures.find(({ key }) => key === 'relativeSnr')!;
    // Signal to noise follows the voxel volume (Macovski, MRM 1996;36:494): 4/3.
    expect([snr.from, snr.to! / (4 / 3)]).toEqual([1, expect.closeTo(1, 9)]);
    expect(changed[0]!.figures.some(({ key }) => key === 'scanTimeS')).toBe(false);
  });

  it('tells series that only one of the two has, and everything else that differs', () => {
    const [first, ...others] = study.series;
    const renamed = { ...study, notes: 'other notes', series: [...others, { ...first!, id: 'new', title: 'new' }] };
    const { head, series } = studyDifference(study, renamed);
    expect(head.map(({ key }) => key)).toEqual(['notes']);
    expect(series.map(({ id, kind }) => [id, kind])).toContainEqual([first!.id, 'removed']);
    expect(series.at(-1)).toMatchObject({ id: 'new', kind: 'added' });
    const looser = edited(study, 't1-3d', {}, { mustKeep: [] });
    const kept = studyDifference(study, looser).series.find(({ id }) => id === 't1-3d')!;
    expect([kept.kind, kept.parameters, kept.other.map(({ key }) => key)]).toEqual(['changed', [], ['mustKeep']]);
  });

  it('compares across fields: each at its own, relative to the first', () => {
    const { series } = studyDifference(shippedStudy('liver-1.5t'), shippedStudy('liver-3t'));
    const rf = series.find(({ id }) => id === 't1-3d')!.figures.find(({ key }) => key === 'sarTrendHigh');
    expect(rf!.to! / rf!.from!).toBeGreaterThan(1);
  });

  it("shows a record's planned against its used", () => {
    const difference = recordedDifference(inventedSeries);
    expect(difference.parameters).toEqual([
      { key: 'matrixPhase', from: 256, to: 224 },
      { key: 'sliceCount', from: 72, to: 54 },
    ]);
    expect(difference.figures.map(({ key, from, to }) => [key, from, to])).toEqual([
      ['scanTimeS', 17, 10.8],
      ['holdTimeS', 17, 10.8],
      ['relativeSnr', 1, 0.87],
    ]);
  });
});

describe('takeOver', () => {
  it("sets one's own changes on top of another's revision, both kept", () => {
    const mine = { ...edited(study, 't1-3d', { sliceThicknessMm: 4, sliceCount: 54 }), notes: 'mine' };
    const theirs = { ...edited(study, 'dwi', { averages: 2 }), revision: 2, title: 'theirs' };
    const { study: merged, taken, conflicts } = takeOver(study, mine, theirs);
    expect(conflicts).toEqual([]);
    expect(taken.map(({ series, key, mine: own }) => [series, key, own])).toEqual([
      [null, 'notes', 'mine'],
      ['t1-3d', 'sliceCount', 54],
      ['t1-3d', 'sliceThicknessMm', 4],
    ]);
    expect(merged).toEqual({
      ...edited(edited(study, 't1-3d', { sliceThicknessMm: 4, sliceCount: 54 }), 'dwi', { averages: 2 }),
      notes: 'mine',
      revision: 2,
      title: 'theirs',
    });
  });

  it('names what both changed to different values, and leaves theirs', () => {
    const mine = edited(study, 't1-3d', { sliceThicknessMm: 4 });
    const theirs = edited(study, 't1-3d', { sliceThicknessMm: 5 });
    const { study: merged, taken, conflicts } = takeOver(study, mine, theirs);
    expect(taken).toEqual([]);
    expect(conflicts).toEqual([{ series: 't1-3d', key: 'sliceThicknessMm', from: 3, mine: 4, theirs: 5 }]);
    expect(merged).toEqual(theirs);
    expect(takeOver(study, theirs, theirs)).toEqual({ study: theirs, taken: [], conflicts: [] });
  });

  it('takes over series that were added or removed, and names one that they removed while it was changed', () => {
    const added = { ...study.series[0]!, id: 'added' };
    const mine = { ...study, series: [...study.series.slice(1), added] };
    expect(takeOver(study, mine, study).study.series.map(({ id }) => id)).toEqual([...study.series.slice(1).map(({ id }) => id), 'added']);
    const without = { ...study, series: study.series.filter(({ id }) => id !== 'dwi') };
    const { conflicts } = takeOver(study, edited(study, 'dwi', { averages: 3 }), without);
    expect(conflicts.map(({ key }) => key)).toEqual(['series dwi']);
  });

  it('changes nothing when nothing of one own was changed, and gives mine when they changed nothing', () => {
    fc.assert(
      fc.property(arbitraryStudy, arbitraryStudy, (base, other) => {
        const theirs = { ...other, id: base.id, status: base.status, revision: base.revision + 1 };
        expect(takeOver(base, base, theirs)).toEqual({ study: theirs, taken: [], conflicts: [] });
        const { study: merged, conflicts } = takeOver(base, { ...theirs, revision: base.revision }, base);
        expect(conflicts).toEqual([]);
        expect(studyDifference(merged, theirs).series.filter(({ kind }) => kind !== 'same')).toEqual([]);
      }),
      { numRuns: 12 },
    );
  });
});
