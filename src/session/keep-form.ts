import { type FigureKey, figureTable } from '../calc/figures.js';
import { usualBands } from '../search/bands.js';
import type { MustKeep } from '../study/study.js';
import { type FormRow, numberRow } from './form-row.js';
import { resultOfPreset, studySeries } from './results.js';
import type { Session } from './session.js';
import type { State } from './state.js';
import { bandsOf } from './ways.js';

/** Bands as they are said: an amount in percent of the preset that is kept at least, allowed at most, or either way. */
type Sense = 'at least' | 'at most' | 'within';

function senseOf(figure: FigureKey): Sense {
  const { better } = figureTable[figure];
  return better === 'neither' ? 'within' : better === 'higher' ? 'at least' : 'at most';
}

/** A band of ratio 0.85 that holds either way is said as 15 %. */
const percentOf = (sense: Sense, ratio: number) => Math.round((sense === 'within' ? Math.abs(1 - ratio) : ratio) * 1000) / 10;
const ratioOf = (sense: Sense, percent: number) => Number((sense === 'within' ? 1 - percent / 100 : percent / 100).toFixed(6));

const ranges: Readonly<Record<Sense, { readonly min: number; readonly max: number }>> = {
  'at least': { min: 5, max: 200 },
  'at most': { min: 50, max: 1000 },
  within: { min: 1, max: 95 },
};

function withBand(session: Session, figure: FigureKey, ratio: number | null): Session {
  const { keep: _before, ...rest } = session;
  const bands = { ...bandsOf(session), [figure]: ratio ?? usualBands[figure] };
  const usual = (Object.keys(bands) as FigureKey[]).every((key) => bands[key] === usualBands[key]);
  return usual ? rest : { ...rest, keep: bands };
}

/** How much of each figure every way keeps, line by line. */
export function keepForm(state: State): readonly FormRow[] {
  const { session, place } = state;
  if (session === null) return [];
  const bands = bandsOf(session);
  const { figures } = resultOfPreset(state, place.seriesId).evaluation;
  const rows = (Object.keys(usualBands) as FigureKey[]).flatMap((figure): FormRow[] => {
    if (figures[figure] === null) return [];
    const sense = senseOf(figure);
    const value = percentOf(sense, bands[figure] ?? (usualBands[figure] as number));
    const usual = percentOf(sense, usualBands[figure] as number);
    const row = numberRow({
      field: figure,
      label: `${figureTable[figure].label}, ${sense}`,
      help: `Percent of the preset. Usual: ${usual} %. Wider gives more ways, and each may give up more.`,
      value,
      unit: '',
      also: /\s*%\s*$/,
      shown: `${value} %${value === usual ? '' : `, usual ${usual} %`}`,
      ...ranges[sense],
      step: 5,
      first: usual,
      keep: (before, percent) => withBand(before, figure, percent === null ? null : ratioOf(sense, percent)),
    });
    return [row];
  });
  return [
    { field: 'heading keep', label: 'What every way keeps of the preset (of all series)', shown: '', help: '', kind: 'heading' },
    ...rows,
    ...studySeries(state, place.seriesId).mustKeep.map(
      (one, at): FormRow => ({
        field: `must keep ${at}`,
        label: `must keep ${at + 1}`,
        shown: mustKeepWords(one),
        help: `From ${one.source}. It holds for every way; the preset says it.`,
        kind: 'info',
      }),
    ),
  ];
}

function mustKeepWords({ figure, parameter, rule, atMost, atLeast, between }: MustKeep): string {
  if (rule !== undefined) return rule;
  const name = figure === undefined ? String(parameter) : figureTable[figure].label;
  if (between !== undefined) return `${name} from ${between[0]} to ${between[1]}`;
  return [name, ...(atMost === undefined ? [] : [`at most ${atMost}`]), ...(atLeast === undefined ? [] : [`at least ${atLeast}`])].join(
    ' ',
  );
}

/** The bands, each in words: `SNR at least 70 %`, `voxel phase at most 135 %`. */
export function keptInWords(state: State): readonly string[] {
  return keepForm(state)
    .filter(({ kind }) => kind === 'number')
    .map(({ label, shown }) => `${label.replaceAll(',', '')} ${shown.replace(/, usual.*/, '')}`);
}
