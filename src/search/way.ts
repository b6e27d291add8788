import { type Caution, worstFirst } from '../calc/caution.js';
import { type FigureKey, type Figures, figureKeys, figureTable } from '../calc/figures.js';
import { type ParameterKey, parameterKeys } from '../calc/parameters.js';
import type { Carried } from '../calc/resolve.js';
import { same } from '../calc/rounding.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import type { VerdictWord } from '../calc/verdict.js';
import { checkMustKeeps, mustKeepCautions } from '../study/must-keep.js';
import type { WayKind } from './candidate.js';
import { judgePoint } from './judge.js';
import { type LimitKey, limitKeys, verdictsOf, worstRank } from './limits.js';
import type { SearchSetting } from './setting.js';
import { carriedCaution, cautionsOfWay, type WayCaution } from './way-cautions.js';

/** One value of a way: what it was in the preset and what it becomes. */
export interface Change {
  readonly from: unknown;
  readonly to: unknown;
}

/** One figure that a way moves: ratio null where the preset's is 0. */
export interface Trade {
  readonly figure: FigureKey;
  readonly from: number;
  readonly to: number;
  readonly ratio: number | null;
}

/** One set of changes with everything it gains and gives up. */
export interface Way {
  readonly kind: WayKind;
  readonly point: readonly number[];
  /** What to set, values set by hand included; applying it to the preset gives these figures. */
  readonly given: GivenParameters;
  readonly parameters: Parameters;
  readonly carried: readonly Carried[];
  readonly changes: Readonly<Partial<Record<ParameterKey, Change>>>;
  /** Settings that count as changed: slices that follow thickness and carried timing do not. */
  readonly changed: number;
  readonly figures: Figures;
  readonly gives: readonly Trade[];
  readonly gains: readonly Trade[];
  readonly cautions: readonly WayCaution[];
  /** What is to spare of each limit, in its own unit; null where it is not set. */
  readonly spare: Readonly<Record<LimitKey, number | null>>;
  readonly verdict: VerdictWord;
}

/** Forms the way that a point of the lattice is, by `evaluate`. */
export function wayOf(setting: SearchSetting, kind: WayKind, point: readonly number[]): Way {
  const { problem, presetFigures } = setting;
  const { series, limits, readings, rules } = problem;
  const { given, parameters, carried, figures, cautions, candidate } = judgePoint(setting, point);
  const verdicts = verdictsOf(limits, figures, readings, setting.margins);
  const changes: Partial<Record<ParameterKey, Change>> = {};
  for (const key of parameterKeys) {
    // A split that follows by itself is named beside what was set: every round is one more acquisition.
    const to = key === 'rounds' ? parameters.rounds : given[key];
    if (to !== undefined && to !== series.parameters[key]) changes[key] = { from: series.parameters[key] ?? null, to };
  }
  const { gives, gains } = tradesOf(presetFigures, figures);
  const spare = Object.fromEntries(limitKeys.map((key) => [key, verdicts.find(({ limitKey }) => limitKey === key)?.spare ?? null]));
  return {
    kind,
    point,
    given,
    parameters,
    carried,
    changes,
    changed: candidate.changes,
    figures,
    gives,
    gains,
    cautions: [
      ...cautionsOfWay(setting, parameters, figures),
      ...worstFirst([
        ...cautions,
        ...mustKeepCautions(checkMustKeeps(series.mustKeep, parameters, figures, rules)),
        ...carried.map(carriedCaution),
      ]).map(plain),
    ],
    spare: spare as Record<LimitKey, number | null>,
    verdict: (['FITS', 'TOO CLOSE', 'OVER'] as const)[worstRank(verdicts)],
  };
}

/** Figures that got worse and that got better, in the order of the table; those that are neither better nor worse are left out. */
function tradesOf(preset: Figures, now: Figures): { gives: Trade[]; gains: Trade[] } {
  const gives: Trade[] = [];
  const gains: Trade[] = [];
  for (const figure of figureKeys) {
    const { better } = figureTable[figure];
    const from = preset[figure];
    const to = now[figure];
    if (better === 'neither' || from === null || to === null || same(from, to)) continue;
    const trade = { figure, from, to, ratio: from === 0 ? null : to / from };
    (to > from === (better === 'higher') ? gains : gives).push(trade);
  }
  return { gives, gains };
}

/** Sentences are put together when they are read: a way is plain data. */
function plain({ code, level, text }: Caution): WayCaution {
  return { code, level, text };
}
