import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Baseline, baselineOf } from '../../src/calc/baseline.js';
import { cautionCodes } from '../../src/calc/caution.js';
import { type ClassKey, classRow, figureNeeds } from '../../src/calc/classes.js';
import { type EvaluateOptions, evaluate } from '../../src/calc/evaluate.js';
import { figureKeys } from '../../src/calc/figures.js';
import { resolveParameters } from '../../src/calc/resolve.js';
import { classOf, type Series } from '../../src/calc/series.js';
import { type Draw, drawBody, drawEdit, drawFrom, drawScanner, drawSeries, type Wildness } from './any-series.js';

const seed = 20240517;
/** A busy machine takes its time; nothing here is about speed. */
const patienceMs = 600_000;

/** What is wrong with two edits of a random series, or null. Plain comparisons: this runs fifty thousand times. */
function faultOf(draw: Draw, wild: Wildness): string | null {
  const series = drawSeries(draw, wild);
  const baseline = baselineOf(series, drawScanner(draw));
  return faultOfEdit(draw, wild, series, baseline) ?? faultOfEdit(draw, wild, series, baseline);
}

function faultOfEdit(draw: Draw, wild: Wildness, series: Series, baseline: Baseline): string | null {
  const key: ClassKey = classOf(series);
  const onto = draw() < 0.1 ? drawScanner(draw) : baseline.model.scanner;
  const { parameters, carried } = resolveParameters(baseline, drawEdit(draw, key, wild), onto);
  const options: EvaluateOptions = {
    tissues: draw() < 0.02 ? 'all' : 'pair',
    ...(draw() < 0.1 ? { readings: { timeS: 1 + 600 * draw(), b1rmsUt: 0.1 + 5 * draw(), sarWkg: 4 * draw() } } : {}),
  };
  const { figures, signals, cautions, fromReading } = evaluate({ ...series, parameters }, onto, drawBody(draw), baseline, options);
  const row = classRow(key);
  const impossible = cautions.some(({ code }) => code === 'timing-impossible');
  for (const figure of figureKeys) {
    const value = figures[figure];
    if (value === null) {
      if (row.figures.includes(figure) && !(figure in figureNeeds) && !excused(figure, series.target)) return `${key}: ${figure} is null`;
    } else if (!Number.isFinite(value)) return `${key}: ${figure} is ${value}`;
    else if (!row.figures.includes(figure)) return `${key}: ${figure} is ${value} and no figure of the class`;
    else if (value < 0 && figure !== 'contrastRatioChange') return `${key}: ${figure} is ${value}`;
  }
  for (const signal of signals) {
    for (const value of [signal.t1Ms, signal.t2Ms, signal.t2StarMs])
      if (!(value > 0) || value === Number.POSITIVE_INFINITY) return `${key}: relaxation ${value}`;
    for (const value of [signal.signal, signal.secondSignal])
      if (value !== null && !(value >= 0 && value <= 1 + 1e-9)) return `${key}: a signal of ${value}`;
    if ((signal.signal === null) !== impossible)
      return `${key}: signal ${signal.signal} where timing is ${impossible ? 'impossible' : 'possible'}`;
  }
  const read = draw() < 0.2;
  for (const caution of cautions) {
    const { code, numbers } = caution;
    if (!cautionCodes.includes(code)) return `unknown code ${code}`;
    // A sentence is put together when it is read: one series in five is.
    if (read && /NaN|Infinity|undefined|\[object/.test(caution.text)) return `${key}: "${caution.text}"`;
    for (const value of Object.values(numbers)) if (!Number.isFinite(value)) return `${key}: ${code} holds ${value}`;
  }
  for (const { key: name, to } of carried) if (!Number.isFinite(to) || to !== parameters[name]) return `${key}: ${name} carried to ${to}`;
  for (const figure of fromReading) if (figures[figure] === null) return `${figure} is said to come from a reading and is null`;
  return null;
}

/** Figures of the class that need a known target. */
function excused(figure: string, target: string): boolean {
  return target === 'a tissue nobody knows' && (figure === 'blurFwhmPx' || figure === 'ernstAngleDeg');
}

/** The first of many random series that goes wrong, with the number to draw it again from, or null. */
function firstFault(from: number, count: number, wild: Wildness): string | null {
  for (let i = from; i < from + count; i += 1) {
    try {
      const fault = faultOf(drawFrom(seed + i), wild);
      if (fault !== null) return `series ${i}: ${fault}`;
    } catch (error) {
      return `series ${i}: ${String(error)}`;
    }
  }
  return null;
}

describe(`evaluate over the whole schema (seed ${seed}): numbers or null, no exception, no figure of another class`, () => {
  it(
    '90,000 random series, as a scanner would be asked for: 45,000 drawn, two edits of each',
    () => {
      expect(firstFault(0, 45_000, { extremeShare: 0, longestTrain: 150 })).toBeNull();
    },
    patienceMs,
  );

  it(
    '10,000 random series with a third of their values from the ends of the schema',
    () => {
      expect(firstFault(1_000_000, 5_000, { extremeShare: 0.35, longestTrain: 300 })).toBeNull();
    },
    patienceMs,
  );

  it('trains as long as the schema allows', () => {
    expect(firstFault(2_000_000, 150, { extremeShare: 0.35, longestTrain: 2048 })).toBeNull();
  });

  it('any number to draw from that fast-check finds', () => {
    fc.assert(
      fc.property(fc.integer(), fc.double({ min: 0, max: 1, noNaN: true }), (from, extremeShare) => {
        expect(faultOf(drawFrom(from), { extremeShare, longestTrain: 300 })).toBeNull();
      }),
      { seed, numRuns: 500 },
    );
  });
});
