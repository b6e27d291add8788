import { classRow } from '../calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { classOf } from '../calc/series.js';
import { releaseWords } from '../session/difference-page.js';
import { sayParameter } from '../session/say-parameter.js';
import { textTable } from '../session/text-table.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import { limitInWords } from '../study/must-keep.js';
import { runningOrder } from '../study/running-order.js';
import type { MustKeep, Study, StudySeries } from '../study/study.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { loadPreset } from './load-preset.js';
import { type Page, pageOf } from './page.js';

/** `holdfast presets show`: one preset, its series in running order with parameters and must-keeps. */
export async function runPresetsShow(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const loaded = await loadPreset(request.arguments[0] ?? '', settings.value.presetFolders, io);
  if (!loaded.ok) return complain(loaded, io);
  const page = pageOf(request, io);
  io.write(page.plain(presetPage(loaded.value.study, page)));
  return exitCodes.done;
}

function presetPage(study: Study, page: Page): string {
  const minimum = study.minimumSet.map((item) => (typeof item === 'string' ? item : `one of ${item.join(' or ')}`));
  const lines = [
    page.emphasis('heading', cleanText(study.title)),
    ...wrapText(
      cleanText(
        `preset ${study.id}, ${study.status}, revision ${study.revision}, ${study.region}, ${study.fieldT} T${releaseWords(study)}`,
      ),
      page.width,
    ),
    ...(study.notes === '' ? [] : wrapText(cleanText(study.notes), page.width)),
    ...(minimum.length === 0 ? [] : wrapText(`Minimum set: ${minimum.join(', ')}.`, page.width)),
    ...runningOrder(study.series).flatMap((series) => ['', ...seriesLines(series, page)]),
  ];
  return `${lines.join('\n')}\n`;
}

function seriesLines(series: StudySeries, page: Page): string[] {
  const row = classRow(classOf(series));
  const about = `${row.label}, ${series.plane}${series.purpose === null ? '' : `, ${series.purpose}`}; ${series.target} against ${series.comparison}`;
  const keys = parameterKeys.filter((key) => row.parameters.includes(key) && series.parameters[key] !== undefined);
  const columns = [
    { title: 'key', align: 'left' },
    { title: 'value', align: 'point' },
    { title: 'meaning', align: 'left' },
  ] as const;
  const words = (key: ParameterKey) => cleanText(sayParameter(key, series.parameters[key]));
  // What holds several values is long: it stands on a line of its own.
  const single = keys.filter((key) => parameterRow(key).kind !== 'object');
  const several = keys.filter((key) => parameterRow(key).kind === 'object');
  return [
    ...wrapText(cleanText(`${series.id}: ${series.title}`), page.width).map((line) => page.emphasis('heading', line)),
    ...wrapText(cleanText(about), page.width),
    ...textTable(
      columns,
      single.map((key) => [key, words(key), parameterRow(key).label]),
      page.reader,
    ),
    ...several.flatMap((key) => wrapText(`${key}: ${words(key)}`, page.width)),
    ...series.mustKeep.flatMap((mustKeep) => wrapText(cleanText(`must keep: ${mustKeepWords(mustKeep)} (${mustKeep.source})`), page.width)),
    ...(series.pairedWith.length === 0 ? [] : [`changes together with: ${series.pairedWith.join(', ')}`]),
    ...(series.locked.length === 0 ? [] : wrapText(`locked for a search: ${series.locked.join(', ')}`, page.width)),
    ...(series.opened.length === 0 ? [] : wrapText(`open to a search: ${series.opened.join(', ')}`, page.width)),
  ];
}

function mustKeepWords(mustKeep: MustKeep): string {
  const name = mustKeep.figure ?? mustKeep.parameter;
  const what = name === undefined ? (mustKeep.rule ?? '') : `${name} ${limitInWords(mustKeep, '')}`;
  return mustKeep.when === undefined ? what : `${what}, when ${mustKeep.when}`;
}
