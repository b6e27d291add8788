import type { Problem } from '../calc/problem.js';
import { cleanText } from '../study/clean-text.js';

/** Exit codes that a failing store asks for (sysexits): bad data, no such input, cannot create, reading or writing failed, bad settings. */
export type StoreExitCode = 65 | 66 | 73 | 74 | 78;

/** A problem that also says which exit code fits it. */
export interface StoreProblem extends Problem {
  readonly exitCode: StoreExitCode;
}

/** A value, or why the store has none. */
export type Stored<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problems: readonly StoreProblem[] };

interface ErrorRow {
  readonly code: string;
  readonly says: string;
  readonly hint: string;
}

/** The system's error codes in plain words. */
const errorTable: Readonly<Record<string, ErrorRow>> = {
  ENOENT: { code: 'not-there', says: 'is not there', hint: 'Check the spelling and the folder.' },
  ENOTDIR: { code: 'not-there', says: 'is not there: a part of the path is a file, not a folder', hint: 'Check the path.' },
  EISDIR: { code: 'is-folder', says: 'is a folder, expected a file', hint: 'Name a file in it.' },
  EEXIST: { code: 'already-there', says: 'is there already and is not overwritten', hint: 'Choose another name.' },
  EACCES: {
    code: 'not-allowed',
    says: 'may not be opened by this user',
    hint: 'Ask whoever owns it for permission, or choose another place.',
  },
  EPERM: {
    code: 'not-allowed',
    says: 'may not be changed by this user',
    hint: 'Ask whoever owns it for permission, or choose another place.',
  },
  EROFS: { code: 'read-only', says: 'is on a read-only disk', hint: 'Choose another place.' },
  ENOSPC: { code: 'disk-full', says: 'was not written: the disk is full', hint: 'Make room, then save again: nothing on screen is lost.' },
  EDQUOT: {
    code: 'disk-full',
    says: 'was not written: the quota of this user is used up',
    hint: 'Make room, then save again: nothing on screen is lost.',
  },
  EFBIG: { code: 'disk-full', says: 'was not written: the file is as large as it may become', hint: 'Start a new file.' },
  EIO: { code: 'disk-error', says: 'failed: the disk reports an error', hint: 'Save to another disk and have this one looked at.' },
  ESTALE: { code: 'disk-error', says: 'failed: the network folder was lost', hint: 'Mount it again, then repeat.' },
  ETIMEDOUT: { code: 'disk-error', says: 'failed: the network folder does not answer', hint: 'Wait for the network, then repeat.' },
  EMFILE: { code: 'too-many-open', says: 'failed: too many files are open', hint: 'Close other programs, then repeat.' },
  ENFILE: { code: 'too-many-open', says: 'failed: too many files are open', hint: 'Close other programs, then repeat.' },
  ELOOP: { code: 'link-loop', says: 'leads round in a circle of links', hint: 'Mend the link.' },
  ENAMETOOLONG: { code: 'name-too-long', says: 'has a name that is too long', hint: 'Choose a shorter one.' },
};

const notInput = new Set(['ENOENT', 'ENOTDIR', 'EISDIR', 'ELOOP', 'ENAMETOOLONG']);

/** What was being done when the disk refused. */
export type Doing = 'read' | 'create' | 'write';

/**
 * What a disk's refusal means to a person: the thing, its path, what happened, what to do, and the exit code
 * (66 nothing there to read, 73 cannot create, 74 reading or writing failed).
 *
 * @param thing What the file is to a person: `record file`, `preset`.
 */
export function problemOfError(error: unknown, doing: Doing, thing: string, path: string): StoreProblem {
  const errno = (error as { code?: unknown } | null)?.code;
  const name = typeof errno === 'string' ? errno : '';
  const row: ErrorRow = errorTable[name] ?? {
    code: 'disk-error',
    says: `failed: ${cleanText(error instanceof Error ? error.message : String(error), 120)}`,
    hint: 'Try again; if it stays, choose another place.',
  };
  return storeProblem(
    row.code,
    exitCodeOf(doing, name),
    path,
    `${thing} ${cleanText(path)} ${row.says}${name === '' ? '' : ` (${name})`}.`,
    row.hint,
  );
}

function exitCodeOf(doing: Doing, errno: string): StoreExitCode {
  if (doing === 'read') return notInput.has(errno) ? 66 : 74;
  return doing === 'create' ? 73 : 74;
}

/** A problem of the store's own finding. */
export function storeProblem(code: string, exitCode: StoreExitCode, path: string, message: string, hint: string): StoreProblem {
  return { code, exitCode, path: cleanText(path), message: `${message.charAt(0).toUpperCase()}${message.slice(1)}`, hint };
}

/** A refusal made of one problem. */
export function refused(problem: StoreProblem): { readonly ok: false; readonly problems: readonly StoreProblem[] } {
  return { ok: false, problems: [problem] };
}
