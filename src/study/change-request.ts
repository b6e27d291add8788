import { figureTable } from '../calc/figures.js';
import { pageLines, pageRow } from './page-row.js';
import { figureWords } from './record-changes.js';
import { reasonWords } from './record-reasons.js';
import { type PresetReport, revisionWords } from './record-report.js';
import { changeWords, committeeFigures } from './record-report-evidence.js';
import type { SeriesReport } from './record-report-series.js';
import { shareWords, smallCount } from './record-report-share.js';
import type { Suggestion } from './record-report-suggestion.js';
import { noReasonGiven } from './record-words.js';
import type { Study } from './study.js';

/**
 * One page for a protocol committee, at most 60 lines of 80 columns: what is asked, why, how often it was done, figures before and
 * after, must-keeps, the evidence and what it leaves out, and lines to sign. It asks; the committee decides.
 *
 * @param study The current revision of the preset.
 */
export function changeRequest(study: Study, preset: PresetReport, report: SeriesReport, suggestion: Suggestion): string {
  // Must-keeps have endless words: as many are written out as leave room for the lines to sign.
  const fitting = [6, 4, 2, 1, 0]
    .map((shown) => linesOf(study, preset, report, suggestion, shown))
    .find((lines) => lines.length <= pageLines);
  return `${(fitting ?? linesOf(study, preset, report, suggestion, 0)).join('\n')}\n`;
}

function linesOf(study: Study, preset: PresetReport, report: SeriesReport, suggestion: Suggestion, shown: number): string[] {
  const series = study.series.find(({ id }) => id === suggestion.series);
  if (series === undefined) throw new Error(`preset ${study.id} has no series ${suggestion.series}: suggestions come from its own series`);
  const { rewrite, before, after, mustKeeps } = suggestion;
  const { crossed, quality } = report;
  const reasons = rewrite.reasons.map(({ word, count }) => `${reasonWords(word)} ${count}`);
  const figures = committeeFigures
    .filter((key) => before[key] !== null || after[key] !== null)
    .map(
      (key) =>
        `  ${figureTable[key].label.padEnd(20)}${figureWords(key, before[key]).padStart(14)}${figureWords(key, after[key]).padStart(14)}`,
    );
  const small = rewrite.times < smallCount ? [`small count: ${rewrite.times} sessions, read every rate with care`] : [];
  return [
    'Request to change a preset',
    '',
    ...pageRow('Preset', [`${study.id} revision ${study.revision}, ${study.status}`, study.title, `${study.fieldT} T`]),
    ...pageRow('Series', [`${series.id}: ${series.title}`]),
    '',
    ...pageRow('What', changeWords(suggestion, series)),
    ...(series.pairedWith.length === 0 ? [] : pageRow('', [`changes together with ${series.pairedWith.join(', ')}`])),
    ...pageRow('Why', reasons.length === 0 ? [noReasonGiven] : reasons),
    ...pageRow('How often', [
      `${shareWords(rewrite.times, report.recorded)} records of this series used these values`,
      `${shareWords(report.rewritten, report.recorded)} were rewritten in any way`,
    ]),
    ...pageRow('Period', [preset.from === null ? 'days are left out of these records' : `${preset.from} to ${preset.to}`]),
    ...pageRow('Revisions', [revisionWords(preset.revisions, study.revision)]),
    '',
    `  ${'Figures'.padEnd(20)}${'now'.padStart(14)}${'asked for'.padStart(14)}`,
    ...figures,
    '',
    ...mustKeeps.slice(0, shown).flatMap(({ status, text }, i) => pageRow(i === 0 ? 'Must keep' : '', [`${status}: ${text}`])),
    ...(mustKeeps.length > shown ? pageRow(shown === 0 ? 'Must keep' : '', [`${mustKeeps.length - shown} more, none crossed`]) : []),
    ...(mustKeeps.length === 0 ? pageRow('Must keep', ['none named for this series']) : []),
    '',
    ...pageRow('Evidence', [
      `${rewrite.good} of ${rewrite.times} with quality diagnostic at the console and no must-keep crossed`,
      `all rewritten ones: ${quality.rewritten.diagnostic} diagnostic, ${quality.rewritten.limited} limited, ${quality.rewritten.not} not diagnostic, ${quality.rewritten.notSaid} not said`,
      `must-keeps of this series crossed ${crossed.times} times, ${crossed.times - crossed.withReason} without a reason, ${crossed.times - crossed.withRole} accepted by nobody`,
      ...small,
    ]),
    ...pageRow('Left out', [
      'quality is as seen at the console, no diagnosis; who was rewritten is no sample; figures are computed, relative to now',
    ]),
    '',
    ...['Asked by (role)', 'Decided by (role)', 'Decision, day, reason'].map((words) => `${words.padEnd(24)}${'_'.repeat(44)}`),
  ];
}
