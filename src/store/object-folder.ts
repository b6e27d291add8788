import { basename, dirname, join } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import { type ObjectFile, objectLimits } from '../study/object-file.js';
import { readObjectFile } from '../study/read-object-file.js';
import type { Disk } from './disk.js';
import { problemOfError, refused, type Stored, storeProblem } from './problem-of-error.js';
import { readWhole } from './read-whole.js';

/** Reads one object file; exit code 65 where it is wrong, 66 where it is not there. */
export async function readObjectPath(disk: Disk, path: string): Promise<Stored<ObjectFile>> {
  const whole = await readWhole(disk, path, 'the object file', objectLimits.bytes);
  if (!whole.ok) return whole;
  const read = readObjectFile(whole.value.text, basename(path));
  return read.ok ? read : { ok: false, problems: read.problems.map((problem) => ({ ...problem, exitCode: 65 })) };
}

/** The shipped object of a body region, upper and lower case alike; the one for any region where it has none. */
export async function objectOfRegion(disk: Disk, shippedPresets: string | null, region: string): Promise<Stored<ObjectFile>> {
  const folder = join(dirname(shippedPresets ?? ''), 'objects');
  let names: string[];
  try {
    names = shippedPresets === null ? [] : await disk.names(folder);
  } catch (error) {
    return refused(problemOfError(error, 'read', 'the folder of objects', folder));
  }
  let otherwise: ObjectFile | null = null;
  for (const name of names.filter((one) => one.endsWith('.json') && !one.startsWith('.'))) {
    const read = await readObjectPath(disk, join(folder, name));
    if (!read.ok) return read;
    if (read.value.regions.some((one) => plainWord(one) === plainWord(region))) return read;
    if (read.value.regions.length === 0) otherwise = read.value;
  }
  if (otherwise !== null) return { ok: true, value: otherwise };
  const message = `there is no object for the region ${cleanText(region, 60)} in ${cleanText(folder)}.`;
  return refused(storeProblem('object-not-there', 66, folder, message, 'Name an object file.'));
}

function plainWord(word: string): string {
  return word.trim().toLowerCase();
}
