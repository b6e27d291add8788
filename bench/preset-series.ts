import { readFileSync } from 'node:fs';
import type { Series } from '../src/calc/series.js';
import { readPreset } from '../src/study/read-preset.js';
import type { StudySeries } from '../src/study/study.js';

/** A series of a shipped preset and the nominal field of its study. */
export function presetSeries(preset: string, id: string): { readonly series: StudySeries; readonly fieldT: number } {
  const study = readPreset(readFileSync(`presets/${preset}.json`, 'utf8'), preset);
  if (!study.ok) throw new Error(`${preset}: ${study.problems[0]?.message}`);
  const series = study.value.series.find((one) => one.id === id);
  if (series === undefined) throw new Error(`${preset} has no series ${id}`);
  return { series, fieldT: study.value.fieldT };
}

/**
 * The same series edited in 64 ways that a person or a search would try: slices, phase lines, TR, angle, bandwidth.
 * No two neighbours are equal, so that nothing is gained by remembering the last answer.
 */
export function editedSeries(series: Series): readonly Series[] {
  const p = series.parameters;
  return Array.from({ length: 64 }, (_, i) => ({
    ...series,
    parameters: {
      ...p,
      sliceCount: Math.max(1, p.sliceCount - (i % 4)),
      matrixPhase: p.matrixPhase - 8 * (i % 3),
      repetitionTimeMs: p.repetitionTimeMs * (1 + 0.01 * (i % 8)),
      flipAngleDeg: p.flipAngleDeg - (i % 2),
      pixelBandwidthHz: p.pixelBandwidthHz + 10 * (i % 5),
    },
  }));
}
