import { parameterRow } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import type { ContrastCarry } from './carry.js';
import { optimumAngleDeg } from './carry-angle.js';
import { echoTries, firstKnob, type Knob, usual } from './carry-knobs.js';
import { nearestRoot } from './carry-root.js';
import { type CarrySetting, type Settled, settle } from './carry-setting.js';
import { digits } from './carry-words.js';

/** Change of the contrast ratio under which nothing needs to be changed. */
const contrastTolerance = 0.01;

/** One way to give the ratio back. */
interface Solution {
  readonly settled: Settled;
  readonly set: GivenParameters;
  readonly solved: ContrastCarry['solved'];
  /** How far it goes from where it began: sum of the logarithms of all ratios. */
  readonly cost: number;
}

export interface ContrastSolution {
  readonly settled: Settled;
  readonly set: GivenParameters;
  readonly contrast: ContrastCarry;
}

/**
 * Brings the contrast ratio of the named pair (signal of target over comparison) back to the preset's: the first knob of the class alone where
 * it need not go far, else with another echo time, else as far as it goes. A bracketed root, residual 1e-4, then rounded to what a scanner accepts.
 * What cannot be solved stays as it was carried, and says so.
 */
export function carriedContrast(setting: CarrySetting, set: GivenParameters): ContrastSolution {
  const settled = settle(setting, set);
  const { series, baseline, aim } = setting;
  const wanted = baseline.contrastRatio;
  const pair = `${series.target} / ${series.comparison}`;
  const ends = (to: number | null) => ({ from: wanted, to });
  const change = wanted === null || settled.ratio === null ? null : settled.ratio / wanted - 1;
  if (wanted === null || wanted === 0 || change === null) {
    const words = `contrast ratio ${pair} is not known: ${settled.model.impossible ?? 'one of the two tissues has no signal or no value'}`;
    return { settled, set, contrast: { status: 'not known', ...ends(settled.ratio), solved: [], words } };
  }
  const said = `contrast ratio ${pair} ${digits(wanted, 3)} becomes ${digits(settled.ratio as number, 3)} (${percent(change)})`;
  if (aim === 'shift') return { settled, set, contrast: { status: 'not asked', ...ends(settled.ratio), solved: [], words: said } };
  if (Math.abs(change) <= contrastTolerance) {
    return {
      settled,
      set,
      contrast: { status: 'unchanged', ...ends(settled.ratio), solved: [], words: `${said}: within 1 %, no change needed` },
    };
  }
  const solution = solve(setting, set, settled, wanted);
  if (solution !== null) {
    const how = solution.solved.map(
      ({ key, bracket }) => `${parameterRow(key).label} between ${digits(bracket[0], 2)} and ${digits(bracket[1], 2)}`,
    );
    const echo = solution.set.echoTimeMs === undefined ? [] : [`TE at ${digits(solution.settled.parameters.echoTimeMs, 2)} ms`];
    const words = `${said}; solved to ${digits(solution.settled.ratio as number, 3)}: ${[...how, ...echo].join(', ')}`;
    return {
      settled: solution.settled,
      set: solution.set,
      contrast: { status: 'solved', ...ends(solution.settled.ratio), solved: solution.solved, words },
    };
  }
  return unsolvable(setting, set, settled, said);
}

function percent(change: number): string {
  return `${change > 0 ? '+' : ''}${digits(100 * change, 1)} %`;
}

/** The nearest solution, or null: without a further split where there is one, else with twice as many separate acquisitions. */
function solve(setting: CarrySetting, set: GivenParameters, start: Settled, wanted: number): Solution | null {
  const { series } = setting;
  const rounds = Math.max(series.parameters.rounds, start.parameters.rounds);
  const problem: Problem = { setting, wanted, rounds, hindered: false };
  const found = solveWithin(problem, set, start);
  if (!problem.hindered) return found;
  // A split breath-hold or a split timed phase shows two moments: neither is proposed.
  if (found !== null || series.purpose === 'dynamic' || series.parameters.pacing.kind !== 'none') return found;
  return solveWithin({ setting, wanted, rounds: 2 * rounds, hindered: false }, set, start);
}

function solveWithin(problem: Problem, set: GivenParameters, start: Settled): Solution | null {
  const { setting, wanted } = problem;
  const knob = firstKnob(setting, start);
  const alone = knob === null ? null : withKnob(problem, set, knob);
  if (alone !== null && (knob?.key === 'flipAngleDeg' || alone.cost <= Math.log(usual))) return alone;
  const found: Solution[] = alone === null ? [] : [alone];
  for (const echo of echoTries(setting, start)) {
    const away = Math.abs(Math.log(echo.echoTimeMs / start.parameters.echoTimeMs));
    if (found.some(({ cost }) => cost <= away)) break;
    const here = { ...set, ...echo.set };
    const settled = settleWithin(problem, here);
    if (settled !== null && Math.abs((settled.ratio as number) / wanted - 1) <= contrastTolerance) {
      found.push({ settled, set: here, solved: [], cost: away });
      continue;
    }
    for (const turned of [away === 0 ? null : knob, echo.knob]) {
      const solution = turned === null ? null : withKnob(problem, here, turned);
      if (solution !== null) found.push({ ...solution, cost: solution.cost + away });
    }
  }
  return found.reduce<Solution | null>((best, one) => (best === null || one.cost < best.cost ? one : best), null);
}

interface Problem {
  readonly setting: CarrySetting;
  readonly wanted: number;
  /** Most separate acquisitions. */
  readonly rounds: number;
  /** Set once a value was left out because its slices need more. */
  hindered: boolean;
}

/** Settles, or null where the ratio is not known or the slices need more acquisitions than are allowed. */
function settleWithin(problem: Problem, set: GivenParameters): Settled | null {
  const settled = settle(problem.setting, set);
  const split = settled.parameters.rounds > problem.rounds;
  if (split) problem.hindered = true;
  return split || settled.ratio === null ? null : settled;
}

/** One knob alone, everything else as set. */
function withKnob(problem: Problem, set: GivenParameters, knob: Knob): Solution | null {
  const { wanted } = problem;
  const found = nearestRoot(
    (value) => {
      const ratio = settleWithin(problem, { ...set, ...knob.set(value) })?.ratio ?? null;
      return ratio === null ? null : ratio / wanted - 1;
    },
    knob.start,
    knob.low,
    knob.high,
  );
  if (!found.found) return null;
  const value = knob.round(found.x);
  const next = { ...set, ...knob.set(value) };
  const settled = settleWithin(problem, next);
  // Rounding may cost a little; a sign that only changes at a jump is no root.
  if (settled === null || Math.abs((settled.ratio as number) / wanted - 1) > contrastTolerance) return null;
  const solved = [{ key: knob.key, x: found.x, bracket: found.bracket, residual: found.residual }];
  return { settled, set: next, solved, cost: Math.abs(Math.log(value / knob.start)) };
}

/** Nothing gives the ratio back: gradient echoes keep their angle's place against the angle of most signal, the others stay as carried. */
function unsolvable(setting: CarrySetting, set: GivenParameters, settled: Settled, said: string): ContrastSolution {
  const knob = firstKnob(setting, settled);
  const from = setting.baseline.contrastRatio;
  const angle = knob?.key === 'flipAngleDeg' ? optimumAngleDeg(setting, settled) : null;
  const next = angle === null ? set : { ...set, flipAngleDeg: angle };
  const last = angle === null ? settled : settle(setting, next);
  const reach =
    knob === null
      ? reasonWithoutKnob(setting)
      : `no ${parameterRow(knob.key).label} between ${digits(knob.low, 2)} and ${digits(knob.high, 2)} gives the preset's ratio within 1 %`;
  const kept = angle === null ? '' : `; the angle keeps its place against the angle of most signal: ${digits(angle, 1)} deg`;
  return {
    settled: last,
    set: next,
    contrast: {
      status: 'unsolvable',
      from,
      to: last.ratio,
      solved: [],
      words: `${said}: unsolvable, ${reach}, with no other TE either${kept}`,
    },
  };
}

function reasonWithoutKnob({ aim, series }: CarrySetting): string {
  if (aim === 'time') return 'TR may not grow and the class has no excitation angle to change';
  if (series.parameters.pacing.kind !== 'none' && series.parameters.pacing.kind !== 'breath-hold')
    return 'TR follows the breath or the beat';
  return 'each slice is excited once, so that TR does not act';
}
