import { baselineOf } from '../calc/baseline.js';
import type { Body } from '../calc/body.js';
import type { Outcome } from '../calc/problem.js';
import { plainScanner, type Scanner } from '../calc/scanner.js';
import type { Parameters, Series } from '../calc/series.js';
import type { ObjectFile } from '../study/object-file.js';
import { type PicturePair, picturePair, usualTargetSnr } from './picture-pair.js';
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

/** Draws both pictures: the one path that worker and program share, so that both give the same. */
export function drawPictures(problem: PictureProblem, object: ObjectFile): Outcome<DrawnPictures> {
  const { preset, presetFieldT, parameters, scanner, body } = problem;
  const baseline = baselineOf(preset, plainScanner(presetFieldT));
  const series = { ...preset, parameters };
  const pair = picturePair({ object, series, scanner, body, baseline, targetSnr: usualTargetSnr, seed: 1, fineness: 1 });
  if (!pair.ok) return pair;
  const voxels = [preset.parameters, parameters].flatMap((p) => [p.fieldOfViewMm / p.matrixRead, p.fieldOfViewMm / p.matrixPhase]);
  const { look, title } = object;
  const voxelMm = Math.min(...voxels);
  return { ok: true, value: { pair: pair.value, title, look, squareWindow: squareWindow(pair.value, look), voxelMm } };
}
