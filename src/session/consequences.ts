import { classRow } from '../calc/classes.js';
import { type FigureKey, figureKeys, figureRow } from '../calc/figures.js';
import { classOf } from '../calc/series.js';
import type { MustKeep } from '../study/study.js';
import { readingsOf, resultNow, resultOfPreset, sessionSeries, studySeries } from './results.js';
import { sayChange, sayFigure } from './say-figure.js';
import type { State } from './state.js';
import { seriesVerdicts } from './verdicts.js';

/** One consequence on the common scale. */
export interface Consequence {
  readonly key: FigureKey;
  /** At most 11 characters. */
  readonly label: string;
  /** Value over the preset's; null where there is nothing to compare. */
  readonly ratio: number | null;
  readonly value: string;
  /** Against the preset: `-33 %`. */
  readonly change: string;
  /** The patient's limit or must-keep over the preset's value; null where there is none. */
  readonly limitRatio: number | null;
  /** Beyond a limit or must-keep. */
  readonly over: boolean;
  readonly fromReading: boolean;
}

const place = (key: FigureKey) => figureRow(key).scale?.place ?? Number.POSITIVE_INFINITY;

/** The figures of the scale, in the order they are asked for; wider screens show more of them. */
export const scaleFigures: readonly FigureKey[] = figureKeys
  .filter((key) => figureRow(key).scale !== undefined)
  .sort((a, b) => place(a) - place(b));

/** A figure's name in the narrow column. */
export function figureLabel(key: FigureKey): string {
  const { scale, label } = figureRow(key);
  return scale?.label ?? label;
}

/** The consequences of the present values of a series, those that its class has. */
export function consequences(state: State, id: string): readonly Consequence[] {
  const series = studySeries(state, id);
  const now = resultNow(state, id).evaluation;
  const before = resultOfPreset(state, id).evaluation.figures;
  const judged = seriesVerdicts(state, id);
  const has = classRow(classOf(series)).figures;
  return (
    scaleFigures
      // What has a value with the preset stays in sight where it has none now: it is not known, which is no zero.
      .filter((key) => has.includes(key) && (now.figures[key] !== null || before[key] !== null))
      .map((key) => {
        const value = now.figures[key];
        const base = figureRow(key).ratio === true ? 1 : before[key];
        const ratio = value !== null && base !== null && base > 0 ? value / base : null;
        const limits = [
          ...judged.filter(({ of }) => of === key).map(({ verdict }) => verdict.limit),
          ...mustKeepLimits(series.mustKeep, key),
        ];
        const limit = limits[0] ?? rfLimit(state, id, key);
        const crossed = resultNow(state, id).mustKeeps.some(({ mustKeep, status }) => status === 'crossed' && mustKeep.figure === key);
        return {
          key,
          label: figureLabel(key),
          ratio,
          value: value === null ? 'not known' : sayFigure(key, value),
          change: ratio === null ? '' : sayChange(ratio - 1).replace('NaN', ''),
          limitRatio: limit === undefined || base === null || base <= 0 ? null : limit / base,
          over:
            crossed ||
            judged.some(
              ({ of, verdict }) =>
                verdict.word === 'OVER' &&
                (of === key || (of === 'sar' && key === 'rfPowerTrend') || (of === 'b1PlusRmsUt' && key === 'rfPowerTrend')),
            ),
          fromReading: now.fromReading.includes(key),
        };
      })
  );
}

/** Limits that a must-keep puts on a figure: the upper one where there are two. */
function mustKeepLimits(mustKeeps: readonly MustKeep[], key: FigureKey): number[] {
  return mustKeeps
    .filter(({ figure }) => figure === key)
    .flatMap(({ atMost, atLeast, between }) => [atMost ?? between?.[1] ?? atLeast].filter((limit): limit is number => limit !== undefined));
}

/** An RF cap as a share of the preset's power: both kinds scale from the scanner's own number. */
function rfLimit(state: State, id: string, key: FigureKey): number | undefined {
  if (key !== 'rfPowerTrend') return undefined;
  const { b1rmsCapUt = null, sarCapWkg = null } = state.session?.limits ?? {};
  const { b1rmsUt, sarWkg } = readingsOf(state, sessionSeries(state, id));
  const caps = [
    ...(b1rmsCapUt !== null && b1rmsUt !== undefined ? [(b1rmsCapUt / b1rmsUt) ** 2] : []),
    ...(sarCapWkg !== null && sarWkg !== undefined ? [sarCapWkg / sarWkg] : []),
  ];
  return caps.length === 0 ? undefined : Math.min(...caps);
}
