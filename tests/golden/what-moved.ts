import type { Golden } from './golden-figures.js';

/** One value that is no longer what it was; `undefined` is not there. */
export interface Moved {
  /** `preset/series`. */
  readonly series: string;
  /** Where in it: `figures.scanTimeS`. */
  readonly path: string;
  readonly from: unknown;
  readonly to: unknown;
  /** True when the preset's own text changed, which moves figures without a change of the model. */
  readonly presetChanged: boolean;
}

/** Equal within 1e-9 of the larger; below 1e-12 both are zero but for rounding. Everything that is no number must be the same. */
export function sameValue(a: unknown, b: unknown): boolean {
  if (typeof a !== 'number' || typeof b !== 'number') return a === b;
  return Math.abs(a - b) <= Math.max(1e-12, 1e-9 * Math.max(Math.abs(a), Math.abs(b)));
}

function leaves(value: unknown, path: string, into: Map<string, unknown>): Map<string, unknown> {
  if (typeof value === 'object' && value !== null) {
    for (const [key, inner] of Object.entries(value)) leaves(inner, path === '' ? key : `${path}.${key}`, into);
  } else into.set(path, value);
  return into;
}

/** Everything that differs between two golden files, in the order of the second; the version apart. */
export function whatMoved(before: Golden, now: Golden): Moved[] {
  const moved: Moved[] = [];
  for (const series of new Set([...Object.keys(now.series), ...Object.keys(before.series)])) {
    const { preset: presetBefore, ...partsBefore } = before.series[series] ?? { preset: '' };
    const { preset: presetNow, ...partsNow } = now.series[series] ?? { preset: '' };
    const old = leaves(partsBefore, '', new Map());
    const fresh = leaves(partsNow, '', new Map());
    for (const path of new Set([...fresh.keys(), ...old.keys()])) {
      const from = old.get(path);
      const to = fresh.get(path);
      if (!sameValue(from, to)) moved.push({ series, path, from, to, presetChanged: presetBefore !== presetNow });
    }
  }
  return moved;
}

/** One line a person can read. */
export function movedLine({ series, path, from, to, presetChanged }: Moved): string {
  return `${series}  ${path}: ${String(from)} -> ${String(to)}${presetChanged ? '  (the preset itself changed)' : ''}`;
}
