import type { Baseline } from '../calc/baseline.js';
import { type Body, unknownBody } from '../calc/body.js';
import { evaluate } from '../calc/evaluate.js';
import type { Outcome } from '../calc/problem.js';
import type { Scanner } from '../calc/scanner.js';
import { type PicturePair, picturePair } from '../picture/picture-pair.js';
import { frameWords, pictureSheet, type SheetWords } from '../picture/picture-sheet.js';
import { pngFile } from '../picture/png-file.js';
import { changedWords, pictureFigureWords } from '../session/picture-words.js';
import type { SeriesResult } from '../session/series-result.js';
import { cleanText } from '../study/clean-text.js';
import type { ObjectFile } from '../study/object-file.js';
import type { Study } from '../study/study.js';

/** Pixels of a sheet are this wide or finer, mm: interpolation alone, so that rings and edges look as round as they are. */
const pixelMm = 0.5;
/** Most times that a pixel is divided. */
const mostFine = 8;

/** What a sheet is drawn of. */
export interface SheetAsk {
  readonly study: Study;
  /** The series with its values set. */
  readonly now: SeriesResult;
  readonly baseline: Baseline;
  readonly scanner: Scanner;
  readonly body: Body;
  readonly object: ObjectFile;
  readonly targetSnr: number;
}

/** A sheet as PNG, what stands on it, and what it was drawn of. */
export interface DrawnSheet {
  readonly bytes: Uint8Array;
  readonly words: SheetWords;
  readonly caption: string;
  readonly pair: PicturePair;
}

/** Draws preset and now on a sheet, finer than they are displayed, with words and figures. */
export function drawSheet(ask: SheetAsk): Outcome<DrawnSheet> {
  const { now, baseline, scanner, body, object, targetSnr } = ask;
  const series = { ...now.series, parameters: now.parameters };
  const { displayedVoxelReadMm, displayedVoxelPhaseMm } = now.evaluation.figures;
  const widest = Math.max(displayedVoxelReadMm ?? 1, displayedVoxelPhaseMm ?? 1);
  const fineness = Math.min(mostFine, Math.max(1, Math.ceil(widest / pixelMm)));
  const pair = picturePair({ object, series, scanner, body, baseline, targetSnr, seed: 1, fineness });
  if (!pair.ok) return pair;
  const words = wordsOf(ask, pair.value);
  const caption = `${words.title.join(' ')} ${frameWords}`;
  return { ok: true, value: { bytes: pngFile(pictureSheet(pair.value, object, words), caption), words, caption, pair: pair.value } };
}

function wordsOf({ study, now, baseline, scanner, targetSnr }: SheetAsk, { notes }: PicturePair): SheetWords {
  const before = baseline.model.series;
  const changes = changedWords(before.parameters, now.parameters);
  const field = scanner.fieldT === study.fieldT ? [] : [{ full: `${study.fieldT} T to ${scanner.fieldT} T`, short: `${scanner.fieldT} T` }];
  const all = [...field, ...changes];
  const asPreset = evaluate(before, baseline.model.scanner, unknownBody, baseline);
  const title = cleanText(
    `${study.id}, ${now.series.id}: ${all.length === 0 ? 'as the preset has it' : all.map(({ full }) => full).join('; ')}.`,
  );
  return {
    title: [title],
    now: all.length === 0 ? 'now: as the preset' : `now: ${all[0]?.short}${all.length > 1 ? `, ${all.length - 1} more` : ''}`,
    figures: pictureFigureWords(now.series, asPreset.figures, now.evaluation.figures),
    notes: [
      `Assumed: the target has a signal to noise of ${targetSnr} in the preset. Both pictures have one window and one seed of noise.`,
      ...notes,
    ],
  };
}
