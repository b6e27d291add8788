import { releaseWords } from '../session/difference-page.js';
import { textTable } from '../session/text-table.js';
import { currentRevisions, listPresets, type StoredPreset } from '../store/preset-folder.js';
import { cleanText } from '../study/clean-text.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { missingFolder, refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';

const originWords: Readonly<Record<StoredPreset['origin'], string>> = { site: 'site', own: 'saved here', shipped: 'shipped', file: 'file' };

/** `holdfast presets list`: what can be named. Files that are wrong are told on standard error and do not stop the others. */
export async function runPresetsList(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const folders = settings.value.presetFolders;
  const listing = await listPresets(io.disk, folders);
  const { problems } = listing;
  const presets = request.has('revisions') ? listing.presets : currentRevisions(listing.presets);
  const folderIsMissing = missingFolder(problems, folders);
  if (folderIsMissing !== undefined && request.has('presets')) return complain(refusedByStore([folderIsMissing]), io);
  if (problems.length > 0) complain(refusedByStore(problems), io);
  const page = pageOf(request, io);
  const columns = [
    { title: 'preset', align: 'left' },
    { title: 'field', align: 'point' },
    { title: 'status', align: 'left' },
    { title: 'revision', align: 'right' },
    { title: 'from', align: 'left' },
    { title: 'title', align: 'left' },
    ...(request.has('revisions') ? ([{ title: 'released', align: 'left' }] as const) : []),
  ] as const;
  const rows = presets.map(({ study, origin }) => [
    study.id,
    `${study.fieldT} T`,
    study.status,
    String(study.revision),
    originWords[origin],
    cleanText(study.title),
    ...(request.has('revisions') ? [cleanText(releaseWords(study).replace(/^; /, ''))] : []),
  ]);
  io.write(page.plain(`${textTable(columns, rows, page.reader).join('\n')}\n`));
  return exitCodes.done;
}
