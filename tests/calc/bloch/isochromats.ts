import { apply, chain, type Magnetisation, type Propagator, turn } from './propagate.js';

/** Isochromats side by side: what a voxel with a gradient, or a field that varies within it, holds. */
export type Isochromats = readonly Magnetisation[];

/** Mean of one component over all isochromats (0 is x, 1 is y, 2 is z). */
export function mean(all: Isochromats, component: 0 | 1 | 2): number {
  return all.reduce((sum, m) => sum + (m[component] as number), 0) / all.length;
}

/** Precession by 0, 1, 2, ... steps of a full turn over the count: a uniform distribution of phases. */
export function uniformTurns(count: number): readonly Propagator[] {
  const step = turn('z', 360 / count);
  const turns: Propagator[] = [turn('z', 0)];
  while (turns.length < count) turns.push(chain(turns[turns.length - 1] as Propagator, step));
  return turns;
}

/** A refocused train: angle and spacing, counted from the excitation; each half spacing every isochromat precesses by its own phase. */
export interface Train {
  readonly echoes: number;
  readonly refocusingDeg: number;
  /** Relaxation of half a spacing. */
  readonly half: Propagator;
}

/**
 * Plays a train on isochromats that were just excited along x, and gives the echoes and how it leaves them.
 * With more isochromats than twice the echoes no order of dephasing is mistaken for another: the sum is exact.
 */
export function playTrain(
  train: Train,
  excited: Isochromats,
  turns: readonly Propagator[],
): { readonly echoes: readonly number[]; readonly after: Isochromats } {
  const pulse = turn('x', train.refocusingDeg);
  const spacings = turns.map((precession) => {
    const half = chain(precession, train.half);
    return chain(half, pulse, half);
  });
  let all = excited;
  const echoes: number[] = [];
  for (let n = 0; n < train.echoes; n += 1) {
    all = all.map((m, i) => apply(spacings[i] as Propagator, m));
    echoes.push(mean(all, 0));
  }
  return { echoes, after: all };
}
