import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { recordLine } from '../../src/study/record-line.js';
import { keyBytes } from './harness/key-bytes.js';
import { type Interface, newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();

/** The folder of a site that has one revision of the liver at 3 T. */
function siteFolder(): string {
  const folder = join(newHome(), 'site');
  mkdirSync(folder);
  const study = JSON.parse(readFileSync('presets/liver-3t.json', 'utf8'));
  const released = { role: 'physicist', day: '2026-03-02', reason: 'first revision' };
  writeFileSync(join(folder, 'liver-3t@1.json'), JSON.stringify({ ...study, status: 'reviewed', revision: 1, released }));
  return folder;
}

/** Begins a draft of the newest revision, changes one value of a series, and opens the form of its release. */
async function draftToRelease(screen: Interface, series: string, label: string, typed: string): Promise<void> {
  await screen.program.waitFor('0.55 T');
  await screen.keys(keyBytes.right, 'Presets');
  await screen.keys('3 liver', 'Type to find: 3 liver');
  await screen.keys(keyBytes.enter, /liver-3t: \d+ revisions?/);
  await screen.program.waitFor('first revision');
  await screen.keys('d', 'Draft of revision 1');
  await screen.goTo(`.${series}`);
  await screen.keys(keyBytes.enter, `Series ${series}`);
  await screen.goTo(label);
  await screen.keys(`${typed}${keyBytes.enter}`, '1 changed');
  await screen.keys('o', 'Running order');
  await screen.keys('m', 'now');
  await screen.keys(keyBytes.enter, 'The open session on this preset');
  await screen.keys('r', 'Checks passed');
}

async function sayWho(screen: Interface, role: string, reason: string): Promise<void> {
  await screen.keys(keyBytes.down + keyBytes.down, 'Who releases it, by role');
  await screen.keys(`${keyBytes.enter}${role}${keyBytes.enter}`, `role                ${role}`);
  await screen.keys(`${keyBytes.enter}${reason}${keyBytes.enter}`, `reason              ${reason}`);
}

describe('two people at one site', () => {
  it('both release the same preset: one is first, the other is told, sees the difference and takes the own changes over on top', async () => {
    const site = siteFolder();
    const [anna, ben] = [open(newHome(), ['--presets', site]), open(newHome(), ['--presets', site])];
    await draftToRelease(anna, 't1-3d', 'slices', '70');
    await draftToRelease(ben, 'dwi', 'slices', '28');

    // Nothing goes out by pressing Enter, nor by a word that is nearly the word.
    await anna.keys(keyBytes.enter.repeat(12), 'Not released: the word is RELEASE');
    expect(readdirSync(site)).toEqual(['liver-3t@1.json']);
    await anna.keys(keyBytes.home, 'The id under which');
    await sayWho(anna, 'physicist', 'short holds');
    await sayWho(ben, 'lead technologist', 'fewer slices');
    await anna.keys(`${keyBytes.enter}release${keyBytes.enter}`, 'Not released: the word is RELEASE');
    expect(readdirSync(site)).toEqual(['liver-3t@1.json']);

    await anna.keys(`${keyBytes.enter}RELEASE${keyBytes.enter}`, 'liver-3t revision 2, reviewed; released');
    await ben.keys(`${keyBytes.enter}RELEASE${keyBytes.enter}`, 'NOT RELEASED: physicist was first with revision 2');
    expect(ben.program.text()).toContain('physicist: short holds. Nothing was written.');
    expect(readdirSync(site).sort()).toEqual(['liver-3t@1.json', 'liver-3t@2.json']);

    await ben.keys('d', 'against the draft of revision 1');
    expect(ben.program.text()).toMatch(/slices\s+70\s+72/);
    await ben.escape('NOT RELEASED');
    await ben.keys('t', 'taken over: dwi sliceCount 30 to 28');
    await ben.keys(`${keyBytes.enter}RELEASE${keyBytes.enter}`, 'liver-3t revision 3, reviewed; released');
    expect(readdirSync(site).sort()).toEqual(['liver-3t@1.json', 'liver-3t@2.json', 'liver-3t@3.json']);
    const merged = JSON.parse(readFileSync(join(site, 'liver-3t@3.json'), 'utf8'));
    const slices = (id: string) => merged.series.find((series: { id: string }) => series.id === id).parameters.sliceCount;
    expect([slices('t1-3d'), slices('dwi')]).toEqual([70, 28]);
    expect(merged.released).toMatchObject({ role: 'lead technologist', reason: 'fewer slices' });

    // The first one sees the other's revision without starting anew.
    await anna.escape('Type to find');
    await anna.keys('3 liver', 'Type to find: 3 liver');
    await anna.keys(keyBytes.enter, 'fewer slices');
  });
});

describe('what the records say, in the interface', () => {
  it('lists them, finds by typing, shows one planned against used, and reports what was found', async () => {
    const records = join(newHome(), 'records.jsonl');
    const invented = [...inventedRecords(60, 4)];
    writeFileSync(records, `damaged\n${invented.map((record) => `${recordLine(record)}\n`).join('')}`);
    const screen = open(newHome(), ['--records', records]);
    await screen.program.waitFor('0.55 T');
    await screen.keys(keyBytes.left, '60 of 60 records, 1 damaged line skipped');
    const trainees = invented.filter(({ role }) => role === 'trainee').length;
    await screen.keys('trainee', `${trainees} of 60 records`);
    await screen.keys(keyBytes.enter, /planned against used/);
    await screen.keys(keyBytes.end, /figure\s+planned\s+used/);
    await screen.escape('Type to find: trainee');
    await screen.keys(keyBytes.tab, `Report over ${trainees} of 60 records`);
    await screen.program.waitFor(`${trainees} sessions recorded`);
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });
});
