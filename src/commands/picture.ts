import { unknownBody } from '../calc/body.js';
import { evaluate } from '../calc/evaluate.js';
import type { Problem } from '../calc/problem.js';
import { type PicturePair, picturePair } from '../picture/picture-pair.js';
import { frameWords, pictureSheet, type SheetWords } from '../picture/picture-sheet.js';
import { pngFile } from '../picture/png-file.js';
import { changedWords, pictureFigureWords } from '../session/picture-words.js';
import { wrapText } from '../session/wrap-text.js';
import { savePicture } from '../store/save-picture.js';
import { fileModeOf } from '../store/settings.js';
import { cleanText } from '../study/clean-text.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';
import { type PictureAsk, readPictureRequest } from './picture-request.js';

/** Pixels of a sheet are this wide or finer, mm: interpolation alone, so that rings and edges look as round as they are. */
const pixelMm = 0.5;
/** Most times that a pixel is divided. */
const mostFine = 8;

/** `holdfast picture`: the preset and the series as it is now, side by side as computed pictures of an invented object, in a PNG. */
export async function runPicture(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const read = await readPictureRequest(request, io);
  if (!read.ok) return complain(read, io);
  const ask = read.value;
  const { now, baseline, scanner, body, object, targetSnr } = ask;
  const series = { ...now.series, parameters: now.parameters };
  const { displayedVoxelReadMm, displayedVoxelPhaseMm } = now.evaluation.figures;
  const widest = Math.max(displayedVoxelReadMm ?? 1, displayedVoxelPhaseMm ?? 1);
  const fineness = Math.min(mostFine, Math.max(1, Math.ceil(widest / pixelMm)));
  const pair = picturePair({ object, series, scanner, body, baseline, targetSnr, seed: 1, fineness });
  if (!pair.ok) return complain({ ok: false, exit: exitOf(pair.problems), problems: pair.problems }, io);
  const words = wordsOf(ask, pair.value);
  const caption = `${words.title.join(' ')} ${frameWords}`;
  const bytes = pngFile(pictureSheet(pair.value, object, words), caption);
  const saved = await savePicture(io.disk, ask.out, bytes, fileModeOf(settings.value.settings), request.has('replace'));
  if (!saved.ok) return complain(refusedByStore(saved.problems), io);
  const page = pageOf(request, io);
  if (request.has('json')) io.write(`${JSON.stringify(documentOf(ask, pair.value, words), null, 2)}\n`);
  else {
    const lines = [...words.title, frameWords, ...words.figures, ...words.notes, `Written: ${cleanText(ask.out)}`];
    io.write(page.plain(`${lines.flatMap((line) => wrapText(line, page.width)).join('\n')}\n`));
  }
  return exitCodes.done;
}

/** A body that was typed too small is wrong use; a timing or a grid that gives no picture is a check that failed. */
function exitOf(problems: readonly Problem[]): ExitCode {
  return problems[0]?.code === 'body-too-small' ? exitCodes.wrongUse : exitCodes.failed;
}

function wordsOf({ study, now, baseline, scanner, targetSnr }: PictureAsk, { notes }: PicturePair): SheetWords {
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

function documentOf(ask: PictureAsk, { preset, now, white, notes }: PicturePair, words: SheetWords): object {
  const { study, scanner, object, targetSnr, out } = ask;
  const facts = ({ columns, rows, columnMm, rowMm }: PicturePair['now']) => ({ columns, rows, columnMm, rowMm });
  return {
    preset: study.id,
    series: ask.now.series.id,
    fieldT: scanner.fieldT,
    file: cleanText(out),
    caption: frameWords,
    object: object.id,
    targetSnr,
    changes: words.title,
    figures: ask.now.evaluation.figures,
    pictures: { preset: facts(preset), now: facts(now), white },
    notes,
  };
}
