import { join } from 'node:path';
import type { Disk } from '../disk.js';
import { problemOfError, type StoreProblem } from '../problem-of-error.js';
import { fileTrouble } from './file-trouble.js';

/** A file, or why a path leads to none. */
export type Found =
  | {
      readonly kind: 'file';
      readonly path: string;
      /** Named by the person, not found in a folder. */
      readonly named: boolean;
    }
  | { readonly kind: 'problem'; readonly problem: StoreProblem };

const mostFolders = 40;

/** A path that is still to be looked at. */
interface Place {
  readonly path: string;
  readonly named: boolean;
  /** A file by what its folder says; everything else is looked at. */
  readonly isFile: boolean;
  /** Identities of the folders around it. */
  readonly above: readonly string[];
}

/**
 * The files that paths lead to, folders gone through from the outside in, names sorted, hidden ones left out. Links are followed;
 * a folder that lies inside itself that way is named and not entered again, one that is reached twice is read once.
 */
export async function* walkFiles(disk: Disk, paths: readonly string[]): AsyncGenerator<Found> {
  const seen = new Set<string>();
  const places: Place[] = paths.map((path) => ({ path, named: true, isFile: false, above: [] })).reverse();
  for (let place = places.pop(); place !== undefined; place = places.pop()) {
    const { path, named, isFile, above } = place;
    if (isFile) {
      yield { kind: 'file', path, named };
      continue;
    }
    try {
      const facts = await disk.facts(path);
      if (facts.kind === 'file') {
        yield { kind: 'file', path, named };
        continue;
      }
      if (facts.kind === 'other') {
        if (named) yield { kind: 'problem', problem: fileTrouble('no-object', path) };
        continue;
      }
      const identity = facts.identity ?? path;
      if (above.includes(identity) || above.length >= mostFolders) {
        yield { kind: 'problem', problem: fileTrouble(above.includes(identity) ? 'loop' : 'too-deep', path) };
        continue;
      }
      if (seen.has(identity)) continue;
      seen.add(identity);
      const inside = (await disk.entries(path)).filter(({ name }) => !name.startsWith('.'));
      const around = [...above, identity];
      for (const { name, kind } of inside.reverse()) {
        places.push({ path: join(path, name), named: false, isFile: kind === 'file', above: around });
      }
    } catch (error) {
      yield { kind: 'problem', problem: problemOfError(error, 'read', 'the path', path) };
    }
  }
}
