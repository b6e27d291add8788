import { readFileSync } from 'node:fs';
import FFT from 'fft.js';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { picturePair } from '../../src/picture/picture-pair.js';
import { readObjectFile } from '../../src/study/read-object-file.js';
import { compareTimes, type Work } from '../compare-times.js';
import { presetSeries } from '../preset-series.js';
import type { Row } from '../row.js';

const size = 256;

/** Both pictures of a spin echo on a square grid, the slice another one each turn. */
function bothPictures(): Work {
  const { series, fieldT } = presetSeries('brain-1.5t', 't1');
  const square = { ...series, parameters: { ...series.parameters, matrixRead: size, matrixPhase: size, phaseFieldOfViewPercent: 100 } };
  const object = readObjectFile(readFileSync('objects/brain.json', 'utf8'), 'brain.json');
  if (!object.ok) throw new Error(object.problems[0]?.message);
  const scanner = plainScanner(fieldT);
  const baseline = baselineOf(square, scanner);
  return (turn) => {
    const now = { ...square, parameters: { ...square.parameters, sliceThicknessMm: 3 + (turn & 7) / 4 } };
    const pair = picturePair({
      object: object.value,
      series: now,
      scanner,
      body: unknownBody,
      baseline,
      targetSnr: 20,
      seed: turn + 1,
      fineness: 1,
    });
    if (!pair.ok) throw new Error(pair.problems[0]?.message);
    if (pair.value.now.columns !== size) throw new Error(`the picture has ${pair.value.now.columns} columns`);
    return pair.value.white;
  };
}

/** One plain transform of that size by the same package: rows, then columns. */
function plainTransform(): Work {
  const plan = new FFT(size);
  const given = Float64Array.from({ length: 2 * size * size }, (_, i) => Math.sin(i));
  const half = new Float64Array(2 * size * size);
  const whole = new Float64Array(2 * size * size);
  const column = new Float64Array(2 * size);
  const out = new Float64Array(2 * size);
  return (turn) => {
    for (let row = 0; row < size; row += 1) {
      plan.inverseTransform(out, given.subarray(2 * row * size, 2 * (row + 1) * size));
      half.set(out, 2 * row * size);
    }
    for (let i = 0; i < size; i += 1) {
      for (let row = 0; row < size; row += 1) {
        column[2 * row] = half[2 * (row * size + i)] as number;
        column[2 * row + 1] = half[2 * (row * size + i) + 1] as number;
      }
      plan.inverseTransform(out, column);
      for (let row = 0; row < size; row += 1) {
        whole[2 * (row * size + i)] = out[2 * row] as number;
        whole[2 * (row * size + i) + 1] = out[2 * row + 1] as number;
      }
    }
    return whole[turn & 1023] as number;
  };
}

/** What a changed value costs before its picture can be shown. */
export const rows: readonly Row[] = [
  {
    name: `picture of preset and now, ${size} x ${size}, both`,
    against: 'one Fourier transform of that size',
    unit: 'ms',
    budget: 40,
    measure: async () => {
      const { subject, yardstick, ratio } = compareTimes(bothPictures(), plainTransform(), { rounds: 31 });
      return { subject: subject / 1000, yardstick: yardstick === null ? null : yardstick / 1000, ratio };
    },
  },
];
