import { classRow } from '../calc/classes.js';
import { fatShiftHz } from '../calc/constants.js';
import { acquiredLines } from '../calc/lines.js';
import type { NumberParameterKey } from '../calc/parameters.js';
import { parameterRow } from '../calc/parameters.js';
import { classOf, type Parameters } from '../calc/series.js';
import { type BoundsOfName, boundFormula, type Interval } from '../formulas/bound-formula.js';
import type { Formula } from '../formulas/formula.js';
import { formulaNames } from '../formulas/formula-names.js';
import { printFormula } from '../formulas/print-formula.js';
import type { MustKeep } from '../study/study.js';
import { type LatticeVariable, latticeOf } from './lattice.js';
import type { SearchProblem } from './problem-to-solve.js';

/** Figures that every series has a value of, at least zero. */
const alwaysThere: readonly string[] = [
  'scanTimeS',
  'tableTimeS',
  'shots',
  'displayedVoxelReadMm',
  'displayedVoxelPhaseMm',
  'chemicalShiftMm',
  'distortionPxPer100Hz',
];
/** Parameters that follow others by themselves: what is set for them is not all they can be. */
const carried: readonly string[] = ['repetitionTimeMs', 'echoTimeMs', 'echoSpacingMs', 'echoTrainLength', 'rounds'];

/** Parameters with every value at the end that gives the fewest lines, or the most. */
function extremes(problem: SearchProblem, variables: readonly LatticeVariable[], most: boolean): Parameters {
  const fewerWith = ['parallelFactorPhase', 'parallelFactorSlice'];
  const p: Record<string, unknown> = { ...problem.series.parameters, ...problem.set };
  for (const { key, values } of variables) {
    const numbers = values.filter((value) => typeof value === 'number');
    if (numbers.length !== values.length) continue;
    p[key] = most !== fewerWith.includes(key) ? Math.max(...numbers) : Math.min(...numbers);
  }
  for (const { sliceCounts } of variables) {
    if (sliceCounts !== null)
      p.sliceCount = most ? Math.max(...sliceCounts, p.sliceCount as number) : Math.min(...sliceCounts, p.sliceCount as number);
  }
  return p as unknown as Parameters;
}

/** Bounds of every name over the whole lattice of a search, as far as they follow from its steps: never too narrow. */
export function latticeBounds(problem: SearchProblem, variables: readonly LatticeVariable[]): BoundsOfName {
  const { series, scanner } = problem;
  const key = classOf(series);
  const row = classRow(key);
  const given: Parameters = { ...series.parameters, ...problem.set };
  const interval = (low: number, high: number): Interval => ({ low, high, sure: true });

  function ofParameter(name: string): Interval | readonly boolean[] | null {
    const value = given[name as NumberParameterKey] as unknown;
    const variable = variables.find((one) => one.key === name);
    const counts = name === 'sliceCount' ? variables.flatMap(({ sliceCounts }) => sliceCounts ?? []) : [];
    const values = [...(variable === undefined ? [value] : variable.values), ...counts];
    if (formulaNames.get(name) === 'flag') return values.filter((one) => typeof one === 'boolean');
    if (carried.includes(name)) return null;
    if (!values.every((one) => typeof one === 'number' && Number.isFinite(one))) return null;
    const numbers = values as number[];
    return interval(Math.min(...numbers), Math.max(...numbers));
  }
  function quotient(top: string, bottom: string): Interval | null {
    const [a, b] = [ofParameter(top), ofParameter(bottom)] as readonly (Interval | null)[];
    return a === null || b === null || a === undefined || b === undefined ? null : interval(a.low / b.high, a.high / b.low);
  }
  /** Rounding makes no bound wrong: it is widened by a trifle. */
  function widened(bounds: Interval | null): Interval | null {
    return bounds === null
      ? null
      : { ...bounds, low: bounds.low - 1e-9 * Math.abs(bounds.low), high: bounds.high + 1e-9 * Math.abs(bounds.high) };
  }
  function ofFigure(name: string): Interval | null {
    switch (name) {
      case 'voxelReadMm':
        return quotient('fieldOfViewMm', 'matrixRead');
      case 'voxelPhaseMm':
        return quotient('fieldOfViewMm', 'matrixPhase');
      case 'voxelSliceMm':
        return ofParameter('sliceThicknessMm') as Interval | null;
      case 'voxelVolumeMm3': {
        const sides = ['voxelReadMm', 'voxelPhaseMm', 'voxelSliceMm'].map(ofFigure);
        if (sides.includes(null)) return null;
        const known = sides as Interval[];
        return interval(
          known.reduce((product, { low }) => product * low, 1),
          known.reduce((product, { high }) => product * high, 1),
        );
      }
      case 'coverageMm': {
        const [count, thickness, gap] = ['sliceCount', 'sliceThicknessMm', 'sliceGapMm'].map((one) => ofParameter(one) as Interval | null);
        if (count == null || thickness == null || gap == null) return null;
        const gaps = (n: number, mm: number) => (row.acquisition === '3D' ? 0 : (n - 1) * mm);
        return interval(count.low * thickness.low + gaps(count.low, gap.low), count.high * thickness.high + gaps(count.high, gap.high));
      }
      case 'linesPhase': {
        // More lines with every part but acceleration; strips follow their train, which may be carried.
        if (key === 'rotating-strip-fast-spin-echo/2D') return null;
        return interval(
          acquiredLines(key, extremes(problem, variables, false)).phase,
          acquiredLines(key, extremes(problem, variables, true)).phase,
        );
      }
      case 'linesSlice':
        // Reference lines count in both directions only where both are accelerated: no order to rely on but the whole.
        return row.acquisition === '3D' ? interval(1, acquiredLines(key, extremes(problem, variables, true)).fullSlice) : null;
      case 'chemicalShiftPx': {
        const bandwidth = ofParameter('pixelBandwidthHz') as Interval | null;
        if (row.echoPlanar || bandwidth === null) return null;
        return interval(fatShiftHz(scanner.fieldT) / bandwidth.high, fatShiftHz(scanner.fieldT) / bandwidth.low);
      }
      default:
        return alwaysThere.includes(name) ? interval(0, Number.MAX_VALUE) : null;
    }
  }
  return (name) => {
    const isFigure = formulaNames.has(name) && !(name in given) && name !== 'diffusion';
    if (isFigure) return widened(ofFigure(name));
    if (name === 'diffusion' || parameterRowKind(name) === 'object') return null;
    const bounds = ofParameter(name);
    return Array.isArray(bounds) ? bounds : widened(bounds as Interval | null);
  };
}

function parameterRowKind(name: string): string {
  return parameterRow(name as NumberParameterKey).kind;
}

/** The limits of a must-keep without a formula, as one. */
function limitsAsFormula({ figure, parameter, atMost, atLeast, between }: MustKeep): Formula | null {
  const name = figure ?? parameter;
  if (name === undefined) return null;
  const compare = (operator: '<=' | '>=', value: number): Formula => ({
    kind: 'compare',
    operator,
    left: { kind: 'name', name },
    right: { kind: 'number', value },
  });
  const parts = [
    ...(atMost === undefined ? [] : [compare('<=', atMost)]),
    ...(atLeast === undefined ? [] : [compare('>=', atLeast)]),
    ...(between === undefined ? [] : [compare('>=', between[0]), compare('<=', between[1])]),
  ];
  return parts.reduce<Formula | null>((left, right) => (left === null ? right : { kind: 'and', left, right }), null);
}

/** True where no point of the lattice crosses it, and none leaves it unchecked. */
function alwaysKept(formula: Formula, bounds: BoundsOfName): boolean {
  const { canFail, canMiss } = boundFormula(formula, bounds);
  return !canFail && !canMiss;
}

/**
 * The same search without what its must-keeps cannot decide: a rule that holds wherever the steps can go is left out, a condition that never
 * holds takes its must-keep along, and the two sides of an `and` become rules of their own, so that each is asked as early as its names are
 * known. Interval evaluation (Moore, Interval Analysis, 1966) decides; whatever might be missing somewhere stays as it is. The ways are the same.
 */
export function withBoundRules(problem: SearchProblem): SearchProblem {
  const { series, rules } = problem;
  if (series.mustKeep.length === 0) return problem;
  const bounds = latticeBounds(problem, latticeOf(problem));
  const more = new Map(rules);
  const kept = series.mustKeep.flatMap((mustKeep): readonly MustKeep[] => {
    const when = mustKeep.when === undefined ? undefined : rules.get(mustKeep.when);
    if (mustKeep.when !== undefined && when === undefined) return [mustKeep];
    const formula = mustKeep.rule === undefined ? limitsAsFormula(mustKeep) : (rules.get(mustKeep.rule) ?? null);
    if (formula === null) return [mustKeep];
    const condition = when === undefined ? null : boundFormula(when, bounds);
    if (condition !== null && !condition.canHold && !condition.canMiss) return [];
    const sure = condition === null || !condition.canMiss;
    if (sure && alwaysKept(formula, bounds)) return [];
    if (mustKeep.rule === undefined) return [mustKeep];
    const parts = sides(formula, bounds);
    if (parts === null || parts.length === 1) return [mustKeep];
    return parts
      .filter((part) => !(sure && alwaysKept(part, bounds)))
      .map((part) => {
        const rule = printFormula(part);
        more.set(rule, part);
        return { ...mustKeep, rule };
      });
  });
  return { ...problem, rules: more, series: { ...series, mustKeep: kept } };
}

/** The sides of an `and`, or null where one of them may be without a value: then only the whole can say that it is not checked. */
function sides(formula: Formula, bounds: BoundsOfName): readonly Formula[] | null {
  if (formula.kind !== 'and') return boundFormula(formula, bounds).canMiss ? null : [formula];
  const [left, right] = [sides(formula.left, bounds), sides(formula.right, bounds)];
  return left === null || right === null ? null : [...left, ...right];
}
