import { join } from 'node:path';
import type { Disk } from '../disk.js';
import { problemOfError, type StoreProblem } from '../problem-of-error.js';
import { fileTrouble } from './file-trouble.js';

/** A file to read, or why a path leads to none. */
export type Found =
  | {
      readonly kind: 'file';
      readonly path: string;
      /** Named by the person, not found in a folder. */
      readonly named: boolean;
    }
  | { readonly kind: 'problem'; readonly problem: StoreProblem };

const mostFolders = 40;

/**
 * The files that paths lead to, folders gone through from the outside in, names sorted, hidden ones left out. Links are followed;
 * a folder that lies inside itself that way is named and not entered again, one that is reached twice is read once.
 */
export async function* walkFiles(disk: Disk, paths: readonly string[]): AsyncGenerator<Found> {
  const seen = new Set<string>();
  for (const path of paths) yield* walk(disk, path, { named: true, above: [], seen });
}

interface Place {
  readonly named: boolean;
  /** Identities of the folders around it. */
  readonly above: readonly string[];
  /** Identities of all folders that were entered. */
  readonly seen: Set<string>;
}

async function* walk(disk: Disk, path: string, { named, above, seen }: Place): AsyncGenerator<Found> {
  try {
    const facts = await disk.facts(path);
    if (facts.kind === 'file') {
      yield { kind: 'file', path, named };
      return;
    }
    if (facts.kind === 'other') {
      if (named) yield { kind: 'problem', problem: fileTrouble('no-object', path) };
      return;
    }
    const identity = facts.identity ?? path;
    if (above.includes(identity)) {
      yield { kind: 'problem', problem: fileTrouble('loop', path) };
      return;
    }
    if (above.length >= mostFolders) {
      yield { kind: 'problem', problem: fileTrouble('too-deep', path) };
      return;
    }
    if (seen.has(identity)) return;
    seen.add(identity);
    for (const name of await disk.names(path)) {
      if (name.startsWith('.')) continue;
      yield* walk(disk, join(path, name), { named: false, above: [...above, identity], seen });
    }
  } catch (error) {
    yield { kind: 'problem', problem: problemOfError(error, 'read', 'the path', path) };
  }
}
