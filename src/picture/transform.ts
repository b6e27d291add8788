import FFT from 'fft.js';

const plans = new Map<number, FFT>();

function planOf(size: number): FFT {
  let plan = plans.get(size);
  if (plan === undefined) {
    plan = new FFT(size);
    plans.set(size, plan);
  }
  return plan;
}

/** Smallest power of two that is not less than a count, at least 2: the sizes the transform has. */
export function transformSize(count: number): number {
  let size = 2;
  while (size < count) size *= 2;
  return size;
}

/** A piece of the plane of a picture: places from `first` on, so many of them. */
export interface Stretch {
  readonly first: number;
  readonly count: number;
}

/**
 * Inverse Fourier sum of centred samples on a finer grid, by filling up with zeros: the picture at places `-size/2 ... size/2 - 1` of the
 * extent over `size`, of which the asked-for stretch of columns and rows is computed and given, complex, row after row.
 * Lines of the input that are zero throughout (before `firstLine`) are passed over.
 */
export function toPicture(
  samples: Float64Array,
  { readSamples, phaseLines, firstLine }: { readonly readSamples: number; readonly phaseLines: number; readonly firstLine: number },
  sizes: { readonly read: number; readonly phase: number },
  columns: Stretch,
  rows: Stretch,
): Float64Array {
  const half = new Float64Array(2 * phaseLines * columns.count);
  const readPlan = planOf(sizes.read);
  const from = new Float64Array(2 * sizes.read);
  const to = new Float64Array(2 * sizes.read);
  for (let line = firstLine; line < phaseLines; line += 1) {
    spread(samples, 2 * line * readSamples, 2, readSamples, from, sizes.read);
    readPlan.inverseTransform(to, from);
    for (let i = 0; i < columns.count; i += 1) {
      const at = 2 * ((columns.first + i + sizes.read / 2) % sizes.read);
      half[2 * (line * columns.count + i)] = (to[at] as number) * sizes.read;
      half[2 * (line * columns.count + i) + 1] = (to[at + 1] as number) * sizes.read;
    }
  }
  const picture = new Float64Array(2 * rows.count * columns.count);
  const phasePlan = planOf(sizes.phase);
  const down = new Float64Array(2 * sizes.phase);
  const out = new Float64Array(2 * sizes.phase);
  for (let column = 0; column < columns.count; column += 1) {
    spread(half, 2 * column, 2 * columns.count, phaseLines, down, sizes.phase);
    phasePlan.inverseTransform(out, down);
    for (let j = 0; j < rows.count; j += 1) {
      const at = 2 * ((rows.first + j + sizes.phase / 2) % sizes.phase);
      picture[2 * (j * columns.count + column)] = (out[at] as number) * sizes.phase;
      picture[2 * (j * columns.count + column) + 1] = (out[at + 1] as number) * sizes.phase;
    }
  }
  return picture;
}

/** Puts centred samples where the transform has them: frequency 0 first, negative ones at the end, zeros between. */
function spread(samples: Float64Array, start: number, stride: number, count: number, into: Float64Array, size: number): void {
  into.fill(0);
  const middle = Math.floor(count / 2);
  for (let i = 0; i < count; i += 1) {
    const at = 2 * ((i - middle + size) % size);
    const source = start + i * stride;
    into[at] = samples[source] as number;
    into[at + 1] = samples[source + 1] as number;
  }
}
