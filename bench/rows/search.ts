import { spoiledGradientEchoSignal } from '../../src/calc/signal/spoiled-gradient-echo.js';
import { Bests, bestsWithin } from '../../src/search/bests.js';
import { Pulse } from '../../src/search/control.js';
import { latticeSize } from '../../src/search/lattice.js';
import { mostChanges } from '../../src/search/search.js';
import { tablesOf } from '../../src/search/search-tables.js';
import { settingOf } from '../../src/search/setting.js';
import { WholeLatticeSearch } from '../../src/search/whole-lattice.js';
import type { Row } from '../row.js';
import { type LatticeName, latticeNames, latticeOfSize } from '../search-lattices.js';

/** Largest lattices of the three kinds, and the sizes that show how time grows. */
const largest = 1.2e10;
const sizes = [1e4, 1e6, 1e8, largest];

/** Processor time, ms: what else the machine does is not counted. */
function processorMs(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

function timed(work: () => void): number {
  const start = processorMs();
  work();
  return processorMs() - start;
}

/** One million bare spoiled-gradient-echo signals, ms. */
function millionSignalsMs(): number {
  let sum = 0;
  const once = () => {
    for (let i = 0; i < 1_000_000; i += 1)
      sum += spoiledGradientEchoSignal(3.5 + 0.1 * (i & 63), 1.2, 10 + (i & 7), 800 + 20 * (i & 31), 30);
  };
  once();
  const ms = [timed(once), timed(once), timed(once)].sort((a, b) => a - b)[1] as number;
  if (Number.isNaN(sum)) throw new Error('a measured function gave no number');
  return ms;
}

interface Searched {
  readonly size: number;
  readonly bestsMs: number;
  readonly frontsMs: number;
  readonly formed: number;
}

const known = new Map<string, Searched>();

function searched(name: LatticeName, wanted: number): Searched {
  const key = `${name} ${wanted}`;
  const before = known.get(key);
  if (before !== undefined) return before;
  const { problem } = latticeOfSize(name, wanted);
  const setting = settingOf(problem);
  const pulse = new Pulse({});
  const tables = tablesOf(setting);
  const bestsMs = timed(() => {
    bestsWithin(tables, mostChanges, new Bests(), pulse);
  });
  const frontsMs = timed(() => {
    new WholeLatticeSearch(tables, pulse, { fronts: true, nearest: false, count: false }).run();
  });
  const result = { size: latticeSize(setting.variables), bestsMs, frontsMs, formed: pulse.formed };
  known.set(key, result);
  return result;
}

const words = (size: number) => size.toExponential(1);

export const rows: readonly Row[] = latticeNames.flatMap((name): Row[] => [
  {
    name: `ways formed of a lattice of 10^10, ${name}`,
    against: 'a thousandth of the ways it holds',
    unit: 'us',
    budget: 1,
    measure: async () => {
      const { formed, size } = searched(name, largest);
      return { subject: formed, yardstick: size / 1000, ratio: formed / (size / 1000) };
    },
  },
  {
    name: `bests of a lattice of 10^10, ${name}`,
    against: 'a million bare spoiled gradient-echo signals',
    unit: 'ms',
    budget: 4,
    measure: async () => {
      const { bestsMs } = searched(name, largest);
      const yardstick = millionSignalsMs();
      return { subject: bestsMs, yardstick, ratio: bestsMs / yardstick };
    },
  },
  {
    name: `fronts of a lattice of 10^10, ${name}`,
    against: 'a million bare spoiled gradient-echo signals',
    unit: 'ms',
    budget: 14,
    measure: async () => {
      const { frontsMs } = searched(name, largest);
      const yardstick = millionSignalsMs();
      return { subject: frontsMs, yardstick, ratio: frontsMs / yardstick };
    },
  },
  ...sizes.map(
    (wanted): Row => ({
      name: `growth, ${name}, ${words(wanted)} wanted`,
      against: 'a million bare spoiled gradient-echo signals',
      unit: 'ms',
      budget: null,
      measure: async () => {
        const { bestsMs, frontsMs } = searched(name, wanted);
        const yardstick = millionSignalsMs();
        return { subject: bestsMs + frontsMs, yardstick, ratio: (bestsMs + frontsMs) / yardstick };
      },
    }),
  ),
]);
