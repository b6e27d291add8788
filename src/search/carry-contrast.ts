import { optimumAngleDeg } from './carry-angle.js';
import type { ContrastCarry } from './carry.js';
import { firstKnob, type Knob, otherEchoTimes, usual } from './carry-knobs.js';
import { type RootSearch, nearestRoot } from './carry-root.js';
import { type CarrySetting, settle, type Settled } from './carry-setting.js';
import { digits } from './carry-words.js';
import { parameterRow } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';

/** Change of the contrast ratio under which nothing needs to be changed. */
export const contrastTolerance = 0.01;

type Found = Extract<RootSearch, { found: true }>;

interface Solution {
  readonly settled: Settled;
  readonly set: GivenParameters;
  readonly root: { readonly knob: Knob; readonly found: Found } | null;
  readonly echoTimeMs: number | null;
  /** How far it goes from where it began: sum of the logarithms of both ratios. */
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
    return { settled, set, contrast: { status: 'unchanged', ...ends(settled.ratio), solved: [], words: `${said}: within 1 %, no change needed` } };
  }
  const solution = solve(setting, set, settled, wanted);
  if (solution !== null) {
    const solved = solvedParts(solution);
    const how = solved.map(({ key, bracket }) => `${parameterRow(key).label} between ${digits(bracket[0], 2)} and ${digits(bracket[1], 2)}`).join(', ');
    const echo = solution.echoTimeMs === null ? '' : `${how === '' ? '' : ', '}TE on ${digits(solution.echoTimeMs, 2)} ms`;
    const words = `${said}; solved to ${digits(solution.settled.ratio as number, 3)}: ${how}${echo}`;
    return { settled: solution.settled, set: solution.set, contrast: { status: 'solved', ...ends(solution.settled.ratio), solved, words } };
  }
  return unsolvable(setting, set, settled, said);
}

function solvedParts({ root, echoTimeMs }: Solution): ContrastCarry['solved'] {
  const parts: ContrastCarry['solved'][number][] = [];
  if (root !== null) parts.push({ key: root.knob.key, x: root.found.x, bracket: root.found.bracket, residual: root.found.residual });
  return echoTimeMs === null ? parts : parts;
}

function percent(change: number): string {
  return `${change > 0 ? '+' : ''}${digits(100 * change, 1)} %`;
}

/** The nearest solution, or null. */
function solve(setting: CarrySetting, set: GivenParameters, start: Settled, wanted: number): Solution | null {
  const knob = firstKnob(setting, start);
  const alone = knob === null ? null : withKnob(setting, set, knob, wanted, null);
  if (alone !== null && (knob?.key === 'flipAngleDeg' || alone.cost <= Math.log(usual))) return alone;
  const others: Solution[] = alone === null ? [] : [alone];
  for (const echoTimeMs of otherEchoTimes(setting, start)) {
    const away = Math.abs(Math.log(echoTimeMs / start.parameters.echoTimeMs));
    const best = Math.min(...others.map(({ cost }) => cost));
    if (away >= best) break;
    const next = { ...set, echoTimeMs };
    const settled = settle(setting, next);
    if (settled.ratio === null || settled.parameters.rounds > start.parameters.rounds) continue;
    if (Math.abs(settled.ratio / wanted - 1) <= contrastTolerance) {
      others.push({ settled, set: next, root: null, echoTimeMs, cost: away });
      continue;
    }
    const both = knob === null ? null : withKnob(setting, next, knob, wanted, echoTimeMs);
    if (both !== null) others.push({ ...both, cost: both.cost + away });
  }
  return others.reduce<Solution | null>((best, one) => (best === null || one.cost < best.cost ? one : best), null);
}

/** The knob alone, everything else as set; no more separate acquisitions than the preset has. */
function withKnob(setting: CarrySetting, set: GivenParameters, knob: Knob, wanted: number, echoTimeMs: number | null): Solution | null {
  const most = Math.max(setting.series.parameters.rounds, settle(setting, set).parameters.rounds);
  const settledAt = (value: number): Settled | null => {
    const settled = settle(setting, { ...set, [knob.key]: value });
    return settled.parameters.rounds > most || settled.ratio === null ? null : settled;
  };
  const found = nearestRoot(
    (value) => {
      const ratio = settledAt(value)?.ratio ?? null;
      return ratio === null ? null : ratio / wanted - 1;
    },
    knob.start,
    knob.low,
    knob.high,
  );
  if (!found.found) return null;
  const value = knob.round(found.x);
  const settled = settledAt(value);
  // Rounding may cost a little; a root that only stands between two steps is none.
  if (settled === null || Math.abs((settled.ratio as number) / wanted - 1) > contrastTolerance) return null;
  return { settled, set: { ...set, [knob.key]: value }, root: { knob, found }, echoTimeMs, cost: Math.abs(Math.log(value / knob.start)) };
}

/** Nothing gives the ratio back: gradient echoes keep their angle's place against the angle of most signal, the others stay as carried. */
function unsolvable(setting: CarrySetting, set: GivenParameters, settled: Settled, said: string): ContrastSolution {
  const knob = firstKnob(setting, settled);
  const from = setting.baseline.contrastRatio;
  const angle = knob?.key === 'flipAngleDeg' ? optimumAngleDeg(setting, settled) : null;
  const next = angle === null ? set : { ...set, flipAngleDeg: angle };
  const last = angle === null ? settled : settle(setting, next);
  const reach = knob === null ? reasonWithoutKnob(setting) : `no ${parameterRow(knob.key).label} between ${digits(knob.low, 2)} and ${digits(knob.high, 2)} gives the preset's ratio within 1 %`;
  const kept = angle === null ? '' : `; the angle keeps its place against the angle of most signal: ${digits(angle, 1)} deg`;
  return { settled: last, set: next, contrast: { status: 'unsolvable', from, to: last.ratio, solved: [], words: `${said}: unsolvable, ${reach}, with no other TE either${kept}` } };
}

function reasonWithoutKnob({ aim, series }: CarrySetting): string {
  if (aim === 'time') return 'TR may not grow and the class has no excitation angle to change';
  if (series.parameters.pacing.kind !== 'none' && series.parameters.pacing.kind !== 'breath-hold') return 'TR follows the breath or the beat';
  return 'each slice is excited once, so that TR does not act';
}
