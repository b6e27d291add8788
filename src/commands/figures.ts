import { unknownBody } from '../calc/body.js';
import { plainScanner } from '../calc/scanner.js';
import { presetBaseline, type SeriesResult, seriesResult } from '../session/series-result.js';
import { runningOrder } from '../study/running-order.js';
import { readSetValues } from '../study/set-values.js';
import type { Study, StudySeries } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import { type ChosenScanner, chooseScanner, scannerLine } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { figuresJson } from './figures-json.js';
import { loadJudgedPreset } from './load-judged-preset.js';
import type { LoadedPreset } from './load-preset.js';
import { pageOf } from './page.js';
import { parameterOfOtherClass } from './parameter-of-other-class.js';
import { readBody, readField, readReadings } from './read-named-numbers.js';
import { seriesNamed } from './series-named.js';
import { seriesPage } from './series-page.js';
import { studyPage } from './study-page.js';

/** `holdfast figures`: evaluates a study or one series, with values set, at a field, for a body, from readings. */
export async function runFigures(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const [wanted = '', seriesId] = request.arguments;
  const loaded = await loadJudgedPreset(wanted, request, io);
  if (!loaded.ok) return complain(loaded, io);
  const field = readField(request.value('field'));
  if (!field.ok) return complain(field, io);
  const { study } = loaded.value;
  const chosen = await chooseScanner(request, io, study, field.value ?? study.fieldT);
  if (!chosen.ok) return complain(chosen, io);
  const text = figuresOf(loaded.value, seriesId, chosen.value, request, io);
  if (!text.ok) return complain(text, io);
  io.write(text.value);
  return exitCodes.done;
}

/** The whole output, formed before a byte of it is written. */
function figuresOf(
  preset: LoadedPreset,
  seriesId: string | undefined,
  chosen: ChosenScanner,
  request: CommandRequest,
  io: CommandIo,
): Attempt<string> {
  const { study, rules } = preset;
  const picked = pickSeries(study, seriesId, request);
  if (!picked.ok) return picked;
  const body = readBody(request.value('body'));
  if (!body.ok) return body;
  const readings = readReadings(request.values('reading'));
  if (!readings.ok) return readings;

  const { scanner } = chosen;
  const { fieldT } = scanner;
  const results: SeriesResult[] = [];
  for (const series of picked.value) {
    const set = readSetValues(request.values('set'), series);
    if (!set.ok) return { ok: false, exit: exitCodes.wrongUse, problems: set.problems };
    const foreign = parameterOfOtherClass(series, set.value);
    if (foreign !== null) return foreign;
    const baseline = presetBaseline(series, study.fieldT);
    const circumstances = { scanner, body: body.value, rules };
    results.push(seriesResult(series, set.value, baseline, circumstances, { tissues: 'all', readings: readings.value }));
  }
  if (request.has('json')) return { ok: true, value: figuresJson(study.id, fieldT, results) };

  const page = pageOf(request, io);
  const head = chosen.file === null ? '' : `${scannerLine(chosen, request)}\n`;
  const single = picked.value.length === 1 ? results[0] : undefined;
  if (single === undefined) return { ok: true, value: page.plain(head + studyPage(study, fieldT, results, page)) };
  // Readings are of the preset: its own figures scale with them too.
  const asPreset = seriesResult(
    single.series,
    {},
    presetBaseline(single.series, study.fieldT),
    { scanner: plainScanner(study.fieldT), body: unknownBody, rules },
    { readings: readings.value },
  );
  return { ok: true, value: page.plain(head + seriesPage(study, fieldT, single, asPreset, page)) };
}

/** The series asked for, or all: JSON keeps the order of the file, a page has the running order. */
function pickSeries(study: Study, seriesId: string | undefined, request: CommandRequest): Attempt<readonly StudySeries[]> {
  const ids = study.series.map(({ id }) => id);
  if (seriesId === undefined) {
    const option = ['set', 'reading'].find((name) => request.has(name));
    if (option !== undefined && ids.length > 1) {
      return wrongUse(
        `--${option}`,
        `--${option} needs SERIES: preset ${study.id} has ${ids.length} series.`,
        `Name one of ${ids.join(', ')}.`,
      );
    }
    return { ok: true, value: request.has('json') ? study.series : runningOrder(study.series) };
  }
  const found = seriesNamed(study, seriesId);
  return found.ok ? { ok: true, value: [found.value] } : found;
}
