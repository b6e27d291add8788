import type { PlacedShape } from './placed-object.js';
import { ballTable, discTable, type RadialTable, tableSteps } from './radial-table.js';
import { frequencyIndex } from './sampling-grid.js';

/** Frequencies at which an object is sampled: counts and extents along the first axis (across) and the second (down) of the object's plane. */
export interface Frequencies {
  /** Samples along readout, and lines along phase. */
  readonly readSamples: number;
  readonly readExtentMm: number;
  readonly phaseLines: number;
  readonly phaseExtentMm: number;
  /** True where phase runs down the object's plane, false where it runs across. */
  readonly phaseIsDown: boolean;
}

/** Weights of tissues line by line: of what water gives, and of fat, which lies elsewhere in the picture. */
export interface LineWeights {
  readonly water: Float64Array;
  readonly fat: Float64Array;
}

/** Complex samples, real and imaginary parts in turn, line after line. */
export interface Spectrum {
  readonly water: Float64Array;
  readonly fat: Float64Array;
}

/**
 * The Fourier transform of an object in closed form at the sampled frequencies, mm2, each tissue weighted line by line: of an ellipse its area
 * times `2 J1(x) / x`, x = 2 pi |k| in half axes. Lines before `firstLine` stay 0.
 *
 * Half of the frequencies are computed: a shape's own transform about its middle is real and even.
 */
export function objectSpectrum(
  shapes: readonly PlacedShape[],
  sliceMm: number,
  grid: Frequencies,
  firstLine: number,
  weightsOf: (tissue: string | null) => LineWeights,
): Spectrum {
  const { readSamples, phaseLines } = grid;
  const spectrum: Spectrum = { water: new Float64Array(2 * readSamples * phaseLines), fat: new Float64Array(2 * readSamples * phaseLines) };
  for (const placed of shapes) {
    const own = weightsOf(placed.tissue);
    const other = weightsOf(placed.insteadOf);
    const water = own.water.map((value, line) => value - (other.water[line] as number));
    const fat = own.fat.map((value, line) => value - (other.fat[line] as number));
    if (water.some((value) => value !== 0)) addShape(placed, sliceMm, grid, firstLine, water, spectrum.water);
    if (fat.some((value) => value !== 0)) addShape(placed, sliceMm, grid, firstLine, fat, spectrum.fat);
  }
  return spectrum;
}

/** Cosine and sine of -2 pi k x for each frequency of one axis. */
function turns(samples: number, extentMm: number, placeMm: number): Float64Array {
  const turned = new Float64Array(2 * samples);
  for (let i = 0; i < samples; i += 1) {
    const angle = (-2 * Math.PI * frequencyIndex(i, samples) * placeMm) / extentMm;
    turned[2 * i] = Math.cos(angle);
    turned[2 * i + 1] = Math.sin(angle);
  }
  return turned;
}

/** Sum of the turns of equal shapes in a row, about the middle of the row: real, `sin(n a / 2) / sin(a / 2)` with a the turn from one to the next. */
function repetition(count: number, angle: number): number {
  const half = Math.sin(angle / 2);
  if (Math.abs(half) < 1e-9) return count * (count % 2 === 1 || Math.cos(angle / 2) > 0 ? 1 : -1);
  return Math.sin((count * angle) / 2) / half;
}

function addShape(
  { shape }: PlacedShape,
  sliceMm: number,
  grid: Frequencies,
  firstLine: number,
  weight: Float64Array,
  into: Float64Array,
): void {
  const { readSamples, readExtentMm, phaseLines, phaseExtentMm, phaseIsDown } = grid;
  const [a, b, c] = shape.halfAxesMm as [number, number, number?];
  const count = shape.repeat?.count ?? 1;
  const step = shape.repeat?.stepMm ?? ([0, 0] as const);
  const middle = [shape.atMm[0] + ((count - 1) / 2) * step[0], shape.atMm[1] + ((count - 1) / 2) * step[1]] as const;
  const lean = shape.leanMmPerMm ?? ([0, 0] as const);
  // Readout and phase as axes of the object's plane.
  const [r, q] = phaseIsDown ? ([0, 1] as const) : ([1, 0] as const);
  const turn = ((shape.turnDeg ?? 0) * Math.PI) / 180;
  const cross = [Math.cos(turn), Math.sin(turn)] as const;
  // x^2 = (uRead kr + uPhase kp)^2 + (vRead kr + vPhase kp)^2, u and v along the half axes.
  const scale = 2 * Math.PI;
  const along = [cross[0] * a * scale, cross[1] * a * scale] as const;
  const beside = [-cross[1] * b * scale, cross[0] * b * scale] as const;
  const uRead = along[r] / readExtentMm;
  const vRead = beside[r] / readExtentMm;
  const uPhase = along[q] / phaseExtentMm;
  const vPhase = beside[q] / phaseExtentMm;

  const halfRead = Math.floor(readSamples / 2);
  const halfPhase = Math.floor(phaseLines / 2);
  const longest = Math.hypot(halfRead * uRead, halfPhase * uPhase) + Math.hypot(halfRead * vRead, halfPhase * vPhase);
  const table: RadialTable = c === undefined ? discTable() : ballTable(c, sliceMm, Math.min(longest, 1024));
  const { values, beyond } = table;
  const end = values.length - 2;
  const lengthMm = Math.min(sliceMm, shape.lengthMm ?? sliceMm);
  const amount = Math.PI * a * b * (lengthMm / sliceMm);
  // Over the slice a leaning shape moves by lean x length: its transform gets that box's sinc.
  const leanRead = (Math.PI * lean[r] * lengthMm) / readExtentMm;
  const leanPhase = (Math.PI * lean[q] * lengthMm) / phaseExtentMm;
  const stepRead = (scale * step[r]) / readExtentMm;
  const stepPhase = (scale * step[q]) / phaseExtentMm;
  const leans = leanRead !== 0 || leanPhase !== 0;
  // Rows of shapes mostly follow one axis: then their sum is the same for every line.
  const repeated =
    count > 1 && stepRead !== 0 && stepPhase === 0
      ? Float64Array.from({ length: 2 * halfRead + 1 }, (_, i) => repetition(count, stepRead * (i - halfRead)))
      : null;
  const readTurns = turns(readSamples, readExtentMm, middle[r]);
  const phaseTurns = turns(phaseLines, phaseExtentMm, middle[q]);

  for (let m = 0; m <= halfPhase; m += 1) {
    const line = m + halfPhase;
    const mirror = halfPhase - m;
    const here = line < phaseLines && line >= firstLine ? (weight[line] as number) : 0;
    const there = m > 0 && mirror >= firstLine ? (weight[mirror] as number) : 0;
    if (here === 0 && there === 0) continue;
    // Of an even count the most negative line has no counterpart: its turn is the conjugate of the mirrored one.
    const known = line < phaseLines ? line : mirror;
    const pc = phaseTurns[2 * known] as number;
    const ps = (phaseTurns[2 * known + 1] as number) * (known === line ? 1 : -1);
    const lineAmount = stepRead === 0 ? amount * repetition(count, stepPhase * m) : amount;
    const oblique = repeated === null && stepRead !== 0;
    const uLine = uPhase * m;
    const vLine = vPhase * m;
    for (let n = -halfRead; n <= halfRead; n += 1) {
      const u = uRead * n + uLine;
      const v = vRead * n + vLine;
      const x = Math.sqrt(u * u + v * v);
      const place = x * tableSteps;
      const index = place | 0;
      let value: number;
      if (index < end) {
        const before = values[index] as number;
        value = lineAmount * (before + (place - index) * ((values[index + 1] as number) - before));
      } else value = lineAmount * beyond(x);
      if (repeated !== null) value *= repeated[n + halfRead] as number;
      else if (oblique) value *= repetition(count, stepRead * n + stepPhase * m);
      if (leans) {
        const leant = leanRead * n + leanPhase * m;
        if (Math.abs(leant) > 1e-9) value *= Math.sin(leant) / leant;
      }
      const column = n + halfRead;
      const opposite = halfRead - n;
      const isColumn = column < readSamples;
      const own = isColumn ? column : opposite;
      const rc = readTurns[2 * own] as number;
      const rs = (readTurns[2 * own + 1] as number) * (isColumn ? 1 : -1);
      const real = value * (rc * pc - rs * ps);
      const imaginary = value * (rc * ps + rs * pc);
      if (here !== 0 && isColumn) {
        const at = 2 * (line * readSamples + column);
        into[at] = (into[at] as number) + here * real;
        into[at + 1] = (into[at + 1] as number) + here * imaginary;
      }
      if (there !== 0 && opposite < readSamples) {
        const at = 2 * (mirror * readSamples + opposite);
        into[at] = (into[at] as number) + there * real;
        into[at + 1] = (into[at + 1] as number) - there * imaginary;
      }
    }
  }
}
