import { chmodSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { decode } from 'fast-png';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { nodeDisk } from '../../src/store/node-disk.js';
import { runCommand } from './run-command.js';

let here = '';
beforeEach(() => {
  here = mkdtempSync(join(tmpdir(), 'holdfast-'));
});
afterEach(() => rmSync(here, { recursive: true, force: true }));
const out = () => join(here, 'picture.png');
/** The quickest series of the shipped presets to draw. */
const quick = ['picture', 'liver-3t', 'dwi'];
const draw = (...more: string[]) => runCommand([...quick, ...more, '--out', out()]);

describe('picture', () => {
  it('writes a PNG that says what it is, and says beside it what changed', async () => {
    const { exit, out: said, err } = await draw('--set', 'sliceThicknessMm=3');
    expect([exit, err]).toEqual([0, '']);
    expect(said).toContain('liver-3t, dwi: slice thickness 6 mm to 3 mm.');
    expect(said.replace(/\n/g, ' ')).toContain('Illustration of the model, computed from an invented object. Never an image of a patient.');
    expect(said).toContain("SNR: 50 % of the preset's");
    const png = decode(readFileSync(out()));
    expect(png.width).toBe(944);
    expect(png.text.Description).toContain('Never an image of a patient');
    expect(new Set(png.data).size).toBeGreaterThan(60);
  });

  it('says where acceleration cannot unfold, and where a body is drawn larger than typed', async () => {
    const wide = await draw('--body', 'AP=400,RL=430', '--json');
    expect((JSON.parse(wide.out) as { notes: string[] }).notes.join(' ')).toContain('acceleration cannot unfold that');
    const small = await draw('--body', 'AP=160,RL=210', '--json', '--replace');
    const { notes } = JSON.parse(small.out) as { notes: string[] };
    expect(notes).toContain('The body is drawn larger than typed: the shapes inside need the room.');
    expect(notes.join(' ')).not.toContain('unfold that');
  });

  it('--json gives one document', async () => {
    const { exit, out: said } = await draw('--set', 'parallelFactorPhase=3', '--json');
    expect(exit).toBe(0);
    const document = JSON.parse(said) as Record<string, unknown>;
    expect(document).toMatchObject({ preset: 'liver-3t', series: 'dwi', fieldT: 3, file: out(), object: 'liver', targetSnr: 20 });
    expect(document.caption).toContain('invented object');
    expect((document.figures as { relativeSnr: number }).relativeSnr).toBeLessThan(0.9);
  });

  it('is the same picture each time', async () => {
    await draw();
    const first = readFileSync(out());
    expect((await draw('--replace')).exit).toBe(0);
    expect(readFileSync(out()).equals(first)).toBe(true);
  });

  it('never overwrites without --replace: 73', async () => {
    writeFileSync(out(), 'mine');
    const { exit, out: said, err } = await draw();
    expect([exit, said]).toEqual([73, '']);
    expect(err).toContain('is there already and is not overwritten');
    expect(err).toContain('--replace');
    expect(readFileSync(out(), 'utf8')).toBe('mine');
  });

  it('--replace does not take the place of a folder: 73', async () => {
    mkdirSync(out());
    expect((await draw('--replace')).exit).toBe(73);
  });

  it('says where it may not write, or where there is no folder: 73', async () => {
    const denied = {
      ...nodeDisk,
      open: (path: string, how: Parameters<typeof nodeDisk.open>[1], mode?: number) =>
        how === 'new' ? Promise.reject(Object.assign(new Error('denied'), { code: 'EACCES' })) : nodeDisk.open(path, how, mode),
    };
    const refused = await runCommand([...quick, '--out', out()], { disk: denied });
    expect(refused.exit).toBe(73);
    expect(refused.err).toContain('may not be opened by this user (EACCES)');
    expect(existsSync(out())).toBe(false);
    const nowhere = await runCommand([...quick, '--out', join(here, 'no', 'such', 'a.png')]);
    expect(nowhere.exit).toBe(73);
    expect(nowhere.err).toContain('is not there');
  });

  it.skipIf(process.getuid?.() === 0)('a real folder without permission: 73', async () => {
    chmodSync(here, 0o500);
    expect((await draw()).exit).toBe(73);
    chmodSync(here, 0o700);
  });

  it.each([
    [[], 64, '--out takes the name of a PNG file; it is missing'],
    [['--out', 'a.jpg'], 64, '--out takes the name of a PNG file; "a.jpg" was given'],
    [['--out', 'a.png', '--set', 'echoTimeMs=-1'], 64, 'echoTimeMs'],
    [['--out', 'a.png', '--set', 'flipAnglDeg=3'], 64, 'flipAnglDeg'],
    [['--out', 'a.png', '--body', 'AP=30'], 64, 'A body of 350 x 30 mm is too small'],
    [['--out', 'a.png', '--snr', '0'], 64, '--snr takes a number from 1 to 1000; "0" was given'],
    [['--out', 'a.png', '--field', '99'], 64, '--field'],
    [['--out', 'a.png', '--object', 'nowhere.json'], 66, 'is not there'],
    [['--out', 'a.png', '--set', 'repetitionTimeMs=50'], 1, 'There is no picture: TE is not shorter than TR'],
    [
      [
        '--out',
        'a.png',
        '--set',
        'matrixRead=4096',
        '--set',
        'matrixPhase=2048',
        '--set',
        'echoTimeMs=4000',
        '--set',
        'repetitionTimeMs=9000',
      ],
      1,
      'samples were asked for',
    ],
  ] as const)('%j ends with %i', async (more, exit, words) => {
    const ran = await runCommand([...quick, ...more], { workingFolder: here });
    expect([ran.exit, ran.out]).toEqual([exit, '']);
    expect(ran.err).toContain(words);
    expect(existsSync(join(here, 'a.png'))).toBe(false);
  });

  it('a series or preset that is not there: 66', async () => {
    expect((await runCommand(['picture', 'liver-3t', 'dwy', '--out', out()])).exit).toBe(66);
    expect((await runCommand(['picture', 'lver-3t', 'dwi', '--out', out()])).exit).toBe(66);
  });

  it('an object file of your own is read, a wrong one is refused: 65', async () => {
    const own = join(here, 'own.json');
    const knee = readFileSync('objects/knee.json', 'utf8');
    writeFileSync(own, knee.replace('"id": "knee"', '"id": "mine"'));
    expect((await draw('--object', own)).out.replace(/\n/g, ' ')).toContain('Written:');
    writeFileSync(own, knee.replace('"halfAxesMm": [32, 38]', '"halfAxesMm": [-32, 38]'));
    const negative = await draw('--object', own, '--replace');
    expect(negative.exit).toBe(65);
    expect(negative.err).toMatch(/own\.json, line \d+, shapes\.1\.halfAxesMm\.1: -32 was given/);
    const many = Array.from({ length: 10_000 }, (_, i) => `{"id":"e${i}","tissue":"CSF","atMm":[0,0],"halfAxesMm":[1,1]}`);
    writeFileSync(own, knee.replace('"shapes": [', `"shapes": [${many.join(',')},`));
    const endless = await draw('--object', own, '--replace');
    expect(endless.exit).toBe(65);
    expect(endless.err).toMatch(/own\.json has \d+ bytes or more, expected 200000 at most/);
    writeFileSync(own, knee.replace('"leftRightMm": 125', '"leftRightMm": 40'));
    const narrow = await draw('--object', own, '--replace');
    expect(narrow.exit).toBe(65);
    expect(narrow.err).toContain('is too small for');
    writeFileSync(own, knee.replaceAll('synovial fluid', 'synovial liquid'));
    const unknown = await draw('--object', own, '--replace');
    expect(unknown.exit).toBe(65);
    expect(unknown.err).toContain('"synovial liquid" was given');
  });
});
