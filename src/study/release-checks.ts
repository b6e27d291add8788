import { type Baseline, baselineOf } from '../calc/baseline.js';
import { unknownBody } from '../calc/body.js';
import { classRow, figureNeeds } from '../calc/classes.js';
import { type Evaluation, evaluate } from '../calc/evaluate.js';
import { type FigureKey, figureTable } from '../calc/figures.js';
import { plainScanner } from '../calc/scanner.js';
import { classOf } from '../calc/series.js';
import { checkMustKeeps, type Rules } from './must-keep.js';
import type { Study, StudySeries } from './study.js';

/** One thing that a check of a preset found. */
export interface Finding {
  /** A failure stands against releasing; a note is for the eye. */
  readonly level: 'failure' | 'note';
  /** A caution's code, or `figure-not-finite`, `source-missing`, `release-not-said`. */
  readonly code: string;
  /** Null: of the preset as a whole. */
  readonly series: string | null;
  readonly text: string;
}

export interface CheckCircumstances {
  readonly rules: Rules;
  /** Exact field of the magnet, T; null: the preset's own. */
  readonly fieldT: number | null;
  /** The revision before, where there is one: a null that moved against it is found. */
  readonly previous: Study | null;
}

/** Figures that may be null in a sound series: no breath-hold, no cine, no inversion. */
const optionalFigures: readonly FigureKey[] = [
  'holdTimeS',
  'holds',
  'slicesPerRepetition',
  'roundsNeeded',
  'nullTimeMs',
  'temporalResolutionMs',
  'cardiacPhases',
];
/** Null where target and comparison look alike: worth a look, no failure. */
const contrastFigures: readonly FigureKey[] = ['relativeContrast', 'contrastRatio', 'contrastRatioChange'];

/**
 * Checks a study beyond what its file must be: timing possible, figures there, in/opposed pair and nulls right at the exact field,
 * must-keeps kept and each with a source. Series by series, failures first within each.
 */
export function checkStudy(study: Study, circumstances: CheckCircumstances): Finding[] {
  const findings = study.series.flatMap((series) => checkSeries(study, series, circumstances));
  if (study.status === 'reviewed' && study.released === undefined) {
    const text = 'the preset is reviewed, and does not say by whom, when and why: release it to have that written down';
    findings.push({ level: 'note', code: 'release-not-said', series: null, text });
  }
  return findings;
}

/** True when nothing stands against releasing. */
export function isReleasable(findings: readonly Finding[]): boolean {
  return findings.every(({ level }) => level !== 'failure');
}

function checkSeries(study: Study, series: StudySeries, { rules, fieldT, previous }: CheckCircumstances): Finding[] {
  const findings: Finding[] = [];
  const say = (level: Finding['level'], code: string, text: string) => findings.push({ level, code, series: series.id, text });
  const scanner = plainScanner(fieldT ?? study.fieldT);
  const evaluation = evaluate(series, scanner, unknownBody, baselineOf(series, plainScanner(study.fieldT)));

  for (const { code, level, text } of evaluation.cautions) {
    if (level === 'error') say('failure', code, text);
    else if (code === 'null-drift') say('note', code, text);
  }
  for (const { code, level, text } of driftSince(previous, series, scanner.fieldT)) {
    say(level === 'error' ? 'failure' : 'note', code, `since revision ${previous?.revision}: ${text}`);
  }
  checkFigures(series, evaluation, say);
  for (const { status, text } of checkMustKeeps(series.mustKeep, series.parameters, evaluation.figures, rules)) {
    if (status === 'crossed') say('failure', 'must-keep', text);
    if (status === 'not checked') say('note', 'must-keep-not-checked', text);
  }
  for (const { source, figure, parameter, rule } of series.mustKeep) {
    if (source.trim() !== '') continue;
    say(
      'failure',
      'source-missing',
      `the must-keep on ${figure ?? parameter ?? rule} names no source: write "common practice, no source" if so`,
    );
  }
  return [...findings.filter(({ level }) => level === 'failure'), ...findings.filter(({ level }) => level === 'note')];
}

function checkFigures(
  series: StudySeries,
  { figures }: Evaluation,
  say: (level: Finding['level'], code: string, text: string) => void,
): void {
  for (const key of classRow(classOf(series)).figures) {
    if (figures[key] !== null || optionalFigures.includes(key)) continue;
    const why = figureNeeds[key];
    const text = `${figureTable[key].label} has no value${why === undefined ? '' : `: ${why}`}`;
    say(contrastFigures.includes(key) ? 'note' : 'failure', 'figure-not-finite', text);
  }
}

/** Nulls that moved against the same series of the revision before. */
function driftSince(previous: Study | null, series: StudySeries, fieldT: number) {
  const before = previous?.series.find(({ id }) => id === series.id);
  if (previous === null || before === undefined || classOf(before) !== classOf(series)) return [];
  const baseline: Baseline = baselineOf(before, plainScanner(previous.fieldT));
  return evaluate(series, plainScanner(fieldT), unknownBody, baseline).cautions.filter(({ code }) => code === 'null-drift');
}
