import { nothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { search } from '../search/search.js';
import { presetBaseline, type SeriesResult, seriesResult } from '../session/series-result.js';
import { chooseScanner } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { figuresJson } from './figures-json.js';
import { loadJudgedPreset } from './load-judged-preset.js';
import { pageOf } from './page.js';
import { waysDocument } from './ways-json.js';
import { waysPage } from './ways-page.js';
import { readWaysRequest } from './ways-request.js';

/** `holdfast ways`: the best ways to make a series fit what this patient can do, with what each gains and gives up. Exit code 1 where nothing fits. */
export async function runWays(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const loaded = await loadJudgedPreset(request.arguments[0] ?? '', request, io);
  if (!loaded.ok) return complain(loaded, io);
  const chosen = await chooseScanner(request, io, loaded.value.study, loaded.value.study.fieldT);
  if (!chosen.ok) return complain(chosen, io);
  const read = readWaysRequest(loaded.value, chosen.value.scanner, request);
  if (!read.ok) return complain(read, io);
  const problem = read.value;
  const result = search(problem);
  const nothing = result.ways.length === 0 && result.proven ? nothingFits(problem, {}, result.nearest) : null;
  const { study } = loaded.value;
  const start = startOf(problem);
  if (request.has('json')) {
    const figures = JSON.parse(figuresJson(study.id, problem.scanner.fieldT, [start])) as object;
    io.write(`${JSON.stringify({ ...figures, ...waysDocument(result, problem.bands, nothing) }, null, 2)}\n`);
  } else {
    const page = pageOf(request, io);
    io.write(page.plain(waysPage(study, start, problem, result, nothing, page)));
  }
  return result.ways.length === 0 ? exitCodes.failed : exitCodes.done;
}

/** The series as it stands, values set by hand in place. */
function startOf({ series, presetFieldT, scanner, body, rules, readings, set }: SearchProblem): SeriesResult {
  return seriesResult(series, set, presetBaseline(series, presetFieldT), { scanner, body, rules }, { tissues: 'all', readings });
}
