import type { Budget, BudgetProblem, PlannedSeries } from '../search/budget.js';
import { plannedInWords } from '../session/plan-words.js';
import { sayTime } from '../session/say-time.js';
import { sayVerdict } from '../session/say-verdict.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import { closingWords } from './closing-words.js';
import type { Page } from './page.js';
import { studyHeading } from './study-page.js';

/** The document of `budget --json`. */
export function budgetJson({ study }: BudgetProblem, { plan, totalS, verdict }: Budget): string {
  const document = {
    preset: study.id,
    fieldT: study.fieldT,
    plan: plan.map(({ series, choice, changes, timeS }) => ({ series: series.id, choice, changes, timeS })),
    totalS,
    spareS: verdict.spare,
  };
  return `${JSON.stringify(document, null, 2)}\n`;
}

/** A plan as plain text: each series, the total, what is to spare and what was given up. */
export function budgetPage(problem: BudgetProblem, budget: Budget, page: Page): string {
  const { study, minutes, overheadS, longestS, holdS = null, done } = problem;
  const { plan, totalS, verdict, missing, alternative } = budget;
  const given = plan.filter(({ choice }) => choice === 'skipped').map(({ series }) => series.id);
  const lines = [
    `Into ${minutes} min${longestS === null ? '' : `, no series longer than ${sayTime(longestS)}`}${holdS === null ? '' : `, breath-holds of at most ${sayTime(holdS)}`}; ${overheadS} s of overhead a series${done.length === 0 ? '' : `; done: ${done.join(', ')}`}.`,
    ...(missing.length === 0
      ? []
      : [
          `The minimum set does not fit: ${missing.map((item) => (typeof item === 'string' ? item : item.join(' or '))).join(', ')} left out.`,
        ]),
  ];
  const after = [
    `Together ${sayTime(totalS)} of ${sayTime(minutes * 60)}: ${sayVerdict(verdict)}.`,
    ...(plan.length === 0 ? ['Every series is done: nothing is left to plan.'] : []),
    given.length === 0 ? 'No series is given up.' : `Given up: ${given.join(', ')}.`,
    ...(alternative === null
      ? []
      : [`Nearly as much is kept this way, in ${sayTime(alternative.totalS)}: ${alternative.plan.map(inWords).join('; ')}.`]),
  ];
  return [
    ...studyHeading(study, study.fieldT, page),
    '',
    ...lines.flatMap((line) => wrapText(cleanText(line), page.width)),
    '',
    ...textTable(columns, rows(plan, overheadS), page.reader),
    '',
    ...plan.filter(({ choice }) => choice === 'shortened').flatMap((one) => wrapText(cleanText(plannedInWords(one)), page.width)),
    ...after.flatMap((line) => wrapText(cleanText(line), page.width)),
    '',
    ...wrapText(closingWords, page.width),
    '',
  ].join('\n');
}

const columns = [
  { title: 'series', align: 'left' },
  { title: 'choice', align: 'left' },
  { title: 'time', align: 'right' },
  { title: 'running total', align: 'right' },
] as const;

function rows(plan: readonly PlannedSeries[], overheadS: number): string[][] {
  let totalS = 0;
  return plan.map(({ series, choice, timeS }) => {
    if (choice === 'skipped') return [series.id, choice, '-', '-'];
    totalS += timeS + overheadS;
    return [series.id, choice, sayTime(timeS), sayTime(totalS)];
  });
}

function inWords(one: PlannedSeries): string {
  return `${one.series.id} ${one.choice === 'shortened' ? `shortened to ${sayTime(one.timeS)}` : one.choice}`;
}
