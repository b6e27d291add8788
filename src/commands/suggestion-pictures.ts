import { unknownBody } from '../calc/body.js';
import { plainScanner } from '../calc/scanner.js';
import { usualTargetSnr } from '../picture/picture-pair.js';
import { presetBaseline, seriesResult } from '../session/series-result.js';
import { objectOfRegion } from '../store/object-folder.js';
import type { Suggestion } from '../study/record-report-suggestion.js';
import { pictureOfVariant, type ReportPicture } from '../study/report-html.js';
import type { Study } from '../study/study.js';
import type { CommandIo } from './command-io.js';
import { type DrawnSheet, drawSheet } from './draw-sheet.js';
import type { CountedRecords } from './records-counted.js';

/** Most pictures of one page: each is a few hundred kilobytes. */
const mostPictures = 8;

/** The sheet of a suggestion: the current revision, and the variant. Null, said in a line, where it cannot be drawn. */
export async function suggestionSheet(study: Study, { series: id, rewrite }: Suggestion, io: CommandIo): Promise<DrawnSheet | null> {
  const series = study.series.find((one) => one.id === id);
  const object = await objectOfRegion(io.disk, await io.shippedPresets(), study.region);
  if (series === undefined || !object.ok) {
    if (!object.ok) io.complain(`holdfast: The picture of ${id} was left out: ${object.problems[0]?.message ?? ''}\n`);
    return null;
  }
  const scanner = plainScanner(study.fieldT);
  const baseline = presetBaseline(series, study.fieldT);
  const now = seriesResult(series, rewrite.set, baseline, { scanner, body: unknownBody, rules: new Map() });
  const drawn = drawSheet({ study, now, baseline, scanner, body: unknownBody, object: object.value, targetSnr: usualTargetSnr });
  if (drawn.ok) return drawn.value;
  io.complain(`holdfast: The picture of ${id} was left out: ${drawn.problems[0]?.message ?? ''}\n`);
  return null;
}

/** Pictures of the suggested variants, for the page of the report, with what they show in words. */
export async function suggestionPictures({ now }: CountedRecords, io: CommandIo): Promise<ReadonlyMap<string, ReportPicture>> {
  const pictures = new Map<string, ReportPicture>();
  for (const { study, suggestions } of now.values()) {
    for (const suggested of suggestions) {
      if (study === null || suggested.kind === 'none' || pictures.size >= mostPictures) continue;
      const sheet = await suggestionSheet(study, suggested.suggestion, io);
      if (sheet === null) continue;
      const { preset, series } = suggested.suggestion;
      pictures.set(pictureOfVariant(preset, series), { pngBase64: Buffer.from(sheet.bytes).toString('base64'), caption: sheet.caption });
    }
  }
  return pictures;
}
