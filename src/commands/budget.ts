import { unknownBody } from '../calc/body.js';
import type { Scanner } from '../calc/scanner.js';
import { readQuantity } from '../formulas/read-quantity.js';
import { usualBands } from '../search/bands.js';
import { type BudgetProblem, planBudget } from '../search/budget.js';
import { cleanText } from '../study/clean-text.js';
import { type Attempt, wrongUse } from './attempt.js';
import { budgetJson, budgetPage } from './budget-page.js';
import { chooseScanner } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { loadJudgedPreset } from './load-judged-preset.js';
import type { LoadedPreset } from './load-preset.js';
import { pageOf } from './page.js';
import { seriesNamed } from './series-named.js';
import { readAboveZero } from './ways-request.js';

/** Overhead of a planned series when none is given, s (common practice, no source). */
const usualOverheadS = 20;

/** `holdfast budget`: the session in so many minutes. Exit code 1 where not even the minimum set fits. */
export async function runBudget(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const loaded = await loadJudgedPreset(request.arguments[0] ?? '', request, io);
  if (!loaded.ok) return complain(loaded, io);
  const chosen = await chooseScanner(request, io, loaded.value.study, loaded.value.study.fieldT);
  if (!chosen.ok) return complain(chosen, io);
  const read = readBudget(loaded.value, chosen.value.scanner, request);
  if (!read.ok) return complain(read, io);
  const budget = planBudget(read.value);
  if (request.has('json')) io.write(budgetJson(read.value, budget));
  else {
    const page = pageOf(request, io);
    io.write(page.plain(budgetPage(read.value, budget, page)));
  }
  // A minimum set that is done is an answer, though nothing more fits.
  const answered = read.value.study.minimumSet.length > 0;
  const nothing = !answered && budget.plan.length > 0 && budget.plan.every(({ choice }) => choice === 'skipped');
  return budget.missing.length > 0 || nothing ? exitCodes.failed : exitCodes.done;
}

/** Seconds of an option that may be left out. */
function readOptionalS(option: 'longest' | 'hold', max: number, request: CommandRequest): Attempt<number | null> {
  const text = request.value(option);
  return text === undefined ? { ok: true, value: null } : readAboveZero(`--${option}`, text, 's', max);
}

function readBudget({ study, rules }: LoadedPreset, scanner: Scanner, request: CommandRequest): Attempt<BudgetProblem> {
  const text = request.value('minutes');
  if (text === undefined) return wrongUse('--minutes', '--minutes is missing: how long may the session take?', 'Write --minutes 25.');
  const minutes = readAboveZero('--minutes', text, 'min', 600);
  if (!minutes.ok) return minutes;
  const longest = readOptionalS('longest', 36_000, request);
  if (!longest.ok) return longest;
  const hold = readOptionalS('hold', 600, request);
  if (!hold.ok) return hold;
  const overheadText = request.value('overhead');
  const overhead = overheadText === undefined ? { ok: true as const, value: usualOverheadS } : readQuantity(overheadText, 's');
  if (!overhead.ok || overhead.value < 0 || overhead.value > 3600) {
    return wrongUse(
      '--overhead',
      `--overhead takes seconds from 0 to 3600; "${cleanText(overheadText ?? '', 40)}" was given.`,
      'Write --overhead 20.',
    );
  }
  for (const done of request.values('done')) {
    const series = seriesNamed(study, done);
    if (!series.ok) return series;
  }
  return {
    ok: true,
    value: {
      study,
      scanner,
      body: unknownBody,
      rules,
      minutes: minutes.value,
      longestS: longest.value,
      holdS: hold.value,
      overheadS: overhead.value,
      done: request.values('done'),
      bands: usualBands,
      readings: {},
    },
  };
}
