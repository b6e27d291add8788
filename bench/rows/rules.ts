import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { evaluate } from '../../src/calc/evaluate.js';
import type { FigureKey } from '../../src/calc/figures.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { usualBands } from '../../src/search/bands.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import { search } from '../../src/search/search.js';
import { readRules } from '../../src/study/read-rules.js';
import type { MustKeep } from '../../src/study/study.js';
import { median } from '../median.js';
import { presetSeries } from '../preset-series.js';
import type { Measured, Row } from '../row.js';

const source = 'invented for the benchmark';

/** How much larger than the preset's a voxel may be, with rules and without. */
const mostPhase = 1.2;
const mostSlice = 1.5;

/** Figures that rules are about, and how far a rule lets each go: wide, so that both searches look through the same ways. */
const limited: readonly (readonly [FigureKey, number])[] = [
  ['voxelSliceMm', 4],
  ['voxelPhaseMm', 4],
  ['voxelReadMm', 4],
  ['voxelVolumeMm3', 9],
  ['coverageMm', 4],
  ['linesPhase', 8],
  ['displayedVoxelPhaseMm', 6],
  ['chemicalShiftPx', 6],
  ['displayedVoxelReadMm', 6],
  ['linesSlice', 8],
];

/**
 * Fifty rules: limits, products, sums and conditions that every way keeps, caps on time, and the limits of the search without them said
 * once more in other words, which bind.
 */
function fiftyRules(figures: Readonly<Record<string, number | null>>): MustKeep[] {
  const [phase, slice] = [(figures.voxelPhaseMm ?? 1) * mostPhase, (figures.voxelSliceMm ?? 1) * mostSlice];
  const rules: MustKeep[] = Array.from({ length: 5 }, (_, i): readonly MustKeep[] => [
    { rule: `voxelPhaseMm * ${i + 2} <= ${phase * (i + 2)}`, source },
    { rule: `voxelSliceMm + ${i} <= ${slice + i} and voxelPhaseMm > 0`, source },
    { rule: `scanTimeS / volumes <= ${(figures.scanTimeS ?? 1) * 10 + i}`, source },
  ]).flat();
  for (let i = 0; rules.length < 50; i += 1) {
    const [figure, factor] = limited[i % limited.length] as readonly [FigureKey, number];
    const [other, otherFactor] = limited[(i * 3 + 1) % limited.length] as readonly [FigureKey, number];
    const most = (figures[figure] ?? 1) * factor;
    const otherMost = (figures[other] ?? 1) * otherFactor;
    const kinds: readonly MustKeep[] = [
      { figure, atMost: most + i, source },
      { rule: `${figure} <= ${most + i}`, source },
      { rule: `${figure} * 2 - 1 < ${2 * most + i} and ${figure} >= 0`, source },
      { rule: `max(${figure}, 0) <= ${most + i} or ${other} <= ${otherMost}`, source },
      { figure, atMost: most + i, when: `${figure} > 0`, source },
    ];
    rules.push(kinds[Math.floor(i / limited.length) % kinds.length] as MustKeep);
  }
  return rules;
}

function problemOf(preset: string, id: string, holdS: number): SearchProblem {
  const { series, fieldT } = presetSeries(preset, id);
  return {
    series,
    presetFieldT: fieldT,
    scanner: plainScanner(fieldT),
    body: unknownBody,
    rules: new Map(),
    limits: { holdS },
    readings: {},
    bands: usualBands,
    set: {},
    opened: [],
    frozen: false,
  };
}

/** The search with two limits of its own, and with fifty rules beside them. */
async function bothProblems(problem: SearchProblem): Promise<{ readonly without: SearchProblem; readonly rules: SearchProblem }> {
  const { series, scanner } = problem;
  const { figures } = evaluate(series, scanner, unknownBody, baselineOf(series, scanner));
  const limits: MustKeep[] = [
    { figure: 'voxelPhaseMm', atMost: (figures.voxelPhaseMm ?? 1) * mostPhase, source },
    { figure: 'voxelSliceMm', atMost: (figures.voxelSliceMm ?? 1) * mostSlice, source },
  ];
  const more = fiftyRules(figures);
  const withKeeps = (mustKeep: readonly MustKeep[]): SearchProblem => ({ ...problem, series: { ...series, mustKeep } });
  const parser = await loadParser();
  return { without: withKeeps(limits), rules: { ...withKeeps([...limits, ...more]), rules: readRules(more, parser) } };
}

export const rows: readonly Row[] = [
  {
    name: 'search with 50 rules (liver-3t t1-3d, hold 11 s)',
    against: 'the same search without them',
    unit: 'ms',
    budget: 1.2,
    measure: async () => {
      const { without, rules } = await bothProblems(problemOf('liver-3t', 't1-3d', 11));
      const [a, b] = [search(rules), search(without)];
      // A search that found something else would be no yardstick.
      if (a.fitting !== b.fitting || a.ways.length !== b.ways.length)
        throw new Error(`rules changed the search: ${a.fitting} and ${b.fitting} fit`);
      return alternating(
        () => search(rules),
        () => search(without),
      );
    },
  },
];

/** A search takes a good part of a second: once to warm up, then both in turns, the order swapped each round, processor time, the median of the rounds' ratios. */
function alternating(subject: () => unknown, yardstick: () => unknown): Measured {
  const [subjects, yardsticks, ratios]: [number[], number[], number[]] = [[], [], []];
  const msOf = (work: () => unknown) => {
    const before = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(before);
    return (user + system) / 1000;
  };
  msOf(subject);
  msOf(yardstick);
  for (let round = 0; round < 9; round += 1) {
    const first = round % 2 === 0 ? msOf(subject) : null;
    const b = msOf(yardstick);
    const a = first ?? msOf(subject);
    subjects.push(a);
    yardsticks.push(b);
    ratios.push(a / b);
  }
  return { subject: median(subjects), yardstick: median(yardsticks), ratio: median(ratios) };
}
