import { readFileSync } from 'node:fs';
import { Bests, bestsWithin } from '../src/search/bests.js';
import { Pulse } from '../src/search/control.js';
import { latticeSize } from '../src/search/lattice.js';
import { mostChanges, search } from '../src/search/search.js';
import { tablesOf } from '../src/search/search-tables.js';
import { settingOf } from '../src/search/setting.js';
import { WholeLatticeSearch } from '../src/search/whole-lattice.js';
import { bareSignal } from './bare-signal.js';
import { type LatticeName, latticeOfSize } from './search-lattices.js';

/** What one search took, processor ms. */
export interface SearchTimes {
  /** Of the thread that searches, its tables made anew. */
  readonly bestsMs: number;
  readonly frontsMs: number;
  /** The same of all threads: what compiles and what collects garbage run beside it. */
  readonly allMs: number;
  /** A million bare signals right before and after each. */
  readonly bestsYardstickMs: number;
  readonly frontsYardstickMs: number;
}

/** What searching one lattice took, in a process of its own. */
export interface SearchedOnce {
  readonly size: number;
  readonly formed: number;
  /** The first search of the process, most of it before the code is compiled. */
  readonly first: SearchTimes;
  /** The middle of the next three, as the yardstick is: compiled. */
  readonly next: SearchTimes;
}

/** Processor time of this thread, which neither a busy machine nor helpers stretch, ms; of all threads where the system does not say. */
function threadMs(): number {
  try {
    return Number(readFileSync('/proc/thread-self/schedstat', 'utf8').split(' ')[0]) / 1e6;
  } catch {
    return processMs();
  }
}

function processMs(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

let sum = 0;

function millionSignals(): void {
  for (let i = 0; i < 1_000_000; i += 1) sum += bareSignal(i);
}

function timed(work: () => void): { readonly ownMs: number; readonly allMs: number } {
  const [own, all] = [threadMs(), processMs()];
  work();
  return { ownMs: threadMs() - own, allMs: processMs() - all };
}

/** The middle of three: a million signals take as long as a few scheduling turns. */
function yardstickMs(): number {
  const times = [0, 1, 2].map(() => timed(millionSignals).ownMs).sort((a, b) => a - b);
  return times[1] as number;
}

function timesOf(name: LatticeName, wanted: number): SearchedOnce {
  const { problem } = latticeOfSize(name, wanted);
  let formed = 0;
  let size = 0;
  const searched = (): SearchTimes => {
    const pulse = new Pulse({});
    const before = yardstickMs();
    let tables = null as ReturnType<typeof tablesOf> | null;
    const bests = timed(() => {
      const setting = settingOf(problem);
      size = latticeSize(setting.variables);
      tables = tablesOf(setting);
      bestsWithin(tables, mostChanges, new Bests(), pulse);
    });
    const between = yardstickMs();
    const fronts = timed(() => {
      new WholeLatticeSearch(tables as ReturnType<typeof tablesOf>, pulse, { fronts: true, nearest: false, count: false }).run();
    });
    const after = yardstickMs();
    formed = pulse.formed;
    return {
      bestsMs: bests.ownMs,
      frontsMs: fronts.ownMs,
      allMs: bests.allMs + fronts.allMs,
      bestsYardstickMs: (before + between) / 2,
      frontsYardstickMs: (between + after) / 2,
    };
  };
  millionSignals();
  const first = searched();
  const all = [searched(), searched(), searched()];
  if (Number.isNaN(sum)) throw new Error('a measured function gave no number');
  const middle = (of: keyof SearchTimes) => all.map((one) => one[of]).sort((a, b) => a - b)[1] as number;
  const next: SearchTimes = {
    bestsMs: middle('bestsMs'),
    frontsMs: middle('frontsMs'),
    allMs: middle('allMs'),
    bestsYardstickMs: middle('bestsYardstickMs'),
    frontsYardstickMs: middle('frontsYardstickMs'),
  };
  return { size, formed, first, next };
}

/** Memory that a whole search takes at its peak beyond what the process had before, MB. */
function memoryOf(name: LatticeName, wanted: number): { readonly peakMb: number } {
  const { problem } = latticeOfSize(name, wanted);
  const before = process.memoryUsage.rss();
  const { proven } = search(problem);
  if (!proven) throw new Error('the search was not through');
  return { peakMb: (process.resourceUsage().maxRSS * 1024 - before) / 2 ** 20 };
}

/** Run by `rows/search.ts` in a process of its own: what is asked, which lattice, how many ways. */
const [what, name, wanted] = process.argv.slice(2);
const once = what === 'memory' ? memoryOf : timesOf;
process.stdout.write(JSON.stringify(once(name as LatticeName, Number(wanted))));
