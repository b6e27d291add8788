import { expm, lusolve, matrix } from 'mathjs';

/**
 * The Bloch equations as a linear system in (Mx, My, Mz, 1), propagated with a general matrix exponential.
 * Nothing here knows a signal equation: it checks them (Bloch, Phys Rev 1946;70:460; homogeneous form as in Jaynes, Phys Rev 1955;98:1099).
 */
export type Propagator = readonly (readonly number[])[];
export type Magnetisation = readonly number[];

function propagatorOf(generator: number[][]): Propagator {
  return expm(matrix(generator)).toArray() as number[][];
}

/** Free relaxation for a time in ms, on resonance. */
export function relax(ms: number, t1Ms: number, t2Ms: number): Propagator {
  const r1 = ms / t1Ms;
  const r2 = ms / t2Ms;
  return propagatorOf([
    [-r2, 0, 0, 0],
    [0, -r2, 0, 0],
    [0, 0, -r1, r1],
    [0, 0, 0, 0],
  ]);
}

/** A pulse so short that nothing relaxes, about x, y or z, degrees. */
export function turn(axis: 'x' | 'y' | 'z', angleDeg: number): Propagator {
  const a = (angleDeg * Math.PI) / 180;
  const [x, y, z] = [axis === 'x' ? a : 0, axis === 'y' ? a : 0, axis === 'z' ? a : 0];
  return propagatorOf([
    [0, -z, y, 0],
    [z, 0, -x, 0],
    [-y, x, 0, 0],
    [0, 0, 0, 0],
  ]);
}

/** Crushing so strong that no transverse magnetisation is left: what ideal RF spoiling comes to. */
export const crush: Propagator = [
  [0, 0, 0, 0],
  [0, 0, 0, 0],
  [0, 0, 1, 0],
  [0, 0, 0, 1],
];

export function apply(p: Propagator, m: Magnetisation): number[] {
  return p.map((row) => row.reduce((sum, value, i) => sum + value * (m[i] as number), 0));
}

/** Propagators one after the other, the first first. */
export function chain(...steps: readonly Propagator[]): Propagator {
  return steps.reduce((before, step) =>
    step.map((row) => [0, 1, 2, 3].map((j) => row.reduce((sum, value, k) => sum + value * (before[k]?.[j] as number), 0))),
  );
}

/** The same propagator many times. */
export function repeat(step: Propagator, times: number): Propagator {
  return chain(turn('z', 0), ...Array.from({ length: times }, () => step));
}

/** The magnetisation that a cycle reproduces: `(I - A) m = b`, by a general linear solver. */
export function periodic(cycle: Propagator): Magnetisation {
  const left = [0, 1, 2].map((i) => [0, 1, 2].map((j) => (i === j ? 1 : 0) - (cycle[i]?.[j] as number)));
  const right = [0, 1, 2].map((i) => cycle[i]?.[3] as number);
  const solved = lusolve(left, right) as number[][];
  return [...solved.map((row) => row[0] as number), 1];
}

/** Size of the transverse magnetisation. */
export function transverse(m: Magnetisation): number {
  return Math.hypot(m[0] as number, m[1] as number);
}
