import type { Caution } from '../calc/caution.js';
import { evaluate } from '../calc/evaluate.js';
import type { Figures } from '../calc/figures.js';
import { type Carried, resolveParameters } from '../calc/resolve.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { namedValues } from '../formulas/formula-names.js';
import { balancedLoss } from './balanced-loss.js';
import { withinBand } from './bands.js';
import type { Candidate } from './candidate.js';
import { changesOf, pointParameters } from './lattice.js';
import { limitedValue, verdictsOf, worstRank } from './limits.js';
import { isCrossed } from './must-keep-test.js';
import { noFurtherBelow, type SearchSetting, shortfallOf } from './setting.js';

/** Everything `evaluate` says of one point of the lattice. */
export interface Judged {
  readonly given: GivenParameters;
  readonly parameters: Parameters;
  readonly carried: readonly Carried[];
  readonly figures: Figures;
  readonly cautions: readonly Caution[];
  /** No error, nothing crossed, within its bands, no further under the estimated timing than the preset: limits are another matter. */
  readonly isWay: boolean;
  readonly candidate: Candidate;
}

/** The time that ways are compared by: of one hold where holds are limited, else of the series. */
export function comparedTimeS(
  setting: Pick<SearchSetting, 'problem'>,
  figures: Pick<Figures, 'scanTimeS' | 'holdTimeS' | 'b1PlusRmsUt' | 'sarTrendHigh'>,
): number {
  const { limits, readings } = setting.problem;
  return limitedValue(limits.holdS === undefined ? 'timeS' : 'holdS', figures, readings) ?? Number.POSITIVE_INFINITY;
}

/**
 * What makes a point a way, stated once: resolve, evaluate, compare. All quick paths of the search must agree with this one to the last bit.
 */
export function judgePoint(setting: SearchSetting, point: ArrayLike<number>): Judged {
  const { problem, baseline, presetFigures, variables } = setting;
  const { series, scanner, body, rules, limits, readings } = problem;
  const given = pointParameters(variables, point, problem.set);
  const { parameters, carried } = resolveParameters(baseline, given, scanner);
  const evaluation = evaluate({ ...series, parameters }, scanner, body, baseline, { readings });
  const { figures, cautions } = evaluation;
  const short = shortfallOf(parameters, {
    echoTimeMs: figures.minimumEchoTimeMs ?? 0,
    repetitionTimeMs: figures.minimumRepetitionTimeMs ?? 0,
    echoSpacingMs: spacingMinimum(cautions, parameters),
  });
  const valueNamed = namedValues(parameters, figures);
  const isWay =
    !cautions.some(({ level, code }) => level === 'error' || (code === 'wrap' && level === 'caution' && !setting.startWraps)) &&
    noFurtherBelow(short, setting.shortfall) &&
    setting.bands.every((band) => withinBand(band, figures[band.figure])) &&
    !series.mustKeep.some((mustKeep) => isCrossed(mustKeep, valueNamed, rules));
  const timeS = comparedTimeS(setting, figures);
  return {
    given,
    parameters,
    carried,
    figures,
    cautions,
    isWay,
    candidate: {
      point: Array.from(point),
      rank: worstRank(verdictsOf(limits, figures, readings, setting.margins)),
      changes: changesOf(point),
      timeS,
      snr: figures.relativeSnr,
      contrast: figures.relativeContrast,
      volumeMm3: figures.voxelVolumeMm3 as number,
      blurPx: figures.blurFwhmPx,
      power: figures.rfPowerTrend,
      loss: balancedLoss(figures, presetFigures, setting.rfCapped),
    },
  };
}

/** The estimated shortest spacing where the series is below it, else none: it is no figure, but its caution carries it. */
function spacingMinimum(cautions: readonly Caution[], p: Parameters): number {
  const caution = cautions.find(({ code }) => code === 'below-minimum-spacing');
  return caution === undefined ? p.echoSpacingMs : (caution.numbers['minimumMs'] as number);
}
