import { baselineOf } from '../calc/baseline.js';
import type { Body } from '../calc/body.js';
import type { Outcome } from '../calc/problem.js';
import { plainScanner, type Scanner } from '../calc/scanner.js';
import type { Parameters, Series } from '../calc/series.js';
import type { ObjectFile } from '../study/object-file.js';
import { type DrawnSeries, type PicturePair, picturePair, presetPicture, usualTargetSnr } from './picture-pair.js';
import { type PictureWindow, squareWindow } from './picture-window.js';

/** What a pair of pictures is asked with from the interface; plain values, so that a worker can be handed them. */
export interface PictureProblem {
  /** Body region of the study: it chooses the object. */
  readonly region: string;
  /** The series as the preset has it, at the field of its file. */
  readonly preset: Series;
  readonly presetFieldT: number;
  /** What is drawn beside it. */
  readonly parameters: Parameters;
  readonly scanner: Scanner;
  readonly body: Body;
}

/** Two pictures, and where to look in them. */
export interface DrawnPictures {
  readonly pair: PicturePair;
  readonly title: string;
  readonly look: ObjectFile['look'];
  /** Window of the squares that are shown close: worked out once, not with every frame. */
  readonly squareWindow: PictureWindow;
  /** The shortest side of an acquired voxel in the plane, mm, of both. */
  readonly voxelMm: number;
}

/** Gives what was drawn for the same key the last time, else draws it. */
export type KeepPreset = (key: string, draw: () => DrawnSeries) => DrawnSeries;

/** Keeps one picture: the preset's stays the same while a series is adjusted, and is half of the work. */
export function keepPreset(): KeepPreset {
  let kept: { readonly key: string; readonly drawn: DrawnSeries } | null = null;
  return (key, draw) => {
    if (kept?.key !== key) kept = { key, drawn: draw() };
    return kept.drawn;
  };
}

/** Draws both pictures: the one path that worker and program share, so that both give the same. */
export function drawPictures(problem: PictureProblem, object: ObjectFile, keep: KeepPreset = keepPreset()): Outcome<DrawnPictures> {
  const { preset, presetFieldT, parameters, scanner, body } = problem;
  const baseline = baselineOf(preset, plainScanner(presetFieldT));
  const series = { ...preset, parameters };
  const request = { object, series, scanner, body, baseline, targetSnr: usualTargetSnr, seed: 1, fineness: 1 };
  const pair = picturePair(
    request,
    keep(JSON.stringify([preset, presetFieldT, body, object]), () => presetPicture(request)),
  );
  if (!pair.ok) return pair;
  const voxels = [preset.parameters, parameters].flatMap((p) => [p.fieldOfViewMm / p.matrixRead, p.fieldOfViewMm / p.matrixPhase]);
  const { look, title } = object;
  const voxelMm = Math.min(...voxels);
  return { ok: true, value: { pair: pair.value, title, look, squareWindow: squareWindow(pair.value, look), voxelMm } };
}
