import { baselineOf } from '../calc/baseline.js';
import { unknownBody } from '../calc/body.js';
import { type Evaluation, evaluate } from '../calc/evaluate.js';
import { guardedFloor } from '../calc/rounding.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters, Parameters } from '../calc/series.js';
import { tissueOf } from '../calc/tissues.js';
import { checkMustKeeps, type Rules } from '../study/must-keep.js';
import type { StudySeries } from '../study/study.js';
import type { CarryAim, CarryGap, SeriesCarry } from './carry.js';
import { averagesForEqualSnr, carriedAverages } from './carry-averages.js';
import { carriedBandwidth } from './carry-bandwidth.js';
import { type ContrastSolution, carriedContrast } from './carry-contrast.js';
import { carriedEchoPair, isEchoPair } from './carry-echo-pair.js';
import { carryGaps } from './carry-gaps.js';
import { carriedNulls } from './carry-null.js';
import { carriedRf } from './carry-rf.js';
import { type CarrySetting, settle } from './carry-setting.js';
import { carriedValues } from './carry-values.js';
import { digits } from './carry-words.js';

/** What a series is carried with. */
export interface CarryCircumstances {
  /** The scanner the preset is for: a plain one at the field of its file. */
  readonly from: Scanner;
  readonly to: Scanner;
  readonly aim: CarryAim;
  readonly rules: Rules;
}

/**
 * Moves one series to another field or scanner: bandwidth, echoes, TI by null, contrast, averages, each with its reason, its formula and its
 * source; RF, must-keeps and what cannot be carried beside them. It proposes: nothing is released by it. Never throws for a series the schema allows.
 *
 * @example carrySeries(series, { from: plainScanner(1.5), to: plainScanner(3), aim: 'contrast', rules }).parameters.pixelBandwidthHz //=> 440
 */
export function carrySeries(series: StudySeries, { from, to, aim, rules }: CarryCircumstances): SeriesCarry {
  const baseline = baselineOf(series, from);
  const setting: CarrySetting = { series, baseline, to, aim };
  const before = evaluate(series, from, unknownBody, baseline);
  const evaluated = (parameters: Parameters): Evaluation => evaluate({ ...series, parameters }, to, unknownBody, baseline);

  const bandwidth = carriedBandwidth(setting);
  const pair = isEchoPair(setting) ? carriedEchoPair(setting, settle(setting, { pixelBandwidthHz: bandwidth.proposedHz })) : undefined;
  const echoes: GivenParameters = pair === null || pair === undefined ? {} : { echoTimeMs: pair.firstMs, secondEchoTimeMs: pair.secondMs };
  const set: GivenParameters = { pixelBandwidthHz: bandwidth.proposedHz, ...echoes };
  const solved = carriedContrast(setting, set);
  const withAverages = (averages: number) => {
    const { relativeSnr, scanTimeS } = evaluated({ ...solved.settled.parameters, averages }).figures;
    return { snr: relativeSnr, scanTimeS };
  };
  const averages = carriedAverages(solved.settled.parameters, evaluated(solved.settled.parameters).figures.relativeSnr, withAverages);

  const spent = spend(setting, set, solved, averages.factor, evaluated, before);
  const { settled, contrast } = spent.solution;
  const evaluation = evaluated(settled.parameters);
  const nulls = carriedNulls(setting, settled);
  const extrapolated = extrapolatedTissues(
    settled.model.target,
    settled.model.comparison,
    nulls === null ? null : tissueOf(nulls.tissue, to.fieldT, series),
  );
  return {
    series,
    parameters: settled.parameters,
    values: carriedValues({ setting, settled, bandwidth, pair, contrast, nulls, averages }),
    evaluation,
    before,
    contrast,
    nulls,
    rf: carriedRf(setting, settled, evaluation.figures),
    averages,
    mustKeeps: checkMustKeeps(series.mustKeep, settled.parameters, evaluation.figures, rules),
    gaps: [...carryGaps(setting, settled, { contrast, bandwidth, pair }), ...spent.gaps],
    extrapolated,
  };
}

function extrapolatedTissues(
  ...tissues: readonly ({ readonly tissue: string; readonly extrapolated: boolean } | null)[]
): readonly string[] {
  return [...new Set(tissues.flatMap((tissue) => (tissue?.extrapolated === true ? [tissue.tissue] : [])))];
}

/** What equal SNR or equal time ask for beyond contrast: averages, then bandwidth. */
function spend(
  setting: CarrySetting,
  set: GivenParameters,
  solved: ContrastSolution,
  factor: number | null,
  evaluated: (parameters: Parameters) => Evaluation,
  before: Evaluation,
): { readonly solution: ContrastSolution; readonly gaps: readonly CarryGap[] } {
  if (setting.aim === 'snr' && factor !== null) return { solution: equalSnr(setting, set, solved, factor, evaluated), gaps: [] };
  return setting.aim === 'time' ? equalTime(solved, evaluated, before) : { solution: solved, gaps: [] };
}

/** Averages for the preset's SNR; what whole averages leave over goes into bandwidth, as far as the gradients read it. */
function equalSnr(
  setting: CarrySetting,
  set: GivenParameters,
  solved: ContrastSolution,
  factor: number,
  evaluated: (parameters: Parameters) => Evaluation,
): ContrastSolution {
  const averages = averagesForEqualSnr(solved.settled.parameters, factor);
  const withAverages: ContrastSolution = {
    ...solved,
    settled: { ...solved.settled, parameters: { ...solved.settled.parameters, ...averages } },
  };
  const { mostHz, equalShiftHz } = carriedBandwidth(setting);
  const left = evaluated(withAverages.settled.parameters).figures.relativeSnr;
  if (left === null || left <= 1 || equalShiftHz === null) return withAverages;
  const given = set.pixelBandwidthHz as number;
  const pixelBandwidthHz = Math.min(Math.max(mostHz, given), guardedFloor(given * left ** 2));
  if (pixelBandwidthHz <= given) return withAverages;
  const again = carriedContrast(setting, { ...set, pixelBandwidthHz });
  const parameters = { ...again.settled.parameters, ...averages };
  // A faster readout moves TE and with it the signal: only what still reaches the preset's SNR is taken.
  return (evaluated(parameters).figures.relativeSnr ?? 0) >= 0.995 ? { ...again, settled: { ...again.settled, parameters } } : withAverages;
}

/** Fewer averages where the series would take longer than in the preset. */
function equalTime(
  solved: ContrastSolution,
  evaluated: (parameters: Parameters) => Evaluation,
  before: Evaluation,
): { readonly solution: ContrastSolution; readonly gaps: readonly CarryGap[] } {
  const p = solved.settled.parameters;
  const most = before.figures.scanTimeS ?? 0;
  const now = evaluated(p).figures.scanTimeS ?? 0;
  if (now <= most * (1 + 1e-9)) return { solution: solved, gaps: [] };
  const fewer = Math.max(1, guardedFloor((p.averages * most) / now));
  const parameters = p.diffusion === undefined && fewer < p.averages ? { ...p, averages: fewer } : p;
  const time = evaluated(parameters).figures.scanTimeS ?? 0;
  const gaps =
    time <= most * (1 + 1e-9)
      ? []
      : [
          {
            what: 'equal time',
            why: `${digits(time, 1)} s instead of ${digits(most, 1)} s: neither TR nor averages can be shortened without losing slices or lines`,
          },
        ];
  return { solution: { ...solved, settled: { ...solved.settled, parameters } }, gaps };
}
