import { join, resolve } from 'node:path';
import type { CollectedSeries } from '../headers/collected-series.js';
import { type ReadSeries, readSeries } from '../headers/read-series.js';
import { SeriesCollector } from '../headers/series-collector.js';
import type { Answer, Effect } from '../session/message.js';
import { namelessTrouble } from '../store/dicom/file-trouble.js';
import { type HeadersRead, readHeaders } from '../store/dicom/read-headers.js';
import type { HeaderReading } from './header-reading.js';
import type { InterfaceWorld } from './interface-world.js';

/** How long a reading runs before its progress is said, and how often then, ms. */
const quietMs = 200;
const everyMs = 100;
/** Keys get their turn after this much work, ms. */
const turnMs = 8;

/** What was read last in a world: another class of a series is read from it. */
const collected = new WeakMap<object, readonly CollectedSeries[]>();

/**
 * Reads the headers of a folder that a person typed, piece by piece: keys go on between two pieces. Nothing that it answers names a
 * file, since a file may be called after a person. Null where another reading took its place.
 */
export async function readFolder(
  world: InterfaceWorld,
  { ask, path }: Extract<Effect, { kind: 'read-headers' }>,
  now: HeaderReading,
): Promise<Answer | null> {
  const place = await placeOf(world, path);
  if ('says' in place) return failed('folder-not-there', place.says, '');
  const collector = new SeriesCollector();
  const kinds = new Map<string, number>();
  const tell = fileTeller(world, ask);
  const pause = turnTaker();
  const counts = await readHeaders(world.disk, [place.path], {
    header: (header) => collector.add(header),
    problem: ({ code }) => void kinds.set(code, (kinds.get(code) ?? 0) + 1),
    progress: tell,
    isStopped: () => now.ended !== 'no',
    pause,
  });
  if (now.ended === 'replaced') return null;
  const notes = [...kinds].map(([code, files]) => namelessTrouble(code, files));
  if (collector.leftOut > 0) notes.push(`${collector.leftOut} images are left out: there are more series than are told apart`);
  const isStopped = now.ended === 'stopped';
  if (counts.read === 0) return failed('no-headers', nothingRead(counts, notes, isStopped), 'Name the folder that holds them.');
  const all = collector.series();
  const series: ReadSeries[] = [];
  for (const [at, one] of all.entries()) {
    series.push(readSeries(one, `s${at + 1}`));
    await pause();
  }
  collected.set(world, all);
  return { kind: 'headers', found: { ...counts, series, notes, isStopped } };
}

/** One series of what was read last, as of a class that a person chose; of its own class where none was. */
export function classHeaders(world: InterfaceWorld, { id, key }: Extract<Effect, { kind: 'class-headers' }>): Answer {
  const one = collected.get(world)?.[Number(id.slice(1)) - 1];
  if (one === undefined) return failed('series-not-there', `No series ${id} was read.`, 'Read the folder again.');
  return { kind: 'header-series', series: readSeries(one, id, key ?? undefined) };
}

function failed(code: string, message: string, hint: string): Answer {
  return { kind: 'failed', problems: [{ code, path: '', message, hint }] };
}

function nothingRead({ files }: HeadersRead, notes: readonly string[], isStopped: boolean): string {
  if (isStopped) return 'Stopped before the first header.';
  const others = notes.length === 0 ? '' : ` (${notes.join('; ')})`;
  return `No MR object and no sidecar among ${files} ${files === 1 ? 'file' : 'files'}${others}.`;
}

/** Where a typed path leads: quotes round it and blanks written as a shell writes them are no part of it. */
async function placeOf(world: InterfaceWorld, typed: string): Promise<{ readonly path: string } | { readonly says: string }> {
  const bare = typed.trim().replace(/^(['"])(.*)\1$/, '$2');
  let says = '';
  for (const each of new Set([bare, bare.replace(/\\(.)/g, '$1')])) {
    const whole = each === '~' || each.startsWith('~/') ? join(world.homeFolder, each.slice(1)) : each;
    const path = resolve(world.workingFolder, whole);
    try {
      await world.disk.facts(path);
      return { path };
    } catch (error) {
      const code = (error as { code?: string }).code ?? '';
      says ||= ['ENOENT', 'ENOTDIR'].includes(code) ? 'Nothing is there under this path.' : `This path cannot be looked at (${code}).`;
    }
  }
  return { says };
}

/** Says how many files were read: from a while after the beginning on, and not with every file. */
function fileTeller(world: InterfaceWorld, ask: number): (files: number) => void {
  let toldMs = performance.now() + quietMs - everyMs;
  return (files) => {
    const nowMs = performance.now();
    if (nowMs - toldMs < everyMs) return;
    toldMs = nowMs;
    world.tell({ kind: 'counted', ask, files });
  };
}

/** Waits a turn of the event loop once there was work for a while. */
function turnTaker(): () => Promise<void> | null {
  let sinceMs = performance.now();
  return () => {
    if (performance.now() - sinceMs < turnMs) return null;
    return new Promise((done) => {
      setImmediate(() => {
        sinceMs = performance.now();
        done();
      });
    });
  };
}
