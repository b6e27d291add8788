import { classRow, figureNeeds } from '../calc/classes.js';
import { figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { classOf } from '../calc/series.js';
import { isCarrying } from './carry.js';
import { carryWhy } from './carry-why.js';
import { changedKeys } from './changed-keys.js';
import { consequences } from './consequences.js';
import { figureReasons } from './figure-reasons.js';
import { fieldHere } from './hands/series-commands.js';
import { nextStep } from './next-step.js';
import { resultNow, resultOfPreset, studySeries } from './results.js';
import { sayField } from './say-field.js';
import { sayFigure } from './say-figure.js';
import { sayParameter } from './say-parameter.js';
import { fieldValue } from './series-fields.js';
import { sessionCautions } from './session-cautions.js';
import { isLocked } from './set-field.js';
import type { State } from './state.js';
import type { Paragraph } from './type-these.js';

/** Explains what the hand is on: a parameter, a consequence, a caution. The sentence comes first. */
export function whyText(state: State): readonly Paragraph[] {
  if (isCarrying(state)) return carryWhy(state);
  const { pane } = state.place;
  return pane === 'consequences' ? whyFigure(state) : pane === 'cautions' ? whyCaution(state) : whyParameter(state);
}

const part = (title: string, words: string): Paragraph[] => [{ words: '' }, { words: title, style: 'quiet' }, { words }];

function whyFigure(state: State): readonly Paragraph[] {
  const { seriesId, figure } = state.place;
  const row = consequences(state, seriesId).find(({ key }) => key === figure) ?? consequences(state, seriesId)[0];
  if (row === undefined) return [{ words: 'Nothing to explain' }];
  const now = resultNow(state, seriesId);
  const before = resultOfPreset(state, seriesId);
  const reason = figureReasons[row.key];
  const { help, label } = figureTable[row.key];
  const changed = changedKeys(studySeries(state, seriesId).parameters, now.parameters);
  const settings = changed.map(
    (key) => `${parameterRow(key).label} ${sayParameter(key, before.parameters[key])} to ${sayParameter(key, now.parameters[key])}`,
  );
  const pair = row.key === 'relativeSnr' || row.key === 'relativeContrast' ? signalWords(state, row.key === 'relativeContrast') : [];
  return [
    { words: `${label}: ${row.value}${row.change === '' ? '' : ` (${row.change} against the preset)`}`, style: 'bold' },
    { words: '' },
    { words: reason?.sentence ?? `${help}.` },
    ...part(
      'Numbers',
      `${sayFigure(row.key, before.evaluation.figures[row.key])} with the preset, ${row.value} now. ${settings.length === 0 ? 'Nothing is changed.' : `Changed: ${settings.join('; ')}.`}`,
    ),
    ...pair,
    ...(row.fromReading
      ? part(
          'From a scanner reading',
          "Scaled from the number that the scanner displayed for the preset: same coil, same patient. Read the scanner's value again before starting.",
        )
      : []),
    ...(reason === undefined
      ? []
      : [...part('Formula', reason.formula), ...part('Source', reason.source), ...part('It ignores', reason.ignores)]),
  ];
}

function signalWords(state: State, both: boolean): Paragraph[] {
  const { seriesId } = state.place;
  const series = studySeries(state, seriesId);
  const now = resultNow(state, seriesId).evaluation.signals;
  const before = resultOfPreset(state, seriesId).evaluation.signals;
  const names = both ? [series.target, series.comparison] : [series.target];
  return names.map((name) => {
    const [was, is] = [before, now].map((signals) => signals.find(({ tissue }) => tissue === name));
    const digits = (value: number | null | undefined) => (value == null ? 'no value' : value.toPrecision(2));
    return {
      words: `Signal of ${name} (T1 ${Math.round(is?.t1Ms ?? 0)} ms, T2 ${Math.round(is?.t2Ms ?? 0)} ms): ${digits(was?.signal)} with the preset, ${digits(is?.signal)} now.`,
    };
  });
}

function whyCaution(state: State): readonly Paragraph[] {
  const { seriesId, caution } = state.place;
  const cautions = sessionCautions(state, seriesId);
  const row = cautions[Math.min(caution, cautions.length - 1)];
  if (row === undefined) return [{ words: 'No cautions for this series.' }];
  const numbers = Object.entries(row.numbers).map(([name, value]) => `${name} ${Number(value.toPrecision(4))}`);
  const levels = {
    error: 'As it stands this series cannot give what it promises.',
    caution: 'Look at this before starting.',
    note: 'Good to know.',
  } as const;
  return [
    { words: `${row.level}: ${row.text}`, style: 'bold' },
    { words: '' },
    { words: levels[row.level] },
    ...(numbers.length === 0 ? [] : part('Numbers', numbers.join(', '))),
    ...part('Code', row.code),
    ...(row.code === 'must-keep' ? part('Who accepts it', 'The record (e) asks which role accepts that it is crossed.') : []),
  ];
}

function whyParameter(state: State): readonly Paragraph[] {
  const { seriesId } = state.place;
  const field = fieldHere(state);
  const now = resultNow(state, seriesId);
  const series = studySeries(state, seriesId);
  const value = fieldValue(field, now.parameters);
  const planned = fieldValue(field, series.parameters);
  const carried = now.carried.find(({ key }) => key === field.key);
  const range =
    field.kind === 'number' ? `${field.min} to ${field.max}${field.unit === '' ? '' : ` ${field.unit}`}` : field.choices.join(', ');
  const dicom = parameterRow(field.key).dicom;
  const { sentences } = nextStep(state, seriesId, field);
  const { figures } = now.evaluation;
  const empty = classRow(classOf(series)).figures.filter((key) => figures[key] === null && figureNeeds[key] !== undefined);
  return [
    {
      words: `${field.label}: ${sayField(field, value)}${sayField(field, planned) === sayField(field, value) ? ', as in the preset' : ` (preset ${sayField(field, planned)})`}`,
      style: 'bold',
    },
    { words: '' },
    { words: `${field.help.charAt(0).toUpperCase()}${field.help.slice(1)}.` },
    ...(carried === undefined
      ? []
      : part(
          'It follows',
          `${carried.because}. The preset's slack is kept: new = old + (shortest now - shortest before). A value typed here wins.`,
        )),
    ...(isLocked(state, seriesId, field.key)
      ? part('Locked', 'Whoever reviewed this preset locked it. l on the series screen opens it by hand; the record shows the change.')
      : []),
    ...(sentences.length === 0 ? [] : part('Next step', `${sentences.join('. ')}.`)),
    ...(range === '' ? [] : part('Range', range)),
    ...part('DICOM', dicom ?? 'the standard has no keyword for it'),
    ...(empty.length === 0
      ? []
      : part('Figures without a value here', empty.map((key) => `${figureTable[key].label}: ${figureNeeds[key]}`).join('; '))),
  ];
}
