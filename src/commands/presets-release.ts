import { loadParser } from '../formulas/load-parser.js';
import { differencePage, releaseText } from '../session/difference-page.js';
import { newestRevision } from '../store/preset-revisions.js';
import { addRevision } from '../store/release-revision.js';
import { checkedStudy } from '../study/checked-study.js';
import { cleanText } from '../study/clean-text.js';
import { findingLine } from '../study/finding-line.js';
import { idForm } from '../study/limits.js';
import { isReleasable } from '../study/release-checks.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { type CommandSettings, commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { loadPreset, refusedByStore } from './load-preset.js';
import { loadSiteRules } from './load-site-rules.js';
import { pageOf } from './page.js';
import { ownChangesOnTop } from './presets-release-on-top.js';
import { readField } from './read-named-numbers.js';
import { readRelease } from './read-release.js';

/**
 * `holdfast presets release`: checks a preset, then adds it to the site's folder as its next revision, reviewed, with role, reason and
 * day. Whoever comes second is told whose revision is there and what differs; `--on-top` takes the own changes over onto it.
 */
export async function runPresetsRelease(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const done = await release(request, settings.value, io);
  return done.ok ? done.value : complain(done, io);
}

async function release(
  request: CommandRequest,
  { settings, folders, presetFolders }: CommandSettings,
  io: CommandIo,
): Promise<Attempt<ExitCode>> {
  const folder = folders.sitePresetsFolder;
  if (folder === null)
    return wrongUse('--presets', "There is no folder of the site's presets.", 'Name it by --presets DIR or HOLDFAST_PRESETS.');
  const released = readRelease(request, settings.secondRoleToRelease, io);
  if (!released.ok) return released;
  const field = readField(request.value('field'));
  if (!field.ok) return field;
  const loaded = await loadPreset(request.arguments[0] ?? '', presetFolders, io);
  if (!loaded.ok) return loaded;
  const id = request.value('as') ?? loaded.value.study.id;
  if (!new RegExp(idForm).test(id))
    return wrongUse('--as', `--as takes an id; "${cleanText(id, 60)}" was given.`, 'Use small letters, digits, dots and dashes.');

  const newest = await newestRevision(io.disk, folder, id, 'site');
  if (!newest.ok) return refusedByStore(newest.problems);
  const start = startingRevision(request, id, loaded.value.study, newest.value?.study.revision ?? null);
  if (!start.ok) return start;
  const mine = { ...loaded.value.study, id };
  const base = start.value === 0 ? null : await loadPreset(`${id}@${start.value}`, presetFolders, io);

  const onTop =
    request.has('on-top') && newest.value !== null && newest.value.study.revision > start.value
      ? ownChangesOnTop(base, mine, newest.value.study)
      : ({ ok: true, value: { study: mine, words: [] } } as const);
  if (!onTop.ok) return onTop;
  const basedOn = request.has('on-top') ? Math.max(start.value, newest.value?.study.revision ?? 0) : start.value;
  const study = { ...onTop.value.study, status: 'reviewed', revision: basedOn + 1, released: released.value } as const;

  const previous = newest.value?.study ?? (base?.ok === true ? base.value.study : null);
  const site = await loadSiteRules(folders, io);
  if (!site.ok) return site;
  const checked = checkedStudy(study, site.value, { fieldT: field.value, previous }, await loadParser());
  if (!checked.ok) return { ...checked, exit: exitCodes.failed };
  for (const finding of checked.value) io.complain(`holdfast: ${findingLine(finding)}\n`);
  if (!isReleasable(checked.value)) {
    io.complain('holdfast: Nothing was released: a check failed. Mend the preset, then release again.\n');
    return { ok: true, value: exitCodes.failed };
  }

  const added = await addRevision(io.disk, folder, study, basedOn);
  if (!added.ok) return refusedByStore(added.problems);
  const page = pageOf(request, io);
  if (added.value.kind === 'taken') {
    const theirs = added.value.newest.study;
    io.complain(
      `holdfast: Somebody was first: ${releaseText(theirs)}. Nothing was written. What differs from it to yours:\n` +
        `${differencePage(theirs, { ...mine, revision: start.value }, page).join('\n')}\n` +
        `To take your changes over on top of revision ${theirs.revision}: the same command with --based-on ${start.value} --on-top.\n`,
    );
    return { ok: true, value: exitCodes.cannotCreate };
  }
  for (const line of onTop.value.words) io.write(page.plain(`${line}\n`));
  io.write(page.plain(`${releaseText(added.value.study)}\n${cleanText(added.value.path)}\n`));
  return { ok: true, value: exitCodes.done };
}

/** The revision that a preset was made from: as said, else as its file says. */
function startingRevision(
  request: CommandRequest,
  id: string,
  own: { readonly id: string; readonly revision: number },
  newest: number | null,
): Attempt<number> {
  const given = request.value('based-on');
  if (given !== undefined) {
    if (/^\d{1,7}$/.test(given)) return { ok: true, value: Number(given) };
    return wrongUse('--based-on', `--based-on takes the number of a revision; "${cleanText(given, 40)}" was given.`, 'Write --based-on 2.');
  }
  if (own.id !== id) {
    if (newest === null) return { ok: true, value: 0 };
    const message = `${own.id} does not say which revision of ${id} it was made from; the newest is ${newest}.`;
    return wrongUse('--based-on', message, `Write --based-on ${newest} if it was made from that one.`);
  }
  if (newest !== null && own.revision > newest) {
    const message = `${id} says that it is revision ${own.revision}; the newest of the site is ${newest}.`;
    return wrongUse('--based-on', message, `Write --based-on ${newest} if it was made from that one.`);
  }
  return { ok: true, value: own.revision };
}
