import { classRow } from '../calc/classes.js';
import { type FigureKey, figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { classOf } from '../calc/series.js';
import type { CarriedValue, SeriesCarry } from '../search/carry.js';
import { mustKeepCautions } from '../study/must-keep.js';
import { aimWords, type CarryTarget, carryTargets, sayTarget, seriesCarry } from './carry.js';
import { sayFigure } from './say-figure.js';
import { sayParameter } from './say-parameter.js';
import type { State } from './state.js';

/** One line of the carry screen. */
export interface CarryRow {
  readonly field: string;
  /** `choice`: left and right change it. `heading`: the hand passes over it. */
  readonly kind: 'choice' | 'value' | 'figure' | 'words' | 'heading';
  readonly label: string;
  readonly before: string;
  readonly after: string;
  /** Why, or what is said. */
  readonly words: string;
  /** Another value than in the preset, or something that needs an eye. */
  readonly stands: 'moved' | 'attention' | 'plain';
  readonly value?: CarriedValue;
  readonly figure?: FigureKey;
}

/** Figures that a change of field is about, in this order. */
export const carryFigures: readonly FigureKey[] = [
  'scanTimeS',
  'holdTimeS',
  'relativeSnr',
  'contrastRatio',
  'chemicalShiftPx',
  'b1PlusRmsUt',
  'blurFwhmPx',
];

function said(field: string, label: string, words: string, stands: CarryRow['stands'] = 'plain'): CarryRow {
  return { field, kind: 'words', label, before: '', after: '', words, stands };
}

function choice(field: string, label: string, after: string, words: string): CarryRow {
  return { field, kind: 'choice', label, before: '', after, words, stands: 'plain' };
}

function heading(label: string): CarryRow {
  return { field: `heading ${label}`, kind: 'heading', label, before: '', after: '', words: '', stands: 'plain' };
}

const aimHelp =
  'Contrast ratio: bandwidth for equal chemical shift, TI by null, echoes at the exact field, TR, angle or TE solved for the named pair. SNR: the same, and what SNR is gained is spent on averages and bandwidth. Chemical shift: nothing else is solved. Time: as contrast ratio, and no series takes longer.';

const nameOf = (target: CarryTarget) => ('fieldT' in target ? `${target.fieldT} T` : (target.choice.file?.name ?? ''));

/** Where to, what is held equal, which series: the lines at the top. */
export function carryChoices(state: State): readonly CarryRow[] {
  const { carry } = state;
  if (carry === null) return [];
  const { study, target, aim, seriesId } = carry;
  const coils = 'choice' in target ? (target.choice.file?.coils ?? []) : [];
  const at = study.series.findIndex(({ id }) => id === seriesId);
  const series = study.series[at];
  return [
    choice(
      'to',
      'to',
      sayTarget(target),
      `Left and right go through ${carryTargets(state).map(nameOf).join(', ')}. A number is typed: 0.5 to 3 T.`,
    ),
    ...(coils.length > 1 ? [choice('coil', 'coil', 'choice' in target ? (target.choice.coil ?? '') : '', 'Coil of this scanner.')] : []),
    choice('equal', 'keep equal', aimWords[aim], aimHelp),
    choice(
      'series',
      'series',
      series === undefined
        ? '-'
        : `${series.id}, ${at + 1} of ${study.series.length}: ${classRow(classOf(series)).label}, ${series.target} and ${series.comparison}`,
      'n is the next series.',
    ),
  ];
}

/** A value that fits a column beside another. */
function isShort(value: CarriedValue): boolean {
  return parameterRow(value.key).kind !== 'object';
}

/** What becomes of the series that is looked at: values, figures, RF, must-keeps, and what is not carried. */
export function carryRows(state: State): readonly CarryRow[] {
  const one = seriesCarry(state);
  if (one === null || state.carry?.carried == null) return [];
  const { rf, contrast, gaps, extrapolated } = one;
  const solves = one.values.some(({ why }) => why.includes(contrast.words));
  return [
    ...one.values.map(valueRow),
    ...carryFigures.flatMap((key) => figureRow(one, key)),
    ...(solves ? [] : [said('contrast', 'contrast', contrast.words, contrast.status === 'unsolvable' ? 'attention' : 'plain')]),
    said('rf', 'RF', rf.words, rf.high > 1 ? 'attention' : 'plain'),
    ...keepRows(one),
    ...one.evaluation.cautions
      .filter(({ level }) => level !== 'note')
      .map(({ level, text }, at) => said(`caution ${at}`, level, text, 'attention')),
    ...(extrapolated.length === 0
      ? []
      : [said('extrapolated', 'extrapolated', `relaxation beyond the measured fields: ${extrapolated.join(', ')}`, 'attention')]),
    heading('Not carried'),
    ...gaps.map(({ what, why }, at) => said(`gap ${at}`, what, why, 'attention')),
    ...state.carry.carried.gaps.map(({ what, why }, at) => said(`all ${at}`, what, why)),
  ];
}

function valueRow(value: CarriedValue): CarryRow {
  const { key, from, to, why } = value;
  const [before, after] = [sayParameter(key, from), sayParameter(key, to)];
  return {
    field: `value ${key}`,
    kind: 'value',
    label: parameterRow(key).label,
    before: isShort(value) ? before : 'as set',
    after: isShort(value) ? after : before === after ? 'as set' : 'changed',
    words: isShort(value) ? why : `${before} becomes ${after}: ${why}`,
    stands: before === after ? 'plain' : 'moved',
    value,
  };
}

function figureRow({ before, evaluation }: SeriesCarry, key: FigureKey): readonly CarryRow[] {
  const [was, is] = [before.figures[key], evaluation.figures[key]];
  if (was === null && is === null) return [];
  const words = is === null ? 'not known here' : '';
  const stands = is === null ? 'attention' : 'plain';
  return [
    {
      field: `figure ${key}`,
      kind: 'figure',
      label: figureTable[key].label,
      before: sayFigure(key, was),
      after: sayFigure(key, is),
      words,
      stands,
      figure: key,
    },
  ];
}

function keepRows({ mustKeeps }: SeriesCarry): readonly CarryRow[] {
  if (mustKeeps.length === 0) return [];
  const kept = mustKeeps.filter(({ status }) => status === 'kept').length;
  const idle = mustKeeps.filter(({ status }) => status === 'does not apply').length;
  return [
    said('kept', 'must-keeps', `${kept} of ${mustKeeps.length} kept${idle === 0 ? '' : `, ${idle} not for these values`}`),
    ...mustKeepCautions(mustKeeps).map(({ code, text }, at) =>
      said(`must-keep ${at}`, code === 'must-keep' ? 'crossed' : 'not checked', text, 'attention'),
    ),
  ];
}

/** Every line that the hand can stand on. */
export function carryLines(state: State): readonly CarryRow[] {
  return [...carryChoices(state), ...carryRows(state).filter(({ kind }) => kind !== 'heading')];
}

/** The line under the hand. */
export function carryRow(state: State): CarryRow | undefined {
  const rows = carryLines(state);
  return rows.find(({ field }) => field === state.place.fields.carry) ?? rows[0];
}

/** All series in a table, its titles first: what becomes of time, SNR, contrast and RF, and how much is not carried. */
export function carryOverview({ carry }: State): readonly (readonly string[])[] | null {
  if (carry?.carried == null) return null;
  const both = ({ before, evaluation }: SeriesCarry, key: FigureKey) =>
    `${sayFigure(key, before.figures[key])} > ${sayFigure(key, evaluation.figures[key])}`;
  return [
    ['series', 'time', 'SNR', 'contrast ratio', 'SAR trend', 'contrast', 'not carried'],
    ...carry.carried.series.map((one) => [
      one.series.id,
      both(one, 'scanTimeS'),
      sayFigure('relativeSnr', one.evaluation.figures.relativeSnr),
      both(one, 'contrastRatio'),
      `x ${one.rf.low.toFixed(2)} to ${one.rf.high.toFixed(2)}`,
      one.contrast.status,
      one.gaps.length === 0 ? '-' : String(one.gaps.length),
    ]),
  ];
}
