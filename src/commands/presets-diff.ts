import { dirname } from 'node:path';
import { differencePage } from '../session/difference-page.js';
import { revisionBefore } from '../store/preset-revisions.js';
import { studyDifference } from '../study/preset-diff.js';
import type { Study } from '../study/study.js';
import { type Attempt, refuse, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { type CommandSettings, commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { type LoadedPreset, loadPreset } from './load-preset.js';
import { pageOf } from './page.js';
import { recordDifferenceText } from './records-diff.js';

/**
 * `holdfast presets diff A B`: two presets or two revisions, parameters and figures side by side; A alone against the revision before
 * it; `--record ID` what a session planned against what it used.
 */
export async function runPresetsDiff(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const text = await differenceText(request, settings.value, io);
  if (!text.ok) return complain(text, io);
  io.write(text.value);
  return exitCodes.done;
}

async function differenceText(request: CommandRequest, settings: CommandSettings, io: CommandIo): Promise<Attempt<string>> {
  const record = request.value('record');
  if (record !== undefined) return recordDifferenceText(record, request, settings, io);
  const [first, second] = request.arguments;
  if (first === undefined) return wrongUse('A', 'Two presets are needed, or --record.', 'Write holdfast presets diff A B.');
  const a = await loadPreset(first, settings.presetFolders, io);
  if (!a.ok) return a;
  const b = second === undefined ? await earlierRevision(a.value, io) : await loadPreset(second, settings.presetFolders, io);
  if (!b.ok) return b;
  // A alone is the newer of the two: what it changed is read from the revision before it.
  const [from, to] = second === undefined ? [b.value.study, a.value.study] : [a.value.study, b.value.study];
  if (request.has('json')) return { ok: true, value: differenceJson(from, to) };
  const page = pageOf(request, io);
  return { ok: true, value: page.plain(`${differencePage(from, to, page).join('\n')}\n`) };
}

async function earlierRevision({ study, path, origin }: LoadedPreset, io: CommandIo): Promise<Attempt<{ readonly study: Study }>> {
  const before = await revisionBefore(io.disk, dirname(path), study, origin);
  if (before !== null) return { ok: true, value: before };
  return refuse(exitCodes.noInput, {
    code: 'preset-not-there',
    path: study.id,
    message: `${study.id} revision ${study.revision} has no revision before it in its folder.`,
    hint: 'Name two presets: holdfast presets diff A B.',
  });
}

function differenceJson(a: Study, b: Study): string {
  const side = ({ id, revision, status, fieldT, released }: Study) => ({
    preset: id,
    revision,
    status,
    fieldT,
    released: released ?? null,
  });
  const { head, series } = studyDifference(a, b);
  return `${JSON.stringify({ from: side(a), to: side(b), head, series }, null, 2)}\n`;
}
