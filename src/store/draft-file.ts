import type { Disk } from './disk.js';
import { draftPath, ownerPath, writeOwner } from './draft-owner.js';
import { draftText, maximumDraftBytes } from './draft-text.js';
import { makeFolder } from './make-folder.js';
import { privateFileMode } from './permissions.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { randomId } from './random-id.js';
import { readDraft } from './read-draft.js';
import { type RunningPrograms, runningPrograms } from './running-programs.js';
import { type UnfinishedDrafts, unfinishedDrafts } from './unfinished-drafts.js';
import { writeWhole } from './write-whole.js';

export interface DraftFileOptions {
  readonly disk: Disk;
  /** Version of the program, written into the draft. */
  readonly tool: string;
  readonly folder: string;
  readonly fileMode?: number;
  readonly programs?: RunningPrograms;
  readonly newId?: () => string;
  readonly nowMs?: () => number;
}

/** The one draft of this running program, and the drafts that others left. Calls are carried out one after the other. */
export interface DraftFile {
  /** Saves the session: the file holds the old or the new one whole, whatever happens. */
  save(session: unknown): Promise<Stored<void>>;
  /** Drafts whose program is gone, newest first. */
  unfinished(): Promise<UnfinishedDrafts>;
  /** Takes over a draft that was left; of several programs that try only one succeeds. This program goes on saving to it. */
  claim(id: string): Promise<Stored<unknown>>;
  /** Removes the draft: its session became a record, or nobody wants it. */
  discard(): Promise<Stored<void>>;
  /** Tells other machines that this program still runs; to be called every `heartbeatMs`. */
  beat(): Promise<void>;
  /** Lets go of the draft, which stays and is offered at the next start. Nothing is saved afterwards. */
  leave(): Promise<void>;
}

/** Opens the draft file of this program. Nothing is written before the first save. */
export function draftFile(options: DraftFileOptions): DraftFile {
  const { disk, tool, folder, fileMode = privateFileMode, programs = runningPrograms(), newId = randomId, nowMs = Date.now } = options;
  let id = newId();
  let isMarked = false;
  let hasLeft = false;
  let last: Promise<unknown> = Promise.resolve();

  function inTurn<T>(act: () => Promise<T>): Promise<T> {
    const turn = last.then(act);
    last = turn.catch(() => {});
    return turn;
  }

  async function mark(markedId: string): Promise<Stored<void>> {
    const made = await makeFolder(disk, folder, fileMode, 'drafts');
    return made.ok ? writeOwner(disk, folder, markedId, programs.self, fileMode) : made;
  }

  async function save(session: unknown): Promise<Stored<void>> {
    if (hasLeft) return refused(storeProblem('draft-closed', 74, folder, 'the draft was let go before.', 'Start the program again.'));
    const text = draftText(session, tool);
    if (text.length > maximumDraftBytes) {
      const message = `the draft has ${text.length} characters, expected ${maximumDraftBytes} at most.`;
      return refused(storeProblem('draft-too-long', 74, draftPath(folder, id), message, 'Save the record and start a new session.'));
    }
    if (!isMarked) {
      const marked = await mark(id);
      if (!marked.ok) return marked;
      isMarked = true;
    }
    return writeWhole(disk, draftPath(folder, id), text, fileMode, 'the draft');
  }

  async function claim(wanted: string): Promise<Stored<unknown>> {
    const fresh = newId();
    const marked = await mark(fresh);
    if (!marked.ok) return marked;
    const path = draftPath(folder, fresh);
    try {
      // Renaming to a name that nobody else knows: who comes second finds nothing to rename.
      await disk.rename(draftPath(folder, wanted), path);
    } catch (error) {
      await disk.remove(ownerPath(folder, fresh)).catch(() => {});
      if ((error as { code?: string }).code !== 'ENOENT')
        return refused(problemOfError(error, 'read', 'the draft', draftPath(folder, wanted)));
      return refused(
        storeProblem(
          'draft-taken',
          66,
          draftPath(folder, wanted),
          'the draft is gone: another program has taken it over.',
          'Go on there, or start anew.',
        ),
      );
    }
    await disk.remove(ownerPath(folder, wanted)).catch(() => {});
    const session = await readDraft(disk, path);
    if (!session.ok) {
      await disk.remove(ownerPath(folder, fresh)).catch(() => {});
      return session;
    }
    await letGo();
    id = fresh;
    isMarked = true;
    return session;
  }

  async function letGo(): Promise<void> {
    if (isMarked) await disk.remove(ownerPath(folder, id)).catch(() => {});
    isMarked = false;
  }

  return {
    save: (session) => inTurn(() => save(session)),
    unfinished: () => inTurn(() => unfinishedDrafts(disk, folder, programs, nowMs())),
    claim: (wanted) => inTurn(() => claim(wanted)),
    discard: () => inTurn(() => removed(disk, draftPath(folder, id))),
    beat: () =>
      inTurn(async () => {
        if (isMarked) await disk.touch(ownerPath(folder, id)).catch(() => mark(id));
      }),
    leave: () =>
      inTurn(async () => {
        hasLeft = true;
        await letGo();
      }),
  };
}

async function removed(disk: Disk, path: string): Promise<Stored<void>> {
  try {
    await disk.remove(path);
    return { ok: true, value: undefined };
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return { ok: true, value: undefined };
    return refused(problemOfError(error, 'write', 'the draft', path));
  }
}
