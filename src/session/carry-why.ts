import type { ParameterKey } from '../calc/parameters.js';
import type { CarriedValue } from '../search/carry.js';
import { seriesCarry } from './carry.js';
import { type CarryRow, carryRow } from './carry-rows.js';
import { figureReasons } from './figure-reasons.js';
import { sayParameter } from './say-parameter.js';
import type { State } from './state.js';
import type { Paragraph } from './type-these.js';

const part = (title: string, words: string): Paragraph[] =>
  words === '' ? [] : [{ words: '' }, { words: title, style: 'quiet' }, { words }];

const capital = (words: string) => `${words.charAt(0).toUpperCase()}${words.slice(1)}`;
const sentence = (words: string) => (/[.!?]$/.test(words) ? capital(words) : `${capital(words)}.`);

const units = { Hz: 'Hz', Ms: 'ms', Deg: 'deg' } as const;

/** A number with its name in words: `equalShiftHz` becomes `equal shift 440 Hz`. */
function sayNamed(name: string, value: number): string {
  const unit = /(Hz|Ms|Deg)$/.exec(name)?.[1] as keyof typeof units | undefined;
  const words = (unit === undefined ? name : name.slice(0, -unit.length)).replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
  return `${words} ${Number(value.toPrecision(4))}${unit === undefined ? '' : ` ${units[unit]}`}`;
}

const ofTissue =
  'magnetisation transfer, flow, B1 that is less even at higher field; tissue values are of populations, not of this patient';

/** What the way to a carried value leaves out. */
function ignoredBy(key: ParameterKey): string {
  if (key === 'pixelBandwidthHz') return 'lines of fat other than the main one, susceptibility, and eddy currents of other gradients';
  if (key === 'averages' || key === 'diffusion')
    return 'that coils differ in how much of the noise comes from the patient; physiological noise';
  return ofTissue;
}

function whyValue({ key, from, to, why, numbers, formula, source }: CarriedValue, label: string): readonly Paragraph[] {
  const [before, after] = [sayParameter(key, from), sayParameter(key, to)];
  const named = Object.entries(numbers).map(([name, value]) => sayNamed(name, value));
  return [
    { words: `${label}: ${before === after ? `${before}, as in the preset` : `${before} becomes ${after}`}`, style: 'bold' },
    { words: '' },
    { words: sentence(why) },
    ...part('Numbers', named.join(', ')),
    ...part('Formula', formula),
    ...part('Source', source),
    ...part('It ignores', ignoredBy(key)),
  ];
}

function whyFigure(state: State, { label, before, after, figure }: CarryRow): readonly Paragraph[] {
  const reason = figure === undefined ? undefined : figureReasons[figure];
  const contrast = figure === 'contrastRatio' ? (seriesCarry(state)?.contrast.words ?? '') : '';
  return [
    { words: `${label}: ${before} in the preset, ${after} carried`, style: 'bold' },
    { words: '' },
    ...(contrast === '' ? [] : [{ words: sentence(contrast) }]),
    ...(reason === undefined ? [] : [{ words: reason.sentence }]),
    ...(reason === undefined
      ? []
      : [...part('Formula', reason.formula), ...part('Source', reason.source), ...part('It ignores', reason.ignores)]),
  ];
}

function whyRf(state: State, words: string): readonly Paragraph[] {
  const rf = seriesCarry(state)?.rf;
  const numbers =
    rf === undefined
      ? ''
      : `SAR trend ${Number(rf.low.toPrecision(3))} to ${Number(rf.high.toPrecision(3))}, B1+rms ${Number(rf.b1RmsRatio.toPrecision(3))}, each over the preset's`;
  return [
    { words: 'RF: a range, shown and never set', style: 'bold' },
    { words: '' },
    { words: sentence(words) },
    ...part('Numbers', numbers),
    ...part('Formula', 'SAR ~ B1+rms^2 x B0^0.85 to B0^2; the angle is the root at which an end of the range is the preset again'),
    ...part(
      'Source',
      'B0^0.85: full-wave whole-body models from 1.5 to 3 T, IEEE Rev Biomed Eng 2017;10:95, table VI; B0^2: quasi-static, an upper bound going up',
    ),
    ...part('It ignores', "the patient, the coil and the scanner's own pulses: read the value that the scanner displays before starting"),
  ];
}

/** Explains the line of the carry screen that the hand is on. The sentence comes first. */
export function carryWhy(state: State): readonly Paragraph[] {
  const row = carryRow(state);
  if (row === undefined) return [{ words: 'Nothing to explain' }];
  if (row.value !== undefined) return whyValue(row.value, row.label);
  if (row.kind === 'figure') return whyFigure(state, row);
  if (row.field === 'rf') return whyRf(state, row.words);
  if (row.kind === 'choice') return [{ words: `${row.label}: ${row.after}`, style: 'bold' }, { words: '' }, { words: row.words }];
  return [{ words: capital(row.label), style: 'bold' }, { words: '' }, { words: sentence(row.words) }];
}
