import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

const shipped = readFileSync('presets/liver-3t.json', 'utf8');

interface LiverFile {
  [key: string]: unknown;
  series: { id: string; parameters: Record<string, unknown> }[];
}

/** Sets values of the dynamic series. */
function dynamic(file: LiverFile, values: Record<string, unknown>): void {
  Object.assign(file.series.find(({ id }) => id === 't1-3d')!.parameters, values);
}

/** The shipped liver preset, changed. */
function liver(change: (file: LiverFile) => void): string {
  const file = JSON.parse(shipped);
  change(file);
  return JSON.stringify(file);
}

/** A site's folder and a person's own file, and the command line that releases it. */
function site(own: string, settings = '{}') {
  const home = temporaryFolder();
  const folder = join(home, 'site');
  mkdirSync(folder);
  mkdirSync(join(home, '.config', 'holdfast'), { recursive: true });
  writeFileSync(join(home, '.config', 'holdfast', 'config.json'), settings);
  const file = join(home, 'mine.json');
  writeFileSync(file, own);
  const release = (...more: string[]) =>
    runCommand(['presets', 'release', file, '--presets', folder, ...more], { homeFolder: home, today: () => '2026-03-02' });
  return { home, folder, file, release, files: () => readdirSync(folder).sort() };
}

const who = ['--role', 'physicist', '--reason', 'short holds'];

describe('presets release', () => {
  it('adds the next revision, reviewed, with who, when and why; everyone sees it', async () => {
    const { folder, release, files } = site(liver((file) => dynamic(file, { averages: 1 })));
    const { exit, out, err } = await release(...who);
    expect([exit, err]).toEqual([0, '']);
    expect(out).toContain('liver-3t revision 2, reviewed; released 2026-03-02 by physicist: short holds');
    expect(files()).toEqual(['liver-3t@2.json']);
    const shown = await runCommand(['presets', 'show', 'liver-3t', '--presets', folder]);
    expect(shown.out.replace(/\s+/g, ' ')).toContain('revision 2, liver, 3 T; released 2026-03-02 by physicist: short holds');
    const listed = await runCommand(['presets', 'list', '--revisions', '--presets', folder]);
    expect(listed.out).toContain('released 2026-03-02 by physicist: short holds');
    const checked = await runCommand(['presets', 'check', join(folder, 'liver-3t@2.json')]);
    expect([checked.exit, checked.err]).toEqual([0, '']);
  });

  it.each([
    [['--reason', 'short holds'], '--role is missing'],
    [['--role', 'physicist'], '--reason is missing'],
    [['--role', 'physicist', '--reason', ' '], '--reason is missing'],
    [['--role', 'physicist', '--reason', 'born 1.2.1950'], 'looks like a date'],
    [['--role', 'physicist', '--second-role', 'Physicist', '--reason', 'x'], 'first one again'],
    [[...who, '--as', 'Liver 3T'], '--as takes an id'],
    [[...who, '--based-on', 'two'], '--based-on takes the number'],
  ])('is never by accident: %j', async (options, message) => {
    const { release, files } = site(shipped);
    const { exit, out, err } = await release(...options);
    expect([exit, out, files()]).toEqual([64, '', []]);
    expect(err).toContain(message);
  });

  it('needs the folder of a site', async () => {
    const { exit, err } = await runCommand(['presets', 'release', 'liver-3t', ...who]);
    expect([exit, err.includes('--presets DIR')]).toEqual([64, true]);
  });

  it('asks for a second role where the settings say so', async () => {
    const { release, files } = site(shipped, '{ "secondRoleToRelease": true }');
    expect((await release(...who)).exit).toBe(64);
    expect(files()).toEqual([]);
    const { exit, out } = await release(...who, '--second-role', 'lead technologist');
    expect([exit, out.includes('by physicist and lead technologist: short holds')]).toEqual([0, true]);
  });

  it('refuses what fails a check: 6 mm beyond the must-keep', async () => {
    const { release, files } = site(liver((file) => dynamic(file, { sliceThicknessMm: 6, sliceCount: 36 })));
    const { exit, out, err } = await release(...who);
    expect([exit, out, files()]).toEqual([1, '', []]);
    expect(err).toContain('failure: t1-3d: voxel, slice 6 mm: must be at most 5 mm');
    expect(err).toContain('Nothing was released');
  });

  it('refuses what crosses a rule of the site, and writes that rule into no preset', async () => {
    const { home, release, files, folder } = site(liver(() => {}));
    const rule = (atMost: number) => ({ mustKeep: { figure: 'voxelSliceMm', atMost, source: 'our site' } });
    const keep = (atMost: number) =>
      writeFileSync(
        join(home, '.config', 'holdfast', 'rules.json'),
        JSON.stringify({ format: 'holdfast rules', version: 1, rules: [rule(atMost)] }),
      );
    keep(2);
    const refused = await release(...who, '--based-on', '0');
    expect([refused.exit, files()]).toEqual([1, []]);
    expect(refused.err).toContain('must be at most 2 mm (our site)');
    keep(20);
    expect((await release(...who, '--based-on', '0')).exit).toBe(0);
    expect(readFileSync(join(folder, files()[0]!), 'utf8')).not.toContain('our site');
  });

  it('tells the loser whose revision is there and what differs, and takes the changes over on top', async () => {
    const { folder, file, release, files } = site(liver((preset) => dynamic(preset, { sliceThicknessMm: 4, sliceCount: 54 })));
    const theirs = join(folder, '..', 'theirs.json');
    writeFileSync(
      theirs,
      liver((preset) => Object.assign(preset, { title: 'Liver, theirs' })),
    );
    const first = await runCommand(
      ['presets', 'release', theirs, '--presets', folder, '--role', 'lead technologist', '--reason', 'new title'],
      {
        today: () => '2026-03-01',
      },
    );
    expect(first.exit).toBe(0);

    const lost = await release(...who);
    expect([lost.exit, lost.out]).toEqual([73, '']);
    expect(lost.err).toContain('Somebody was first: liver-3t revision 2, reviewed; released 2026-03-01 by lead technologist: new title');
    expect(lost.err).toMatch(/slice thickness\s+3 mm\s+4 mm/);
    expect(lost.err).toContain('--based-on 1 --on-top');
    expect(files()).toEqual(['liver-3t@2.json']);

    const won = await release(...who, '--based-on', '1', '--on-top');
    expect([won.exit, won.err]).toEqual([0, '']);
    expect(won.out).toContain('taken over: t1-3d sliceThicknessMm 3 to 4');
    expect(files()).toEqual(['liver-3t@2.json', 'liver-3t@3.json']);
    const merged = JSON.parse(readFileSync(join(folder, 'liver-3t@3.json'), 'utf8'));
    const thickness = (merged as LiverFile).series.find(({ id }) => id === 't1-3d')!.parameters.sliceThicknessMm;
    expect([merged.title, thickness, merged.released.role]).toEqual(['Liver, theirs', 4, 'physicist']);

    // A third person changed the same value to another one: people decide.
    writeFileSync(
      file,
      liver((preset) => dynamic(preset, { sliceThicknessMm: 5, sliceCount: 44 })),
    );
    const conflict = await release(...who, '--based-on', '1', '--on-top');
    expect([conflict.exit, conflict.out, files().length]).toEqual([1, '', 2]);
    expect(conflict.err).toContain('t1-3d sliceThicknessMm was changed by both: yours 5, theirs 4');
  });

  it('a draft of another id says which revision it was made from', async () => {
    const { release, files } = site(liver((file) => Object.assign(file, { id: 'liver-3t-draft' })));
    expect((await release(...who, '--as', 'liver-3t')).exit).toBe(0);
    expect(files()).toEqual(['liver-3t@1.json']);
    const asked = await release(...who, '--as', 'liver-3t');
    expect([asked.exit, asked.err.includes('Write --based-on 1')]).toEqual([64, true]);
    expect((await release(...who, '--as', 'liver-3t', '--based-on', '1')).exit).toBe(0);
    expect(files()).toEqual(['liver-3t@1.json', 'liver-3t@2.json']);
  });

  it('refuses one that says it is newer than anything the site has', async () => {
    const { folder, release } = site(liver((file) => Object.assign(file, { revision: 7 })));
    writeFileSync(
      join(folder, 'liver-3t@3.json'),
      liver((file) => Object.assign(file, { revision: 3 })),
    );
    const { exit, err } = await release(...who);
    expect([exit, err.includes('the newest of the site is 3')]).toEqual([64, true]);
  });
});
