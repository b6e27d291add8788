import type { Problem } from '../calc/problem.js';
import type { PicturePair } from '../picture/picture-pair.js';
import { frameWords, type SheetWords } from '../picture/picture-sheet.js';
import { wrapText } from '../session/wrap-text.js';
import { savePicture } from '../store/save-picture.js';
import { fileModeOf } from '../store/settings.js';
import { cleanText } from '../study/clean-text.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { drawSheet } from './draw-sheet.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';
import { type PictureAsk, readPictureRequest } from './picture-request.js';

/** `holdfast picture`: the preset and the series as it is now, side by side as computed pictures of an invented object, in a PNG. */
export async function runPicture(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const read = await readPictureRequest(request, io);
  if (!read.ok) return complain(read, io);
  const ask = read.value;
  const sheet = drawSheet(ask);
  if (!sheet.ok) return complain({ ok: false, exit: exitOf(sheet.problems, request.has('body')), problems: sheet.problems }, io);
  const { pair, words, bytes } = sheet.value;
  const saved = await savePicture(io.disk, ask.out, bytes, fileModeOf(settings.value.settings), request.has('replace'));
  if (!saved.ok) return complain(refusedByStore(saved.problems), io);
  const page = pageOf(request, io);
  if (request.has('json')) io.write(`${JSON.stringify(documentOf(ask, pair, words), null, 2)}\n`);
  else {
    const lines = [...words.title, frameWords, ...words.figures, ...words.notes, `Written: ${cleanText(ask.out)}`];
    io.write(page.plain(`${lines.flatMap((line) => wrapText(line, page.width)).join('\n')}\n`));
  }
  return exitCodes.done;
}

/** A body that was typed too small is wrong use, an object too large for its own body bad data; a timing or a grid without a picture is a check that failed. */
function exitOf(problems: readonly Problem[], typed: boolean): ExitCode {
  if (problems[0]?.code === 'body-too-small') return typed ? exitCodes.wrongUse : exitCodes.badData;
  return exitCodes.failed;
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
