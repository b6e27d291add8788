import { execFile } from 'node:child_process';
import { cpSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const run = promisify(execFile);
const folder = mkdtempSync(join(tmpdir(), 'holdfast-one-row-more-'));

/** Puts text before a place of a source that must be there. */
function putBefore(file: string, place: string, text: string): void {
  const path = join(folder, file);
  const source = readFileSync(path, 'utf8');
  if (source.split(place).length !== 2) throw new Error(`${file} does not have "${place}" once`);
  writeFileSync(
    path,
    source.replace(place, () => text + place),
  );
}

/** An invented figure and an invented class: a row each, a value and a signal, nothing else. */
function addOneOfEach(): void {
  putBefore(
    'src/calc/figures.ts',
    '} as const satisfies',
    "  sliceShareS: { label: 'time of one slice', unit: 's', better: 'lower', digits: 1, help: 'scan time over slices', scale: { place: 1.5, label: 'one slice' } },\n",
  );
  putBefore('src/calc/evaluate.ts', '    cardiacPhases: cine ?', '    sliceShareS: finite(time.scanTimeS / p.sliceCount),\n');
  putBefore('src/calc/classes.ts', "'relativeSnr', 'relativeContrast', 'contrastRatio'", "'sliceShareS', ");
  putBefore(
    'src/calc/classes.ts',
    "  'spin-echo/2D': {",
    `  'invented-gradient-echo/2D': {
    label: 'invented gradient echo', family: 'invented-gradient-echo', acquisition: '2D', interleaving: 'interleaved', train: false, gradientEcho: true, echoPlanar: false,
    parameters: [...common2D, 'flipAngleDeg'],
    figures: [...always, ...shared],
    otherwise: gradientOtherwise,
  },
`,
  );
  putBefore('src/calc/signal/class-signal.ts', "    case 'echo-planar-gradient-echo':", "    case 'invented-gradient-echo':\n");
}

/** A study of one series of the invented class; every value is invented. */
const study = {
  format: 'holdfast preset',
  version: 1,
  id: 'invented',
  title: 'Invented',
  region: 'brain',
  fieldT: 3,
  series: [
    {
      id: 'one',
      title: 'One series',
      family: 'invented-gradient-echo',
      acquisition: '2D',
      target: 'white matter',
      comparison: 'grey matter (cortical)',
      parameters: {
        repetitionTimeMs: 400,
        echoTimeMs: 5,
        flipAngleDeg: 60,
        fieldOfViewMm: 240,
        matrixRead: 256,
        matrixPhase: 256,
        sliceCount: 16,
        sliceThicknessMm: 5,
        pixelBandwidthHz: 200,
      },
    },
  ],
};

/** Runs inside the copy: what commands and the screen make of the study. The first lines fail to compile where types do not follow. */
const probe = `import { readFileSync, writeFileSync } from 'node:fs';
import type { ClassKey, Family } from './src/calc/classes.js';
import type { FigureKey, Figures } from './src/calc/figures.js';
import { run } from './src/commands/run.js';
import { lineText } from './src/screens/line.js';
import { screenLines } from './src/screens/screen-lines.js';
import { openPreset } from './src/session/hands/start-commands.js';
import { initialState } from './src/session/state.js';
import { update } from './src/session/update.js';
import { nodeDisk } from './src/store/node-disk.js';
import { readPreset } from './src/study/read-preset.js';
import { asciiGlyphs } from './src/terminal/glyphs.js';

export const figure: FigureKey & keyof Figures = 'sliceShareS';
export const words: readonly [ClassKey, Family] = ['invented-gradient-echo/2D', 'invented-gradient-echo'];

async function command(...args: string[]): Promise<string> {
  let out = '';
  await run(args, {
    write: (text: string) => { out += text; },
    complain: (text: string) => { out += text; },
    environment: {}, canDraw: false, emphasis: () => (_kind: string, text: string) => text, disk: nodeDisk,
    homeFolder: '/nonexistent-home', workingFolder: process.cwd(), shippedPresets: async () => null, openInterface: null,
  } as unknown as Parameters<typeof run>[1]);
  return out;
}

const read = readPreset(readFileSync('invented.json', 'utf8'), 'invented.json');
if (!read.ok) throw new Error(JSON.stringify(read.problems));
const start = initialState({ role: '', scannerName: '', coilName: '' }, { columns: 160, rows: 50 });
const press = (state: ReturnType<typeof initialState>, name: string) => update(state, { kind: 'key', key: name.length > 1 ? { name } : { name: 'text', text: name }, atMs: 1 })[0];
const series = press(openPreset(start, { study: read.value, hash: 'a'.repeat(64), origin: 'shipped' })[0], 'enter');
const draw = (state: typeof series) => screenLines(state, { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false }).map(lineText).join('\\n');
writeFileSync('seen.json', JSON.stringify({
  page: await command('figures', 'invented.json', 'one'),
  json: JSON.parse(await command('figures', 'invented.json', 'one', '--json')),
  check: await command('presets', 'check', 'invented.json'),
  screen: draw(series),
  why: draw(press(press(series, 'tab'), 'w')),
}));
`;

interface Seen {
  readonly page: string;
  readonly json: { readonly series: readonly { readonly figures: Readonly<Record<string, number | null>> }[] };
  readonly check: string;
  readonly screen: string;
  readonly why: string;
}

describe('one row more in the table of figures, and one in the table of classes', () => {
  let seen: Seen;
  let complaints = '';

  beforeAll(async () => {
    for (const each of ['src', 'scripts', 'package.json']) cpSync(each, join(folder, each), { recursive: true });
    symlinkSync(resolve('node_modules'), join(folder, 'node_modules'));
    addOneOfEach();
    writeFileSync(join(folder, 'invented.json'), JSON.stringify(study));
    writeFileSync(join(folder, 'probe.ts'), probe);
    const { compilerOptions } = JSON.parse(readFileSync('tsconfig.json', 'utf8')) as { compilerOptions: object };
    writeFileSync(join(folder, 'tsconfig.json'), JSON.stringify({ compilerOptions, include: ['src', 'probe.ts'] }));
    const node = (...args: string[]) => run(process.execPath, args, { cwd: folder });
    await node('--import', 'tsx', 'scripts/schema.ts');
    const [types] = await Promise.all([
      node('node_modules/typescript/bin/tsc').then(
        () => '',
        ({ stdout }: { stdout: string }) => stdout,
      ),
      node('--import', 'tsx', 'probe.ts'),
    ]);
    complaints = types;
    seen = JSON.parse(readFileSync(join(folder, 'seen.json'), 'utf8')) as Seen;
  }, 180_000);

  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it('types follow: everything compiles, with the new words in the unions', () => {
    expect(complaints).toBe('');
  });

  it('the schema follows: the class is a word of it, and the committed schema is what it was without', () => {
    expect(readFileSync(join(folder, 'schema/preset.schema.json'), 'utf8')).toContain('"invented-gradient-echo"');
    expect(readFileSync('schema/preset.schema.json', 'utf8')).not.toContain('invented-gradient-echo');
    expect(seen.check).toMatch(/invented/);
  });

  it('columns follow: the page and the JSON of figures have it, in the order of the table, for the classes that give it', () => {
    const figures = seen.json.series[0]?.figures ?? {};
    expect(figures.sliceShareS).toBeCloseTo((figures.scanTimeS as number) / 16, 9);
    expect(seen.page).toMatch(/^time of one slice +6\.4 s/m);
    expect(seen.page.indexOf('time of one slice')).toBeGreaterThan(seen.page.indexOf('opposed phase'));
    expect(seen.page).toContain('invented gradient echo');
  });

  it('the screen follows: the figure has its strip at its place, the class its name', () => {
    expect(seen.screen).toMatch(/one slice [^\n]*6\.4/);
    expect(seen.screen.indexOf('one slice')).toBeLessThan(seen.screen.indexOf('voxel read'));
    expect(seen.screen).toContain('invented gradient echo');
  });

  it('help follows: why says what the figure is', () => {
    expect(seen.why).toContain('scan time over slices');
  });
});
