import type { Disk } from './disk.js';
import { maximumDraftBytes, readDraftText } from './draft-text.js';
import { refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';
import { readWhole } from './read-whole.js';
import { setAside } from './set-aside.js';

/** Reads the session of a draft. A damaged draft is kept aside, and the problem says where. */
export async function readDraft(disk: Disk, path: string): Promise<Stored<unknown>> {
  const file = await readWhole(disk, path, 'the draft', maximumDraftBytes);
  if (!file.ok) return file;
  const content = readDraftText(file.value.text);
  if (content.kind === 'session') return { ok: true, value: content.session };
  return refused(content.kind === 'damaged' ? await damaged(disk, path) : ofLaterVersion(path));
}

async function damaged(disk: Disk, path: string): Promise<StoreProblem> {
  const aside = await setAside(disk, path, 'the draft');
  const where = aside.ok && aside.value !== null ? `is kept as ${aside.value}` : 'was left where it is';
  return storeProblem('draft-damaged', 65, path, `a draft is damaged and cannot be gone on with; it ${where}.`, 'Start the session anew.');
}

function ofLaterVersion(path: string): StoreProblem {
  return storeProblem(
    'draft-of-later-version',
    65,
    path,
    'a draft was written by a later version of the program.',
    'Open it with that version.',
  );
}
