import { seriesDifferenceLines } from '../session/difference-page.js';
import { cleanText } from '../study/clean-text.js';
import { recordedDifference } from '../study/preset-diff.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import type { CommandSettings } from './command-settings.js';
import { findRecord } from './find-record.js';
import { pageOf } from './page.js';

/** What a session planned against what it used, as text or JSON. */
export async function recordDifferenceText(
  wanted: string,
  request: CommandRequest,
  settings: CommandSettings,
  io: CommandIo,
): Promise<Attempt<string>> {
  const found = await findRecord(wanted, request.arguments, settings, request.has('reader'), io);
  if (!found.ok) return found;
  const { id, day, preset, series } = found.value;
  const differences = series.map(recordedDifference);
  if (request.has('json')) {
    const side = { preset: preset.id, revision: preset.revision };
    return { ok: true, value: `${JSON.stringify({ record: id, ...side, series: differences }, null, 2)}\n` };
  }
  const page = pageOf(request, io);
  const same = differences.filter(({ kind }) => kind === 'same').map((one) => one.id);
  const lines = [
    cleanText(`Record ${id}, ${day ?? 'day left out'}, preset ${preset.id} revision ${preset.revision}: planned against used`),
    ...differences.flatMap((one) => seriesDifferenceLines(one, { from: 'planned', to: 'used' }, page)),
    ...(same.length === 0 ? [] : ['', cleanText(`as planned: ${same.join(', ')}`)]),
  ];
  return { ok: true, value: page.plain(`${lines.join('\n')}\n`) };
}
