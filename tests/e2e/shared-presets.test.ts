import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { listPresets, presetFolders } from '../../src/store/preset-folder.js';
import { bundledProgram, start } from '../store/child-programs.js';
import { inventedPreset } from '../store/invented-study.js';
import { temporaryFolder } from '../store/temporary-folder.js';

const processes = 8;
const attemptsEach = 50;

/** Each program releases again and again from what it takes for the newest revision, and says how each attempt ended. */
const releasing = `
import { nodeDisk } from '../../src/store/node-disk.js';
import { newestRevision } from '../../src/store/preset-revisions.js';
import { addRevision } from '../../src/store/release-revision.js';
const [folder, name, attempts] = process.argv.slice(2);
for (let i = 0; i < Number(attempts); i += 1) {
  const newest = await newestRevision(nodeDisk, folder, 'shared', 'site');
  if (!newest.ok) { console.log('failed ' + JSON.stringify(newest.problems)); continue; }
  const { study } = newest.value;
  const mine = { ...study, status: 'reviewed', notes: name + ' ' + i };
  const added = await addRevision(nodeDisk, folder, mine, study.revision);
  if (!added.ok) console.log('failed ' + JSON.stringify(added.problems));
  else if (added.value.kind === 'added') console.log('added ' + added.value.revision + ' ' + mine.notes);
  else console.log('taken ' + added.value.newest.study.revision + ' ' + added.value.newest.study.notes);
}
`;

/** Ends itself without warning before a given step of the disk. */
const killedAtStep = `
import { nodeDisk } from '../../src/store/node-disk.js';
import { addRevision } from '../../src/store/release-revision.js';
import { readPreset } from '../../src/study/read-preset.js';
import { readFileSync } from 'node:fs';
const [folder, step] = process.argv.slice(2);
let left = Number(step);
const dying = (object) => new Proxy(object, {
  get: (target, key) => typeof target[key] !== 'function' ? target[key] : async (...args) => {
    if (left === 0) { process.kill(process.pid, 'SIGKILL'); await new Promise(() => {}); }
    left -= 1;
    const result = await target[key](...args);
    return key === 'open' ? dying(result) : result;
  },
});
const read = readPreset(readFileSync(folder + '/shared@1.json', 'utf8'), 'shared@1.json');
const added = await addRevision(dying(nodeDisk), folder, { ...read.value, notes: 'new' }, 1);
console.log(added.ok ? added.value.kind : JSON.stringify(added.problems));
`;

function siteFolder(): string {
  const folder = join(temporaryFolder(), 'site');
  mkdirSync(folder);
  writeFileSync(join(folder, 'shared@1.json'), inventedPreset('shared'));
  return folder;
}

async function listed(folder: string) {
  return listPresets(nodeDisk, presetFolders(folder, '/nonexistent', null));
}

describe('presets shared by several programs', () => {
  it(`of ${processes} programs releasing ${attemptsEach} times each, every accepted save is a revision and every loser is told`, async () => {
    const folder = siteFolder();
    const program = await bundledProgram(temporaryFolder(), releasing);
    const runs = Array.from({ length: processes }, (_, i) => start(program, [folder, `program ${i}`, String(attemptsEach)]));
    const outputs = (await Promise.all(runs.map(({ ended }) => ended))).map(({ output }) => output.trim().split('\n'));

    // Every attempt ended one way or the other.
    expect(outputs.map((lines) => lines.length)).toEqual(Array.from({ length: processes }, () => attemptsEach));
    const all = outputs.flat();
    expect(all.filter((line) => line.startsWith('failed'))).toEqual([]);
    const added = all.filter((line) => line.startsWith('added')).map((line) => /^added (\d+) (.*)$/.exec(line)!.slice(1));
    const taken = all.filter((line) => line.startsWith('taken'));
    expect(added.length + taken.length).toBe(processes * attemptsEach);
    // They did meet: otherwise this proves nothing.
    expect(taken.length).toBeGreaterThan(0);

    // Numbers without a gap and none twice; each file holds what its program was told to have saved.
    const numbers = added.map(([revision]) => Number(revision)).sort((a, b) => a - b);
    expect(numbers).toEqual(Array.from({ length: added.length }, (_, i) => i + 2));
    const { presets, problems } = await listed(folder);
    expect(problems).toEqual([]);
    const notes = new Map(presets.map(({ study }) => [study.revision, study.notes]));
    expect(notes.size).toBe(added.length + 1);
    for (const [revision, words] of added) expect(notes.get(Number(revision))).toBe(words);
    // A loser was shown a revision that is there.
    for (const line of taken) {
      const [, revision, words] = /^taken (\d+) (.*)$/.exec(line)!;
      expect(notes.get(Number(revision))).toBe(words);
    }
    expect(readdirSync(folder).filter((name) => !/^shared@\d+\.json$/.test(name))).toEqual([]);
  });

  it('killed at any step of a release, a folder holds the old revision or that and the whole new one', async () => {
    const program = await bundledProgram(temporaryFolder(), killedAtStep);
    const ends: string[] = [];
    for (let step = 0; ; step += 1) {
      const folder = siteFolder();
      const before = readFileSync(join(folder, 'shared@1.json'));
      const { code, output } = await start(program, [folder, String(step)]).ended;
      const { presets, problems } = await listed(folder);
      expect(problems).toEqual([]);
      expect(readFileSync(join(folder, 'shared@1.json'))).toEqual(before);
      const revisions = presets.map(({ study }) => `${study.revision} ${study.notes}`.trim());
      expect([['1'], ['2 new', '1']]).toContainEqual(revisions);
      ends.push(revisions.length === 1 ? 'old' : 'new');
      // A revision that is there is whole and cannot be written to.
      if (revisions.length === 2) expect(statSync(join(folder, 'shared@2.json')).mode & 0o222).toBe(0);
      if (code === 0) {
        expect(output.trim()).toBe('added');
        break;
      }
    }
    // Both sides of the link were met, and there was no way back.
    expect(ends.length).toBeGreaterThan(10);
    expect(ends.join(' ')).toMatch(/^(old )+(new ?)+$/);
  });
});
