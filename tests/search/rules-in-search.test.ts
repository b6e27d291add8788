import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { classKeys } from '../../src/calc/classes.js';
import { evaluate } from '../../src/calc/evaluate.js';
import type { Interval } from '../../src/formulas/bound-formula.js';
import type { Formula, NumberTree } from '../../src/formulas/formula.js';
import { formulaNames, namedValues } from '../../src/formulas/formula-names.js';
import { printFormula } from '../../src/formulas/print-formula.js';
import { Bests, bestsWithin } from '../../src/search/bests.js';
import { wayKinds } from '../../src/search/candidate.js';
import { Pulse } from '../../src/search/control.js';
import { judgePoint } from '../../src/search/judge.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { latticeBounds, withBoundRules } from '../../src/search/rules-bound.js';
import { mostChanges } from '../../src/search/search.js';
import { tablesOf } from '../../src/search/search-tables.js';
import { settingOf } from '../../src/search/setting.js';
import { WholeLatticeSearch } from '../../src/search/whole-lattice.js';
import type { MustKeep } from '../../src/study/study.js';
import { enumerate, nameOf } from './plain-enumeration.js';
import { Random } from './random.js';
import { randomProblem } from './random-problem.js';

const latticesPerClass = Number(process.env['HOLDFAST_PROOF_LATTICES'] ?? 4);
const numbers = [...formulaNames].filter(([, kind]) => kind === 'number').map(([name]) => name);
const flags = [...formulaNames].filter(([, kind]) => kind === 'flag').map(([name]) => name);

type ValueNamed = (name: string) => number | boolean | null | undefined;

/** A random number tree and its value in the preset; names without a value there are used too, now and then. */
function numberTree(random: Random, valueNamed: ValueNamed, depth: number): { tree: NumberTree; value: number | null } {
  const name = random.pick(numbers);
  const value = valueNamed(name);
  const leaf = { tree: { kind: 'name', name } as NumberTree, value: typeof value === 'number' ? value : null };
  if (depth <= 0 || random.chance(0.5)) return leaf.value === null && random.chance(0.9) ? numberTree(random, valueNamed, depth) : leaf;
  const left = numberTree(random, valueNamed, depth - 1);
  const right = numberTree(random, valueNamed, depth - 1);
  const known = left.value !== null && right.value !== null;
  if (random.chance(0.3)) {
    const call = random.pick(['min', 'max'] as const);
    return {
      tree: { kind: 'call', name: call, of: [left.tree, right.tree] },
      value: known ? Math[call](left.value as number, right.value as number) : null,
    };
  }
  const operator = random.pick(['+', '-', '*', '/'] as const);
  const [a, b] = [left.value ?? 0, right.value ?? 0];
  const result = operator === '+' ? a + b : operator === '-' ? a - b : operator === '*' ? a * b : a / b;
  return {
    tree: { kind: 'arithmetic', operator, left: left.tree, right: right.tree },
    value: known && Number.isFinite(result) ? result : null,
  };
}

/** A random rule that the preset mostly keeps, so that something is left to find. */
function formula(random: Random, valueNamed: ValueNamed, depth = 1): Formula {
  if (depth > 0 && random.chance(0.35)) {
    const kind = random.pick(['and', 'or'] as const);
    return { kind, left: formula(random, valueNamed, depth - 1), right: formula(random, valueNamed, depth - 1) };
  }
  if (random.chance(0.1)) return { kind: 'not', of: formula(random, valueNamed, 0) };
  if (random.chance(0.05)) return { kind: 'flag', name: random.pick(flags) };
  const { tree, value } = numberTree(random, valueNamed, 1);
  const operator = random.pick(['<=', '>=', '<', '>'] as const);
  const kept = operator.startsWith('<') ? random.between(0.9, 1.4) : random.between(0.6, 1.1);
  const limit = Number(((value ?? 1) * (value !== null && value < 0 ? 2 - kept : kept)).toPrecision(4));
  const bound: NumberTree = limit < 0 ? { kind: 'negate', of: { kind: 'number', value: -limit } } : { kind: 'number', value: limit };
  return { kind: 'compare', operator, left: tree, right: bound };
}

/** A random problem with several rules and conditions more. */
function withRules(problem: SearchProblem, random: Random): SearchProblem {
  const { series, scanner } = problem;
  const { figures } = evaluate(series, scanner, unknownBody, baselineOf(series, scanner));
  const valueNamed = namedValues(series.parameters, figures);
  const rules = new Map(problem.rules);
  const text = (tree: Formula) => {
    const printed = printFormula(tree);
    rules.set(printed, tree);
    return printed;
  };
  const more = Array.from({ length: random.whole(1, 4) }, (): MustKeep => {
    const rule = text(formula(random, valueNamed));
    const when = random.chance(0.25) ? { when: text(formula(random, valueNamed, 0)) } : {};
    return { rule, ...when, source: 'invented for a test' };
  });
  return { ...problem, series: { ...series, mustKeep: [...series.mustKeep, ...more] }, rules };
}

let fitting = 0;
let without = 0;
let before = 0;
let after = 0;

/** Bounds of every name hold what the name is at points of the lattice. */
function checkBounds(problem: SearchProblem, random: Random, said: string): void {
  const setting = settingOf(problem);
  const bounds = latticeBounds(problem, setting.variables);
  for (let i = 0; i < 20; i += 1) {
    const point = setting.variables.map(({ values }) => random.whole(0, values.length - 1));
    const { parameters, figures } = judgePoint(setting, point);
    const valueNamed = namedValues(parameters, figures);
    for (const name of formulaNames.keys()) {
      const known = bounds(name);
      const value = valueNamed(name);
      if (known === null) continue;
      const inside = Array.isArray(known)
        ? known.includes(value as boolean)
        : value !== null && (value as number) >= (known as Interval).low && (value as number) <= (known as Interval).high;
      expect(inside, `${said}; ${name} ${String(value)} within ${JSON.stringify(known)}`).toBe(true);
    }
  }
}

function proveOne(key: (typeof classKeys)[number], seed: number): void {
  const random = new Random(seed);
  const plainProblem = randomProblem(key, random, Math.exp(random.between(Math.log(60), Math.log(800))));
  const problem = withRules(plainProblem, random);
  const setting = settingOf(problem);
  const said = `${key}, seed ${seed}: ${problem.series.mustKeep.map(({ rule, when }) => `${rule ?? 'a limit'}${when === undefined ? '' : ` when ${when}`}`).join('; ')}`;
  const plain = enumerate(setting);
  fitting += plain.fitting;
  without += enumerate(settingOf(plainProblem)).fitting;

  checkBounds(problem, random, said);
  const pulse = new Pulse({});
  // Searched as `search` does it: what the steps can never cross is left out first.
  const bound = settingOf(withBoundRules(problem));
  expect(bound.variables, said).toEqual(setting.variables);
  before += problem.series.mustKeep.length;
  after += bound.problem.series.mustKeep.length;
  const tables = tablesOf(bound);
  const bests = new Bests();
  let most = Math.min(mostChanges, setting.variables.length);
  bestsWithin(tables, most, bests, pulse);
  while (!bests.any && most < setting.variables.length) {
    most += 1;
    bestsWithin(tables, most, bests, pulse);
  }
  for (const kind of wayKinds) {
    for (const rank of [0, 1] as const) {
      expect(bests.best(kind, rank), `${said}; ${nameOf(kind, rank)}`).toEqual(plain.best.get(nameOf(kind, rank)) ?? null);
    }
  }
  const whole = new WholeLatticeSearch(tables, pulse);
  whole.run();
  expect(whole.result().fitting, `${said}; fitting`).toBe(plain.fitting);
}

describe('a search with random rules and conditions finds what filtering every point finds', () => {
  it.each(classKeys)('%s', { timeout: 600_000 }, (key) => {
    for (let i = 0; i < latticesPerClass; i += 1) proveOne(key, 7_000_000 + classKeys.indexOf(key) * 10_000 + i);
  });

  it('is no empty question: rules leave something, and take something away', () => {
    expect(fitting).toBeGreaterThan(100);
    expect(fitting).toBeLessThan(without);
    // Some rules are decided before the search begins.
    expect(after).toBeLessThan(before);
  });
});
