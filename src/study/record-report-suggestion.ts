import { baselineOf } from '../calc/baseline.js';
import { unknownBody } from '../calc/body.js';
import { evaluate } from '../calc/evaluate.js';
import type { Figures } from '../calc/figures.js';
import type { ParameterKey } from '../calc/parameters.js';
import { resolveParameters } from '../calc/resolve.js';
import { plainScanner } from '../calc/scanner.js';
import { cleanText } from './clean-text.js';
import { presetLimits } from './limits.js';
import { checkMustKeeps, type MustKeepResult, type Rules } from './must-keep.js';
import { reasonWords } from './record-reasons.js';
import type { PresetReport } from './record-report.js';
import { suggestionEvidence } from './record-report-evidence.js';
import type { Rewrite } from './record-report-rewrites.js';
import type { SeriesReport } from './record-report-series.js';
import { fewestForRate } from './record-report-share.js';
import type { Study, StudySeries } from './study.js';

/** A variant to review: what was done most often with good quality, with its figures and the draft preset that would hold it. */
export interface Suggestion {
  readonly preset: string;
  readonly series: string;
  readonly rewrite: Rewrite;
  /** Keys of the change that differ from the current revision. */
  readonly changed: readonly ParameterKey[];
  /** Figures of the current revision, and of the variant against it. */
  readonly before: Figures;
  readonly after: Figures;
  readonly mustKeeps: readonly MustKeepResult[];
  /** Draft, with the evidence in its notes. Ids and revision are given when it is saved. */
  readonly study: Study;
  readonly evidence: string;
}

/** A suggestion, or why there is none. */
export type Suggested =
  | { readonly kind: 'variant'; readonly suggestion: Suggestion }
  | { readonly kind: 'none'; readonly series: string; readonly why: string };

/** The current revision of a preset that records name, and a suggestion for each of its series. */
export interface PresetNow {
  /** Null where no folder has it. */
  readonly study: Study | null;
  readonly suggestions: readonly Suggested[];
}

/**
 * The change of a series made most often with good quality, as a variant to review. None where it was made fewer than five times, where
 * the current revision has it already, or where it crosses a must-keep. It is never more than a draft: people review and release.
 *
 * @param study The current revision of the preset.
 */
export function suggestVariant(study: Study, preset: PresetReport, report: SeriesReport, rules: Rules): Suggested {
  const none = (why: string): Suggested => ({ kind: 'none', series: report.series, why });
  const rewrite = report.rewrites[0];
  if (rewrite === undefined) return none('it was never rewritten');
  if (rewrite.good < fewestForRate) {
    return none(`the change made most often with good quality was made ${times(rewrite.good)}: fewer than ${fewestForRate}`);
  }
  const series = study.series.find(({ id }) => id === report.series);
  if (series === undefined) return none(`revision ${study.revision} has no such series`);
  const changed = (Object.keys(rewrite.set) as ParameterKey[]).filter((key) => differs(series, rewrite, key));
  if (changed.length === 0) return none(`revision ${study.revision} has the change made most often already`);

  const scanner = plainScanner(study.fieldT);
  const baseline = baselineOf(series, scanner);
  const { parameters } = resolveParameters(baseline, rewrite.set, scanner);
  const before = evaluate(series, scanner, unknownBody, baseline).figures;
  const after = evaluate({ ...series, parameters }, scanner, unknownBody, baseline).figures;
  const mustKeeps = checkMustKeeps(series.mustKeep, parameters, after, rules);
  const crossed = mustKeeps.filter(({ status }) => status === 'crossed');
  if (crossed.length > 0) return none(`the change made most often crosses a must-keep: ${crossed.map(({ text }) => text).join('; ')}`);

  const parts = { preset: study.id, series: report.series, rewrite, changed, before, after, mustKeeps };
  const evidence = suggestionEvidence(parts, series, preset, report);
  return { kind: 'variant', suggestion: { ...parts, evidence, study: variantOf(study, { ...series, parameters }, rewrite, evidence) } };
}

function differs(series: StudySeries, { set }: Rewrite, key: ParameterKey): boolean {
  const [now, wanted] = [series.parameters[key], set[key]];
  if (typeof now === 'number' && typeof wanted === 'number') return Math.abs(now - wanted) > 0.005 * Math.min(1, Math.abs(now));
  return JSON.stringify(now) !== JSON.stringify(wanted);
}

function variantOf(study: Study, changed: StudySeries, { reasons }: Rewrite, evidence: string): Study {
  const why = reasons[0] === undefined || reasons[0].word.trim() === '' ? '' : `: ${reasonWords(reasons[0].word)}`;
  const notes = study.notes === '' ? evidence : `${evidence} Notes of revision ${study.revision}: ${study.notes}`;
  const { released: _released, ...rest } = study;
  return {
    ...rest,
    title: cleanText(`${study.title}, variant to review${why}`, presetLimits.title),
    status: 'draft',
    notes: cleanText(notes, presetLimits.notes),
    series: study.series.map((series) => (series.id === changed.id ? changed : series)),
  };
}

function times(count: number): string {
  return count === 1 ? 'once' : `${count} times`;
}
