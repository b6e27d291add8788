import { join } from 'node:path';
import { cleanText } from '../study/clean-text.js';
import type { Disk } from './disk.js';
import { makeFolder } from './make-folder.js';
import { problemOfError, refused, type Stored, type StoreProblem, storeProblem } from './problem-of-error.js';
import { readWhole } from './read-whole.js';
import { setAside } from './set-aside.js';
import { defaultSettings, fileModeOf, type Settings } from './settings.js';
import { settingProblems } from './settings-checks.js';

const maximumSettingsBytes = 100_000;

export interface ReadSettings {
  readonly settings: Settings;
  /** What a person should be told although the program goes on: a damaged file was kept aside. */
  readonly notes: readonly StoreProblem[];
}

export function settingsPath(folder: string): string {
  return join(folder, 'config.json');
}

/**
 * Reads the settings. No file means the defaults. A file that is damaged (no JSON object) is kept aside as `config.json.damaged-N`,
 * which is said, and the defaults hold; one with unknown keys or wrong values is left as it is and refused with exit code 78.
 */
export async function readSettings(disk: Disk, folder: string): Promise<Stored<ReadSettings>> {
  const path = settingsPath(folder);
  const file = await readWhole(disk, path, 'the settings', maximumSettingsBytes);
  if (!file.ok) {
    const problem = file.problems[0]!;
    if (problem.code === 'not-there') return { ok: true, value: { settings: defaultSettings, notes: [] } };
    return problem.code === 'too-large' ? keptAside(disk, path) : refused({ ...problem, exitCode: 78 });
  }
  const given = objectOf(file.value.text);
  if (given === null) return keptAside(disk, path);
  const problems = settingProblems(given, cleanText(path));
  return problems.length > 0 ? { ok: false, problems } : { ok: true, value: { settings: { ...defaultSettings, ...given }, notes: [] } };
}

/** Sets some of the settings and leaves the others as they are; the file is replaced whole. */
export async function changeSettings(disk: Disk, folder: string, changes: Partial<Settings>): Promise<Stored<ReadSettings>> {
  const path = settingsPath(folder);
  const problems = settingProblems(changes as Record<string, unknown>, cleanText(path));
  if (problems.length > 0) return { ok: false, problems };
  const before = await readSettings(disk, folder);
  if (!before.ok) return before;
  const settings = { ...before.value.settings, ...changes };
  const made = await makeFolder(disk, folder, fileModeOf(settings), 'settings');
  if (!made.ok) return made;
  try {
    // Loaded on the first change: most runs change no setting, and the first frame should not wait for it.
    const { default: Conf } = await import('conf');
    const file = new Conf<Record<string, unknown>>({
      cwd: folder,
      configName: 'config',
      configFileMode: fileModeOf(settings),
      accessPropertiesByDotNotation: false,
    });
    file.set(changes);
  } catch (error) {
    return refused(problemOfError(error, 'write', 'the settings', path));
  }
  return { ok: true, value: { settings, notes: before.value.notes } };
}

function objectOf(text: string): Record<string, unknown> | null {
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Record<string, unknown>) : null;
  } catch {
    return null;
  }
}

async function keptAside(disk: Disk, path: string): Promise<Stored<ReadSettings>> {
  const aside = await setAside(disk, path, 'the settings');
  const where = aside.ok && aside.value !== null ? `it is kept as ${cleanText(aside.value)}` : 'it was left where it is';
  const note = storeProblem(
    'settings-damaged',
    78,
    path,
    `the settings ${cleanText(path)} are damaged; ${where}, and the defaults hold.`,
    'Set them again.',
  );
  return { ok: true, value: { settings: defaultSettings, notes: [note] } };
}
