import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { echoAmplitude } from '../../src/calc/echo-train.js';
import { evaluate } from '../../src/calc/evaluate.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { bareSignal } from '../bare-signal.js';
import { compareTimes, type Work } from '../compare-times.js';
import { plainPhaseGraph } from '../plain-phase-graph.js';
import { editedSeries, presetSeries } from '../preset-series.js';
import type { Row } from '../row.js';

/** One full evaluation with target and comparison, a different edit each turn. */
function evaluation(
  preset: string,
  id: string,
): { readonly work: Work; readonly echoes: number; readonly refocusingAngleDeg: number; readonly echoSpacingMs: number } {
  const { series, fieldT } = presetSeries(preset, id);
  const scanner = plainScanner(fieldT);
  const baseline = baselineOf(series, scanner);
  const edits = editedSeries(series);
  const { echoTrainLength: echoes, refocusingAngleDeg, echoSpacingMs } = series.parameters;
  const work: Work = (turn) => {
    const { figures, signals, cautions } = evaluate(edits[turn & 63]!, scanner, unknownBody, baseline, { tissues: 'pair' });
    return (figures.relativeSnr ?? 0) + signals.length + cautions.length;
  };
  return { work, echoes, refocusingAngleDeg, echoSpacingMs };
}

/** T1 of a plain phase-graph pass, another at every call. */
const t1sMs = Float64Array.from({ length: 64 }, (_, i) => 800 + 20 * i);

function trainless(preset: string, id: string, words: string): Row {
  return {
    name: `evaluate ${words} (${preset} ${id})`,
    against: 'a bare spoiled gradient-echo signal',
    unit: 'us',
    budget: 60,
    measure: async () => compareTimes(evaluation(preset, id).work, bareSignal),
  };
}

function train(preset: string, id: string, words: string): Row {
  return {
    name: `evaluate ${words} (${preset} ${id})`,
    against: 'a plain phase-graph pass of as many echoes, per tissue',
    unit: 'us',
    budget: 6,
    measure: async () => {
      const { work, echoes, refocusingAngleDeg, echoSpacingMs } = evaluation(preset, id);
      checkPlainPass(echoes, refocusingAngleDeg, echoSpacingMs);
      const pass: Work = (turn) => plainPhaseGraph(echoes, refocusingAngleDeg, echoSpacingMs, t1sMs[turn & 63]!, 80);
      return compareTimes(work, pass, { yardsticksPerSubject: 2 });
    },
  };
}

/** A yardstick that computed something else would be none. */
function checkPlainPass(echoes: number, refocusingAngleDeg: number, echoSpacingMs: number): void {
  const plain = plainPhaseGraph(echoes, refocusingAngleDeg, echoSpacingMs, 1e15, 80);
  const own = echoAmplitude({ refocusingAngleDeg, echoSpacingMs, t1Ms: 1e15, t2Ms: 80 }, echoes);
  if (Math.abs(plain - own) > 1e-9) throw new Error(`the plain pass gives ${plain}, the model ${own}`);
}

/** The cost of one evaluation: what every keypress, every price of a step and every way of a search pays. */
export const rows: readonly Row[] = [
  trainless('liver-3t', 't1-3d', '3D spoiled gradient echo'),
  trainless('liver-3t', 'dual-echo', '2D dual-echo spoiled gradient echo'),
  trainless('brain-1.5t', 't1', 'spin echo'),
  trainless('brain-3t', 't1-3d', 'inversion-prepared gradient echo'),
  trainless('heart-cine-1.5t', 'cine-sa', 'balanced cine'),
  trainless('liver-3t', 'dwi', 'echo-planar diffusion'),
  train('knee-3t', 't1-cor', 'train of 4'),
  train('lumbar-spine-3t', 't2-sag', 'train of 20'),
  train('liver-3t', 'ss-cor', 'single shot'),
  train('brain-ms-3t', 'flair-3d', '3D train'),
];
