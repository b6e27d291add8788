import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { bundleBareInk } from '../bare/bundle-bare-ink.js';
import { type DrivenProgram, type DriveOptions, drive, type KeyAnswer } from '../drive-program.js';
import { median, percentile } from '../median.js';
import type { Measured, Row } from '../row.js';

const size = { columns: 100, rows: 30 } as const;
const enter = '\r';
const up = '\u001b[A';
const down = '\u001b[B';
const escapeKey = '\u001b';

/** A program that was started, and when a frame was there that this is about. */
interface Started {
  readonly program: DrivenProgram;
  readonly firstFrameMs: number;
}

const folder = mkdtempSync(join(tmpdir(), 'holdfast-bench-'));
process.once('exit', () => rmSync(folder, { recursive: true, force: true }));

let bundled: Promise<void> | null = null;

/** The bare ink program, its first frame drawn. */
async function bare(): Promise<Started> {
  const file = join(folder, 'bare-ink.mjs');
  bundled ??= bundleBareInk(file);
  await bundled;
  const program = drive(file, [], size);
  return { program, firstFrameMs: await program.shows('ready') };
}

let homes = 0;

/** The program in a home of its own, on the series screen of a liver series. */
async function seriesScreen(options: Partial<DriveOptions> = {}): Promise<Started> {
  if (!existsSync('dist/holdfast.js')) throw new Error('dist/holdfast.js is not there: npm run build makes it');
  homes += 1;
  const env = { HOME: join(folder, `home-${homes}`), COLORTERM: 'truecolor', ...options.env };
  const program = drive('dist/holdfast.js', [], { ...size, ...options, env });
  // The first screen narrows by typing; whoever knows the way types ahead.
  await program.shows('holdfast');
  program.press(`3 liver${enter}${enter}`);
  const firstFrameMs = await program.shows('Series t1-3d');
  await program.silence();
  return { program, firstFrameMs };
}

/** The program in a home of its own, its first screen drawn with all presets on it. */
async function firstScreen(): Promise<Started> {
  homes += 1;
  const env = { HOME: join(folder, `home-${homes}`), COLORTERM: 'truecolor' };
  const program = drive('dist/holdfast.js', [], { ...size, env });
  return { program, firstFrameMs: await program.shows('0.55 T') };
}

async function closing<T>({ program }: Started, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } finally {
    program.close();
  }
}

function ratioOf(subject: readonly number[], yardstick: readonly number[]): Measured {
  return { subject: median(subject), yardstick: median(yardstick), ratio: median(subject) / median(yardstick) };
}

/** Starts both several times in turns. */
async function starts(start: () => Promise<Started>, figureOf: (started: Started) => number): Promise<Measured> {
  const ours: number[] = [];
  const theirs: number[] = [];
  for (let round = 0; round < 7; round += 1) {
    const a = await start();
    ours.push(await closing(a, async () => figureOf(a)));
    const b = await bare();
    theirs.push(await closing(b, async () => figureOf(b)));
  }
  return ratioOf(ours, theirs);
}

/** Keys of a person who works on the series screen: over the lines, steps both ways, undo, redo, panes, the chart and back. */
function mixedKeys(count: number): readonly string[] {
  const cycle = [
    down,
    '+',
    '-',
    down,
    '+',
    '+',
    'u',
    'r',
    down,
    down,
    '-',
    '+',
    up,
    '\t',
    down,
    '\t',
    '\t',
    'c',
    '+',
    '+',
    '-',
    '\u001b',
    up,
    '-',
    'u',
    'w',
    '\u001b',
  ];
  return Array.from({ length: count }, (_, i) => cycle[i % cycle.length] as string);
}

async function answers(program: DrivenProgram, keys: readonly string[]): Promise<readonly KeyAnswer[]> {
  const all: KeyAnswer[] = [];
  for (const key of keys) all.push(await program.key(key));
  return all;
}

const msOf = (all: readonly KeyAnswer[]) => all.flatMap(({ ms }) => (ms === null ? [] : [ms]));

async function keypress(count: number): Promise<Measured> {
  const a = await seriesScreen();
  const b = await bare();
  return closing(a, () =>
    closing(b, async () => {
      const keys = mixedKeys(count);
      const ours: number[] = [];
      const theirs: number[] = [];
      // In turns of a hundred, so that a slow stretch of the machine weighs on both.
      for (let from = 0; from < count; from += 100) {
        const some = keys.slice(from, from + 100);
        const answered = await answers(a.program, some);
        // A lone Escape waits 50 ms on purpose, to be told from a key that begins with it.
        ours.push(...msOf(answered.filter((_, i) => some[i] !== escapeKey)));
        theirs.push(
          ...msOf(
            await answers(
              b.program,
              Array.from({ length: 50 }, () => 'x'),
            ),
          ),
        );
      }
      const subject = percentile(ours, 0.95);
      const yardstick = percentile(theirs, 0.95);
      return { subject, yardstick, ratio: subject / yardstick };
    }),
  );
}

/** Steps of a value that each ask for new pictures, with pictures beside the series and without, on a screen that is wide enough for them. */
async function keypressBesidePictures(count: number): Promise<Measured> {
  const wide = { columns: 160, rows: 50 };
  const a = await seriesScreen(wide);
  const b = await seriesScreen(wide);
  return closing(a, () =>
    closing(b, async () => {
      a.program.press('s');
      await a.program.shows('mm wide');
      await answers(a.program, ['k', '\u001b']);
      const ours: number[] = [];
      const theirs: number[] = [];
      const steps = Array.from({ length: 20 }, (_, i) => (i % 2 === 0 ? '+' : '-'));
      for (let from = 0; from < count; from += steps.length) {
        ours.push(...msOf(await answers(a.program, steps)));
        theirs.push(...msOf(await answers(b.program, steps)));
      }
      const subject = percentile(ours, 0.95);
      const yardstick = percentile(theirs, 0.95);
      return { subject, yardstick, ratio: subject / yardstick };
    }),
  );
}

/** Most bytes that one of these keys had written, after others that led there. */
async function mostBytes(before: readonly string[], keys: readonly string[]): Promise<Measured> {
  const a = await seriesScreen();
  return closing(a, async () => {
    await answers(a.program, before);
    const bytes = (await answers(a.program, keys)).map((answer) => answer.bytes);
    const most = Math.max(...bytes);
    return { subject: most, yardstick: null, ratio: most };
  });
}

/** From the first line of the series screen to its slice count. */
const toSlices = Array.from({ length: 7 }, () => down);

function bytesRow(name: string, budget: number | null, before: readonly string[], keys: readonly string[]): Row {
  return { name: `bytes of a key at 100x30: ${name}`, against: '', unit: 'bytes', budget, measure: () => mostBytes(before, keys) };
}

/** Heap after garbage collection. */
async function heapMb(file: string): Promise<number> {
  rmSync(file, { force: true });
  writeFileSync(`${file}-ask`, '');
  for (let i = 0; i < 400; i += 1) {
    await new Promise((resolve) => setTimeout(resolve, 25));
    if (existsSync(file) && readFileSync(file, 'utf8').endsWith('\n')) return Number(readFileSync(file, 'utf8')) / 2 ** 20;
  }
  throw new Error('the program did not say how large its heap is');
}

async function heapGrowth(few: number, many: number): Promise<Measured> {
  const file = join(folder, 'heap');
  const probe = pathToFileURL(resolve('bench/bare/heap-probe.mjs'));
  const a = await seriesScreen({ node: ['--expose-gc', '--import', probe.href], env: { HEAP_FILE: file, HEAP_ASK: `${file}-ask` } });
  return closing(a, async () => {
    // In bursts, as under key repeat; Escape alone, since a terminal sends other keys that begin with it. Help and back after each
    // burst, seen on the screen, says that all of it has been worked through.
    const burst = [down, '+', '-', down, '+', 'u', 'r', up, '\t', down, '\t', '\t', '-', '+', down, 'n'].join('').repeat(4);
    const press = async (keys: number) => {
      for (let pressed = 0; pressed < keys; pressed += 64) {
        a.program.press(burst);
        await a.program.silence();
        a.program.press('h');
        await a.program.shows('Help');
        await a.program.silence();
        a.program.press('\u001b');
        await a.program.shows('Series ');
      }
    };
    await press(few);
    const after = await heapMb(file);
    await press(many - few);
    const late = await heapMb(file);
    return { subject: late, yardstick: after, ratio: late / after };
  });
}

/** What a person waits for, and what a slow line carries. */
export const rows: readonly Row[] = [
  {
    name: 'first frame of the first screen',
    against: 'of a bare ink program',
    unit: 'ms',
    budget: 1.25,
    measure: () => starts(firstScreen, ({ firstFrameMs }) => firstFrameMs),
  },
  {
    name: 'first frame of the series screen, from the start of the program, the way there typed ahead',
    against: 'first frame of a bare ink program',
    unit: 'ms',
    budget: 1.25,
    measure: () => starts(seriesScreen, ({ firstFrameMs }) => firstFrameMs),
  },
  {
    name: 'memory on the series screen',
    against: 'of a bare ink program',
    unit: 'MB',
    budget: 1.3,
    measure: () => starts(seriesScreen, ({ program }) => program.memoryMb() ?? Number.NaN),
  },
  {
    name: 'key to frame written, 95 of 100, 2,000 mixed keys at 100x30, Escape aside',
    against: 'a bare ink program that changes one number',
    unit: 'ms',
    budget: 2,
    measure: () => keypress(2000),
  },
  {
    name: 'key to frame written, 95 of 100, while the picture beside the series is drawn anew for every key, 160x50',
    against: 'the same keys without pictures',
    unit: 'ms',
    budget: 2,
    measure: () => keypressBesidePictures(400),
  },
  bytesRow('one number', 60, ['1'], ['2', '3', '4']),
  bytesRow('a step of the slice count, the series changed before', 300, [...toSlices, '-', '-'], ['-', '-', '+', '-']),
  bytesRow('the first change of a dynamic series, with the caution it brings and takes away', null, toSlices, ['-', '+', '-', '+']),
  bytesRow('a range chart that shifts', 1000, ['c'], ['+', '+', '-', '+']),
  bytesRow('a new screen', 4500, [], ['p', 'o', 'e', 'h']),
  {
    name: 'heap after 40,000 keys',
    against: 'after 4,000',
    unit: 'MB',
    budget: 1.2,
    measure: () => heapGrowth(4000, 40000),
  },
];
