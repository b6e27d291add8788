import { type FigureKey, figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { figureWords, parameterWords } from './record-changes.js';
import { reasonWords } from './record-reasons.js';
import type { PresetReport } from './record-report.js';
import type { SeriesReport } from './record-report-series.js';
import { shareWords } from './record-report-share.js';
import type { Suggestion } from './record-report-suggestion.js';
import type { StudySeries } from './study.js';

type Parts = Pick<Suggestion, 'rewrite' | 'changed' | 'before' | 'after' | 'mustKeeps'>;

/** Figures that a committee asks for first: time, voxel, SNR, contrast, RF. */
export const committeeFigures: readonly FigureKey[] = [
  'scanTimeS',
  'holdTimeS',
  'voxelReadMm',
  'voxelPhaseMm',
  'voxelSliceMm',
  'coverageMm',
  'relativeSnr',
  'relativeContrast',
  'b1PlusRmsUt',
  'rfPowerTrend',
];

/** The change in words: `slice thickness 3.00 mm to 4.00 mm`. */
export function changeWords({ changed, rewrite }: Pick<Parts, 'changed' | 'rewrite'>, series: StudySeries): string[] {
  return changed.map(
    (key) =>
      `${parameterRow(key).label} ${parameterWords(key, series.parameters[key])} to ${parameterWords(key, rewrite.set[key] ?? undefined)}`,
  );
}

/** Figures that differ in the digits shown, in words: `breath-hold 17.0 s to 12.8 s`. */
function figureChangeWords({ before, after }: Pick<Parts, 'before' | 'after'>): string[] {
  return committeeFigures.flatMap((key) => {
    const [from, to] = [figureWords(key, before[key]), figureWords(key, after[key])];
    return from === to ? [] : [`${figureTable[key].label} ${from} to ${to}`];
  });
}

/** The evidence of a suggestion as sentences, for the notes of a draft: what, how often, why, what it does to figures and must-keeps. */
export function suggestionEvidence(parts: Parts, series: StudySeries, preset: PresetReport, report: SeriesReport): string {
  const { rewrite, mustKeeps } = parts;
  const reasons = rewrite.reasons.map(({ word, count }) => `${reasonWords(word)} ${count}`);
  const period = preset.from === null ? '' : `, ${preset.from} to ${preset.to}`;
  const kept = mustKeeps.filter(({ status }) => status === 'kept').length;
  const open = mustKeeps.filter(({ status }) => status === 'not checked').length;
  return [
    `Suggested by records, to be reviewed: series ${series.id} with ${changeWords(parts, series).join(', ')}.`,
    `Done so in ${shareWords(rewrite.times, report.recorded)} records${period}; ${rewrite.good} of these with quality diagnostic and no must-keep crossed.`,
    `Reasons: ${reasons.join(', ')}.`,
    `Figures: ${figureChangeWords(parts).join(', ') || 'none shown changes'}.`,
    `Must-keeps: ${kept} kept${open === 0 ? '' : `, ${open} not checked`}.`,
    ...(series.pairedWith.length === 0 ? [] : [`Changes together with: ${series.pairedWith.join(', ')}.`]),
    'Counted from records, no trial; nobody has reviewed it.',
  ].join(' ');
}
