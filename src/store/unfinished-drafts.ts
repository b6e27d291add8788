import type { Disk } from './disk.js';
import { draftPath, isForsaken, ownerPath } from './draft-owner.js';
import { problemOfError, type StoreProblem } from './problem-of-error.js';
import { readDraft } from './read-draft.js';
import type { RunningPrograms } from './running-programs.js';

/** A session that was left unfinished. */
export interface UnfinishedDraft {
  readonly id: string;
  readonly session: unknown;
  /** How long ago it was saved last. */
  readonly ageMs: number;
}

export interface UnfinishedDrafts {
  /** Newest first. */
  readonly drafts: readonly UnfinishedDraft[];
  /** Damaged drafts, which were kept aside, and what could not be read. */
  readonly problems: readonly StoreProblem[];
}

/** A mark that is being written (`.owner.tmp`) belongs to a program that has just started: it is left alone. */
const draftName = /^draft-([0-9a-z]+)\.(json|json\.tmp|owner)$/;

/** Drafts of programs that are gone; what such programs left half-written is cleared away. */
export async function unfinishedDrafts(disk: Disk, folder: string, programs: RunningPrograms, nowMs: number): Promise<UnfinishedDrafts> {
  const names = await disk.names(folder).catch((error: unknown) => problemOfError(error, 'read', 'the folder of drafts', folder));
  if (!Array.isArray(names)) return { drafts: [], problems: names.code === 'not-there' ? [] : [names] };

  const drafts: UnfinishedDraft[] = [];
  const problems: StoreProblem[] = [];
  const ids = new Set(names.flatMap((name) => draftName.exec(name)?.[1] ?? []));
  for (const id of ids) {
    if (!(await isForsaken(disk, folder, id, programs, nowMs))) continue;
    const path = draftPath(folder, id);
    const ageMs = nowMs - (await disk.facts(path).catch(() => ({ modifiedMs: nowMs }))).modifiedMs;
    const session = await readDraft(disk, path);
    if (session.ok) drafts.push({ id, session: session.value, ageMs: Math.max(0, ageMs) });
    else problems.push(...session.problems.filter(({ code }) => code !== 'not-there'));
    await clearAway(disk, [`${path}.tmp`, ...(session.ok ? [] : [ownerPath(folder, id)])]);
  }
  drafts.sort((a, b) => a.ageMs - b.ageMs);
  return { drafts, problems };
}

async function clearAway(disk: Disk, paths: readonly string[]): Promise<void> {
  for (const path of paths) await disk.remove(path).catch(() => {});
}
