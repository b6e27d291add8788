import { classRow } from '../calc/classes.js';
import { type FigureKey, figureKeys, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { Scanner } from '../calc/scanner.js';
import { classOf } from '../calc/series.js';
import { readQuantity } from '../formulas/read-quantity.js';
import { type Bands, usualBands } from '../search/bands.js';
import type { Limits } from '../search/limits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import { presetBaseline } from '../session/series-result.js';
import { shownValue } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { readSetValues } from '../study/set-values.js';
import type { StudySeries } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandRequest } from './command-request.js';
import { exitCodes } from './exit-codes.js';
import type { LoadedPreset } from './load-preset.js';
import { readBody, readReadings } from './read-named-numbers.js';
import { seriesNamed } from './series-named.js';
import { withSomethingToChange } from './with-something-to-change.js';

/** Options that limit a search: unit, and the largest number that is still no slip of the keyboard. */
const limitOptions = [
  { option: 'hold', key: 'holdS', unit: 's', max: 600 },
  { option: 'time', key: 'timeS', unit: 's', max: 36_000 },
  { option: 'b1rms', key: 'b1rmsUt', unit: 'uT', max: 100 },
  { option: 'sar', key: 'sarWkg', unit: 'W/kg', max: 100 },
  { option: 'rf-ratio', key: 'rfRatio', unit: '', max: 100 },
] as const;

/** Reads a number above 0 of an option, with its unit or without. */
export function readAboveZero(option: string, text: string, unit: string, max: number): Attempt<number> {
  const read = readQuantity(text, unit);
  const range = `more than 0 and at most ${max}${unit === '' ? '' : ` ${unit}`}`;
  if (!read.ok) return wrongUse(option, `${option} takes ${read.expected}, ${range}; ${shownValue(text)} was given.`, 'Write a number.');
  if (read.value <= 0 || read.value > max)
    return wrongUse(option, `${option} takes ${range}; ${shownValue(text)} was given.`, 'Check the number.');
  return { ok: true, value: read.value };
}

function readLimits(request: CommandRequest): Attempt<Limits> {
  const limits: Record<string, number> = {};
  for (const { option, key, unit, max } of limitOptions) {
    const text = request.value(option);
    if (text === undefined) continue;
    const read = readAboveZero(`--${option}`, text, unit, max);
    if (!read.ok) return read;
    limits[key] = read.value;
  }
  const { holdS, timeS } = limits;
  if (holdS !== undefined && timeS !== undefined && holdS > timeS) {
    const message = `--hold ${holdS} s and --time ${timeS} s contradict each other: one breath-hold cannot last longer than the whole series may.`;
    return wrongUse('--hold', message, 'Lower --hold, or raise --time.');
  }
  return { ok: true, value: limits };
}

/** Reads the bands of `--keep FIGURE=RATIO` on top of the usual ones. */
function readKeep(texts: readonly string[], known: (figure: FigureKey) => boolean): Attempt<Bands> {
  const kept: Partial<Record<FigureKey, number>> = {};
  for (const text of texts) {
    const [name = '', value, ...more] = text.split('=').map((part) => part.trim());
    if (value === undefined || more.length > 0)
      return wrongUse('--keep', `--keep takes FIGURE=RATIO; ${shownValue(text)} was given.`, 'Write --keep relativeSnr=0.8.');
    const figure = figureKeys.find((key) => key === name);
    if (figure === undefined) {
      const near = nearestWord(name, figureKeys);
      return wrongUse(
        '--keep',
        `--keep knows no figure ${shownValue(name)}.`,
        near === null ? `Figures: ${figureKeys.join(', ')}.` : `Did you mean ${near}?`,
      );
    }
    if (!known(figure)) {
      return wrongUse(
        '--keep',
        `--keep ${figure}: this series has no ${figureTable[figure].label} to compare with.`,
        'Keep another figure.',
      );
    }
    if (kept[figure] !== undefined) return wrongUse('--keep', `--keep names ${figure} twice.`, 'Give it once.');
    const read = readAboveZero('--keep', value, '', 1000);
    if (!read.ok) return read;
    kept[figure] = read.value;
  }
  return { ok: true, value: { ...usualBands, ...kept } };
}

function readOpened(texts: readonly string[], series: StudySeries): Attempt<ParameterKey[]> {
  const opened: ParameterKey[] = [];
  const has = classRow(classOf(series)).parameters;
  for (const text of texts) {
    const key = parameterKeys.find((name) => name === text.trim());
    if (key === undefined || !has.includes(key)) {
      const near = nearestWord(text, has);
      return wrongUse(
        '--open',
        `--open knows no parameter ${shownValue(text)} of ${classRow(classOf(series)).label}.`,
        near === null ? `Parameters: ${has.join(', ')}.` : `Did you mean ${near}?`,
      );
    }
    if (parameterRow(key).kind === 'object')
      return wrongUse('--open', `--open ${key}: it is no single value that could be stepped.`, 'Set it with --set instead.');
    if (series.locked.includes(key))
      return wrongUse(
        '--open',
        `--open ${key}: the preset locks it for searches.`,
        'Take it out of "locked" in the preset, or leave --open away.',
      );
    opened.push(key);
  }
  return { ok: true, value: opened };
}

/** Reads everything that `holdfast ways` is asked with. */
export function readWaysRequest(preset: LoadedPreset, scanner: Scanner, request: CommandRequest): Attempt<SearchProblem> {
  const { study, rules } = preset;
  const series = seriesNamed(preset.study, request.arguments[1] ?? '');
  if (!series.ok) return series;
  const limits = readLimits(request);
  if (!limits.ok) return limits;
  const readings = readReadings(request.values('reading'));
  if (!readings.ok) return readings;
  for (const [option, limit, reading, key] of [
    ['--b1rms', limits.value.b1rmsUt, readings.value.b1rmsUt, 'b1rmsUt'],
    ['--sar', limits.value.sarWkg, readings.value.sarWkg, 'sarWkg'],
  ] as const) {
    if (limit === undefined || reading !== undefined) continue;
    const message = `${option} needs what the scanner displays for this series as the preset has it: the model gives a trend only, and an absolute value is scaled from the scanner's own number.`;
    return wrongUse(option, message, `Add --reading ${key}=NUMBER, or limit the ratio to the preset with --rf-ratio.`);
  }
  const body = readBody(request.value('body'));
  if (!body.ok) return body;
  const preset0 = presetBaseline(series.value, study.fieldT);
  const figuresOfClass = classRow(preset0.model.key).figures;
  const bands = readKeep(
    request.values('keep'),
    (figure) => figuresOfClass.includes(figure) && !(figure === 'holdTimeS' && preset0.model.time.holdTimeS === null),
  );
  if (!bands.ok) return bands;
  const opened = readOpened(request.values('open'), series.value);
  if (!opened.ok) return opened;
  const set = readSetValues(request.values('set'), series.value);
  if (!set.ok) return { ok: false, exit: exitCodes.wrongUse, problems: set.problems };
  const has = classRow(classOf(series.value)).parameters;
  const foreign = (Object.keys(set.value) as ParameterKey[]).find((key) => !has.includes(key));
  if (foreign !== undefined)
    return wrongUse(
      '--set',
      `Series ${series.value.id} is ${classRow(classOf(series.value)).label}, which has no ${foreign}.`,
      'Leave it out.',
    );
  const both = opened.value.find((key) => set.value[key] !== undefined);
  if (both !== undefined)
    return wrongUse('--open', `--set and --open both name ${both}: a value set by hand is not searched.`, 'Give one of them.');
  return withSomethingToChange({
    series: series.value,
    presetFieldT: study.fieldT,
    scanner,
    body: body.value,
    rules,
    limits: limits.value,
    readings: readings.value,
    bands: bands.value,
    set: set.value,
    opened: opened.value,
    frozen: false,
  });
}
