import { resolve } from 'node:path';
import { readQuantity } from '../formulas/read-quantity.js';
import { usualTargetSnr } from '../picture/picture-pair.js';
import { presetBaseline, seriesResult } from '../session/series-result.js';
import { objectOfRegion, readObjectPath } from '../store/object-folder.js';
import { shownValue } from '../study/clean-text.js';
import { readSetValues } from '../study/set-values.js';
import { type Attempt, wrongUse } from './attempt.js';
import { chooseScanner } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import type { SheetAsk } from './draw-sheet.js';
import { exitCodes } from './exit-codes.js';
import { loadJudgedPreset } from './load-judged-preset.js';
import { refusedByStore } from './load-preset.js';
import { parameterOfOtherClass } from './parameter-of-other-class.js';
import { readBody, readField } from './read-named-numbers.js';
import { seriesNamed } from './series-named.js';

/** What `holdfast picture` is asked for, read and checked. */
export interface PictureAsk extends SheetAsk {
  /** Path of the PNG. */
  readonly out: string;
}

/** Reads the command line of `holdfast picture`: preset, series, values, field or scanner, body, object, and where the picture goes. */
export async function readPictureRequest(request: CommandRequest, io: CommandIo): Promise<Attempt<PictureAsk>> {
  const out = request.value('out');
  if (out === undefined || !/\.png$/i.test(out)) {
    const given = out === undefined ? 'it is missing' : `${shownValue(out)} was given`;
    return wrongUse('--out', `--out takes the name of a PNG file; ${given}.`, 'Write --out picture.png.');
  }
  const [wanted = '', seriesId = ''] = request.arguments;
  const loaded = await loadJudgedPreset(wanted, request, io);
  if (!loaded.ok) return loaded;
  const { study, rules } = loaded.value;
  const found = seriesNamed(study, seriesId);
  if (!found.ok) return found;
  const series = found.value;
  const field = readField(request.value('field'));
  if (!field.ok) return field;
  const chosen = await chooseScanner(request, io, study, field.value ?? study.fieldT);
  if (!chosen.ok) return chosen;
  const body = readBody(request.value('body'));
  if (!body.ok) return body;
  const targetSnr = readTargetSnr(request.value('snr'));
  if (!targetSnr.ok) return targetSnr;
  const set = readSetValues(request.values('set'), series);
  if (!set.ok) return { ok: false, exit: exitCodes.wrongUse, problems: set.problems };
  const foreign = parameterOfOtherClass(series, set.value);
  if (foreign !== null) return foreign;
  const path = request.value('object');
  const object =
    path === undefined
      ? await objectOfRegion(io.disk, await io.shippedPresets(), study.region)
      : await readObjectPath(io.disk, resolve(io.workingFolder, path));
  if (!object.ok) return refusedByStore(object.problems);
  const { scanner } = chosen.value;
  const baseline = presetBaseline(series, study.fieldT);
  const now = seriesResult(series, set.value, baseline, { scanner, body: body.value, rules });
  return {
    ok: true,
    value: {
      study,
      now,
      baseline,
      scanner,
      body: body.value,
      object: object.value,
      targetSnr: targetSnr.value,
      out: resolve(io.workingFolder, out),
    },
  };
}

/** Reads the assumed signal to noise of the preset's target. */
function readTargetSnr(text: string | undefined): Attempt<number> {
  if (text === undefined) return { ok: true, value: usualTargetSnr };
  const read = readQuantity(text, '');
  if (read.ok && read.value >= 1 && read.value <= 1000) return { ok: true, value: read.value };
  return wrongUse('--snr', `--snr takes a number from 1 to 1000; ${shownValue(text)} was given.`, `Write --snr ${usualTargetSnr}.`);
}
