import { unknownBody } from '../calc/body.js';
import type { Scanner } from '../calc/scanner.js';
import { type Verdict, type VerdictWord, verdictOf } from '../calc/verdict.js';
import { type DemoSession, demoSession } from '../session/demo-session.js';
import { sayFigure } from '../session/say-figure.js';
import { sayTime } from '../session/say-time.js';
import { sayVerdict } from '../session/say-verdict.js';
import { presetBaseline, type SeriesResult, seriesResult } from '../session/series-result.js';
import type { Emphasis } from '../session/text-page.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { presetFolders } from '../store/preset-folder.js';
import { cleanText } from '../study/clean-text.js';
import { runningOrder } from '../study/running-order.js';
import type { Study, StudySeries } from '../study/study.js';
import { type Attempt, refuse } from './attempt.js';
import { type ChosenScanner, chooseScanner, scannerLine } from './choose-scanner.js';
import { closingWords } from './closing-words.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { type LoadedPreset, loadPreset } from './load-preset.js';
import { type Page, pageOf } from './page.js';
import { sayHolds, studyHeading } from './study-page.js';

const kindOf: Readonly<Record<VerdictWord, Emphasis>> = { FITS: 'fits', 'TOO CLOSE': 'close', OVER: 'over' };

/** What `holdfast` prints where there is no terminal: the running order of the demo session, and what some rewrites cost. */
export async function runDemo(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const shipped = presetFolders(null, '', await io.shippedPresets()).filter(({ origin }) => origin === 'shipped');
  const loaded = await loadPreset(demoSession.presetId, shipped, io);
  if (!loaded.ok) return complain(loaded, io);
  const page = pageOf(request, io);
  const { study } = loaded.value;
  const chosen = await chooseScanner(request, io, study, study.fieldT);
  if (!chosen.ok) return complain(chosen, io);
  const text = demoPage(demoSession, loaded.value, chosen.value, scannerLine(chosen.value, request), page);
  if (!text.ok) return complain(text, io);
  io.write(page.plain(text.value));
  return exitCodes.done;
}

function demoPage(
  demo: DemoSession,
  { study, rules }: LoadedPreset,
  { scanner, file }: ChosenScanner,
  where: string,
  page: Page,
): Attempt<string> {
  const rewritten = study.series.find(({ id }) => id === demo.rewrites.seriesId);
  if (rewritten === undefined) {
    const message = `Preset ${study.id} has no series ${demo.rewrites.seriesId}, which the demo session rewrites.`;
    return refuse(exitCodes.noInput, {
      code: 'series-not-there',
      path: demo.rewrites.seriesId,
      message,
      hint: 'Leave --presets out to use the shipped preset.',
    });
  }
  const circumstances = { scanner, body: unknownBody, rules };
  const evaluateWith = (series: StudySeries, set = {}) => seriesResult(series, set, presetBaseline(series, study.fieldT), circumstances);
  const results = runningOrder(study.series).map((series) => evaluateWith(series));
  const tries = demo.rewrites.tries.map(({ words, set }) => ({ words, result: evaluateWith(rewritten, set) }));
  const lines = [
    page.emphasis('heading', demo.title),
    ...wrapText(demo.note, page.width),
    ...studyHeading(study, scanner.fieldT, page),
    ...(file === null ? [] : wrapText(where, page.width)),
    '',
    ...runningOrderLines(demo, study, results, scanner, page),
    '',
    page.emphasis('heading', `Series ${rewritten.id} rewritten`),
    ...rewriteLines(demo, tries, scanner, page),
    '',
    ...wrapText(closingWords, page.width),
  ];
  return { ok: true, value: `${lines.join('\n')}\n` };
}

function runningOrderLines(demo: DemoSession, study: Study, results: readonly SeriesResult[], scanner: Scanner, page: Page): string[] {
  let totalS = 0;
  const rows = results.map((result) => {
    const { figures } = result.evaluation;
    totalS += figures.tableTimeS ?? 0;
    const verdict = holdVerdict(demo, result, scanner);
    return [
      result.series.id,
      sayFigure('scanTimeS', figures.scanTimeS),
      sayHolds(figures),
      sayFigure('relativeSnr', figures.relativeSnr),
      sayTime(totalS),
      verdict === null ? '' : page.emphasis(kindOf[verdict.word], sayVerdict(verdict)),
    ];
  });
  const columns = [
    { title: 'series', align: 'left' },
    { title: 'time', align: 'right' },
    { title: 'breath-holds', align: 'right' },
    { title: 'SNR', align: 'right' },
    { title: 'running total', align: 'right' },
    { title: `this patient: ${demo.limits.holdS} s a hold`, align: 'left' },
  ] as const;
  const session = verdictOf('session', totalS, demo.limits.minutes * 60, {
    modelErrorPercent: scanner.modelErrorPercent,
    hasTimeReading: false,
  });
  const minimum = study.minimumSet.map((item) => (typeof item === 'string' ? item : item.join(' or ')));
  return [
    ...textTable(columns, rows, page.reader),
    ...wrapText(
      'The running total counts 20 s of preparation a series, and 30 s of instruction and rest a breath-hold (common practice, no source).',
      page.width,
    ),
    page.emphasis(kindOf[session.word], `Session: ${sayVerdict(session)} of ${demo.limits.minutes} minutes.`),
    ...(minimum.length === 0 ? [] : [cleanText(`Minimum set: ${minimum.join(', ')}.`)]),
  ];
}

function rewriteLines(
  demo: DemoSession,
  tries: readonly { readonly words: string; readonly result: SeriesResult }[],
  scanner: Scanner,
  page: Page,
): string[] {
  const columns = [
    { title: 'with', align: 'left' },
    { title: 'breath-hold', align: 'right' },
    { title: 'SNR', align: 'right' },
    { title: 'coverage', align: 'right' },
    { title: 'verdict', align: 'left' },
  ] as const;
  const rows = tries.map(({ words, result }) => {
    const { figures } = result.evaluation;
    const verdict = holdVerdict(demo, result, scanner);
    return [
      words,
      sayFigure('holdTimeS', figures.holdTimeS),
      sayFigure('relativeSnr', figures.relativeSnr),
      sayFigure('coverageMm', figures.coverageMm),
      verdict === null ? '' : page.emphasis(kindOf[verdict.word], sayVerdict(verdict)),
    ];
  });
  return textTable(columns, rows, page.reader);
}

/** The breath-hold against what this patient can hold; null for a series without breath-holds. */
function holdVerdict(demo: DemoSession, result: SeriesResult, scanner: Scanner): Verdict | null {
  const { holdTimeS } = result.evaluation.figures;
  if (holdTimeS === null) return null;
  return verdictOf('hold', holdTimeS, demo.limits.holdS, { modelErrorPercent: scanner.modelErrorPercent, hasTimeReading: false });
}
