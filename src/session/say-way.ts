import { type FigureKey, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import type { LimitKey } from '../search/limits.js';
import type { Binding, NothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { SearchResult } from '../search/search.js';
import type { Change, Trade, Way } from '../search/way.js';
import { sayFigure } from './say-figure.js';
import { sayParameter } from './say-parameter.js';
import { sayTime } from './say-time.js';

/** What each kind of way is, in words. */
export const kindWords: Readonly<Record<Way['kind'], string>> = {
  closest: 'closest to the preset',
  'best-signal': 'best signal',
  sharpest: 'sharpest',
  shortest: 'shortest',
  'best-contrast': 'best contrast',
  'fewest-changes': 'fewest changes',
  'least-rf': 'least RF',
};

/** Figures a person weighs a way by, in the order they are said. */
const weighed: readonly FigureKey[] = [
  'relativeSnr',
  'relativeContrast',
  'voxelReadMm',
  'voxelPhaseMm',
  'voxelSliceMm',
  'coverageMm',
  'blurFwhmPx',
  'scanTimeS',
  'holds',
  'rfPowerTrend',
  'chemicalShiftPx',
  'distortionPxPer100Hz',
  'temporalResolutionMs',
  'cardiacPhases',
];

/** One change: `slice thickness 3 mm to 4 mm`; a split says what it is. */
function changeInWords(key: ParameterKey, { from, to }: Change): string {
  if (key === 'rounds')
    return to === 1 ? 'no longer split' : `split into ${String(to)} acquisitions${from === 1 ? '' : ` (before ${String(from)})`}`;
  return `${parameterRow(key).label} ${sayParameter(key, from)} to ${sayParameter(key, to)}`;
}

/** The changes of a way in one line: `slices 72 to 54; slice thickness 3 mm to 4 mm`. */
export function changesInWords({ changes }: Pick<Way, 'changes'>): string {
  const parts = (Object.entries(changes) as [ParameterKey, Change][]).map(([key, change]) => changeInWords(key, change));
  return parts.length === 0 ? 'nothing is changed' : parts.join('; ');
}

/** What a way meets exactly at the bound of what must be kept, in plain words with the source. */
export function exactInWords({ cautions }: Pick<Way, 'cautions'>): readonly string[] {
  return cautions.filter(({ code }) => code === 'must-keep-exact').map(({ text }) => text);
}

function tradeInWords({ figure, from, to, ratio }: Trade): string {
  const { label } = figureTable[figure];
  if (ratio === null || figure === 'scanTimeS' || figure === 'holds')
    return `${label} ${sayFigure(figure, from)} to ${sayFigure(figure, to)}`;
  const percent = Math.round((ratio - 1) * 100);
  return `${label} ${percent > 0 ? '+' : ''}${percent} %`;
}

/** Gains or losses in one line, only what a person weighs and what shows in whole percent. */
export function tradesInWords(trades: readonly Trade[]): string {
  const shown = weighed
    .flatMap((figure) => trades.filter((trade) => trade.figure === figure))
    .filter(({ ratio }) => ratio === null || Math.round((ratio - 1) * 100) !== 0);
  return shown.length === 0 ? 'nothing' : shown.map(tradeInWords).join(', ');
}

const limitWords: Readonly<Record<LimitKey, string>> = {
  holdS: 'a hold',
  timeS: 'the series',
  b1rmsUt: 'uT',
  sarWkg: 'W/kg',
  rfRatio: "of the preset's RF power",
};

/** One amount of a limit: `0.7 s of a hold`. */
function amountInWords(key: LimitKey, amount: number): string {
  if (key === 'holdS' || key === 'timeS') return `${sayTime(amount)} of ${limitWords[key]}`;
  return key === 'rfRatio' ? `${Math.round(amount * 100)} % ${limitWords[key]}` : `${amount.toFixed(2)} ${limitWords[key]}`;
}

/** The verdict with what is to spare of each limit, or by how much it is over. */
export function spareInWords({ spare, verdict }: Way): string {
  const keys = (Object.keys(limitWords) as LimitKey[]).filter(
    (key) => spare[key] !== null && (verdict !== 'OVER' || (spare[key] as number) < 0),
  );
  if (keys.length === 0) return verdict;
  const amounts = keys.map((key) => amountInWords(key, Math.abs(spare[key] as number))).join(', ');
  return verdict === 'OVER' ? `OVER by ${amounts}` : `${verdict}, to spare: ${amounts}`;
}

const boundWords: Readonly<Record<LimitKey, string>> = {
  holdS: 'breath-hold',
  timeS: 'time of the series',
  b1rmsUt: 'B1+rms',
  sarWkg: 'SAR',
  rfRatio: 'RF power',
};

/** What binds where nothing fits, and what it would need: `What binds: breath-hold: needs 12.4 s; the limit is 11.0 s.` */
export function bindingInWords({ binders, needs }: Pick<Binding, 'binders' | 'needs'>, { limits }: Pick<SearchProblem, 'limits'>): string {
  const parts = binders.map((binder) => {
    const need = needs[binder.name] ?? null;
    const given = binder.kind === 'limit' ? limits[binder.key] : undefined;
    const isTime = binder.kind === 'limit' && (binder.key === 'holdS' || binder.key === 'timeS');
    const say = (value: number) =>
      isTime ? sayTime(value) : binder.kind === 'band' ? sayFigure(binder.figure, value) : String(Number(value.toFixed(2)));
    const what =
      binder.kind === 'limit'
        ? boundWords[binder.key]
        : binder.kind === 'band'
          ? `what is kept of ${figureTable[binder.figure].label}`
          : `${binder.kind} ${binder.name}`;
    return `${what}${need === null ? '' : `: needs ${say(need)}`}${given === undefined ? '' : `; the limit is ${say(given)}`}`;
  });
  return `What binds: ${parts.join(', and ')}.`;
}

/** What is known of what binds where nothing fits: whether it was searched to the end, and that nothing helps. */
export function bindingsInWords({ bindings, proven }: Pick<NothingFits, 'bindings' | 'proven'>): string | null {
  if (!proven) return 'What binds is not proven: the search for it was stopped.';
  return bindings.length === 0 ? 'Not even without any limit: the series itself is in error.' : null;
}

/** How large the search was, and whether something better may exist. */
export function searchInWords({
  lattice,
  formed,
  fitting,
  proven,
}: Pick<SearchResult, 'lattice' | 'formed' | 'fitting' | 'proven'>): string {
  const grouped = (count: number) => (count >= 1e15 ? count.toExponential(1) : String(count).replace(/\B(?=(\d{3})+$)/g, ' '));
  const fit = fitting === null ? 'how many fit was not counted' : `${grouped(fitting)} of them fit`;
  return `The steps allow ${grouped(lattice)} ways, ${fit}; ${grouped(formed)} were formed. ${proven ? 'None is better than those shown.' : 'The search was stopped: a better one may exist.'}`;
}
