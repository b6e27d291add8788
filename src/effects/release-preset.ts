import type { Answer, Effect } from '../session/message.js';
import { findPreset } from '../store/preset-folder.js';
import { newestRevision } from '../store/preset-revisions.js';
import type { StoreProblem } from '../store/problem-of-error.js';
import { addRevision } from '../store/release-revision.js';
import { readSiteRulesFile } from '../store/site-rules-file.js';
import { checkedStudy } from '../study/checked-study.js';
import { cleanText } from '../study/clean-text.js';
import { isReleasable } from '../study/release-checks.js';
import type { Study } from '../study/study.js';
import type { InterfaceWorld } from './interface-world.js';
import { loadPresets } from './load-presets.js';

/** Checks a study as it would be released: by its own must-keeps, the rules of the site, and against the revision before. */
export async function checkRelease(world: InterfaceWorld, { study }: Extract<Effect, { kind: 'check-release' }>): Promise<Answer> {
  const folder = world.folders.sitePresetsFolder;
  if (folder === null) return noFolder;
  const { disk, folders } = world;
  const newest = await newestRevision(disk, folder, study.id, 'site');
  if (!newest.ok) return failed(newest.problems);
  const site = await readSiteRulesFile(disk, folders.siteRulesFile, folders.settingsFolder, world.parser);
  if (!site.ok) return failed(site.problems);
  const previous = newest.value?.study ?? null;
  const checked = checkedStudy(study, site.value, { fieldT: null, previous }, await world.parser());
  if (!checked.ok) return { kind: 'failed', problems: checked.problems };
  // Who releases it, when and why is what is being typed.
  const findings = checked.value.filter(({ code }) => code !== 'release-not-said');
  return { kind: 'checked', findings, newest: previous };
}

/** Releases a study as the next revision of the site's folder: checked once more, then added, or told that somebody was first. */
export async function releasePreset(world: InterfaceWorld, effect: Extract<Effect, { kind: 'release' }>): Promise<Answer> {
  const { ask, basedOn, said } = effect;
  const folder = world.folders.sitePresetsFolder;
  if (folder === null) return noFolder;
  const study: Study = { ...effect.study, released: { ...said, day: world.today() } };
  const checked = await checkRelease(world, { kind: 'check-release', ask, study });
  if (checked.kind !== 'checked' || !isReleasable(checked.findings)) return checked;
  const added = await addRevision(world.disk, folder, study, basedOn);
  if (!added.ok) return failed(added.problems);
  if (added.value.kind === 'taken')
    return { kind: 'taken', theirs: added.value.newest.study, base: await startOf(world, study.id, basedOn) };
  // Whoever looks at the list sees it from now on.
  world.tell(await loadPresets(world));
  return { kind: 'released', study: added.value.study, path: cleanText(added.value.path) };
}

/** The revision that the changes were made from. */
async function startOf(world: InterfaceWorld, id: string, revision: number): Promise<Study | null> {
  if (revision === 0) return null;
  const found = await findPreset(world.disk, world.presetFolders, `${id}@${revision}`, '/');
  return found.ok && found.value.study.id === id ? found.value.study : null;
}

const noFolder: Answer = {
  kind: 'failed',
  problems: [
    {
      code: 'folder-not-there',
      path: '',
      message: "There is no folder of the site's presets.",
      hint: 'Start with --presets DIR or HOLDFAST_PRESETS.',
    },
  ],
};

function failed(problems: readonly StoreProblem[]): Answer {
  return { kind: 'failed', problems };
}
