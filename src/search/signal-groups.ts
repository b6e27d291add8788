import type { LineBucket } from './line-buckets.js';
import type { SearchTables } from './search-tables.js';
import type { SignalEntry } from './signal-lists.js';
import type { SignalState } from './signal-state.js';

/** Signal states that play their lines in the same time, and the best that any of them gives. */
export interface SignalGroup {
  /** Most signal of the target first; those without one last. */
  readonly entries: readonly SignalEntry[];
  /** Highest signal of the target; null where one of them has none. */
  readonly target: number | null;
  /** Largest difference of both tissues; null where one of them has none. */
  readonly difference: number | null;
  readonly trainLoss: number;
}

/** Buckets and signals that can all be played together, every line in the same time. */
export interface PlayedTogether {
  readonly buckets: readonly LineBucket[];
  readonly groups: readonly SignalGroup[];
}

/** Buckets of one train that play a count of lines in the same times. */
export interface BucketFamily {
  /** Buckets by what can be played with them: all its groups. */
  readonly classes: readonly PlayedTogether[];
  /** Signals by what they can be played with: all its buckets. */
  readonly envelopes: readonly PlayedTogether[];
}

/** States with the same timing and the same estimates of the shortest: all can be played with a voxel, or none. */
type Cell = readonly SignalEntry[];

interface Growing {
  /** For each cell whether it can be played with these buckets. */
  readonly played: readonly boolean[];
  readonly cells: readonly Cell[];
  readonly buckets: LineBucket[];
}

/** Puts buckets and signals together by what can be played with what: buckets with which nothing can are left out. */
export function bucketFamilies(
  tables: SearchTables,
  buckets: readonly LineBucket[],
  entriesOf: (bucket: LineBucket) => readonly SignalEntry[],
): BucketFamily[] {
  const { shortest } = tables;
  const cellsOfTrain = new Map<string, readonly Cell[]>();
  const playedOfVoxel = new Map<number, { readonly word: string; readonly played: readonly boolean[] }>();
  const families = new Map<string, Map<string, Growing>>();
  for (const bucket of buckets) {
    let cells = cellsOfTrain.get(bucket.train);
    if (cells === undefined) {
      cells = cellsOf(audibleEntries(tables, entriesOf(bucket)));
      cellsOfTrain.set(bucket.train, cells);
    }
    let known = playedOfVoxel.get(bucket.voxelId);
    if (known === undefined) {
      const played = cells.map((cell) => shortest.playable((cell[0] as SignalEntry).state, bucket));
      known = { word: played.map(Number).join(''), played };
      playedOfVoxel.set(bucket.voxelId, known);
    }
    if (!known.played.includes(true)) continue;
    const key = `${bucket.timeId}|${bucket.train}`;
    let family = families.get(key);
    if (family === undefined) {
      family = new Map();
      families.set(key, family);
    }
    const one = family.get(known.word);
    if (one === undefined) family.set(known.word, { played: known.played, cells, buckets: [bucket] });
    else one.buckets.push(bucket);
  }
  const groupsOfWord = new Map<string, readonly SignalGroup[]>();
  return [...families.values()].map((family) => ({
    classes: [...family].map(([word, { played, cells, buckets: own }]) => {
      const key = `${own[0]?.train}:${word}`;
      const groups = groupsOfWord.get(key) ?? groupsOf(cells.filter((_, i) => played[i]).flat());
      groupsOfWord.set(key, groups);
      return { buckets: own, groups };
    }),
    envelopes: envelopesOf([...family.values()]),
  }));
}

/** Cells that can be played with the same of these buckets, put together. */
function envelopesOf(classes: readonly Growing[]): PlayedTogether[] {
  const cells = (classes[0] as Growing).cells;
  const byWord = new Map<string, { readonly buckets: readonly LineBucket[]; readonly cells: Cell[] }>();
  for (const [i, cell] of cells.entries()) {
    const word = classes.map(({ played }) => Number(played[i])).join('');
    const known = byWord.get(word);
    if (known !== undefined) known.cells.push(cell);
    else byWord.set(word, { buckets: classes.filter(({ played }) => played[i]).flatMap(({ buckets }) => buckets), cells: [cell] });
  }
  return [...byWord.values()]
    .filter(({ buckets }) => buckets.length > 0)
    .map(({ buckets, cells: own }) => ({ buckets, groups: groupsOf(own.flat()) }));
}

/** Entries that RF allows and that the bands of SNR and contrast allow with noise low enough. */
function audibleEntries({ join }: SearchTables, entries: readonly SignalEntry[]): SignalEntry[] {
  return entries.filter(({ state }) => {
    if (state.rfRank === 2) return false;
    const { snr, contrast } = join.noise(state, join.signalFreeBefore);
    return join.noiseBands.every(({ figure }) => (figure === 'relativeSnr' ? snr : contrast) !== null);
  });
}

function groupBy(entries: readonly SignalEntry[], keyOf: (state: SignalState) => number): SignalEntry[][] {
  const groups = new Map<number, SignalEntry[]>();
  for (const entry of entries) {
    const key = keyOf(entry.state);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [entry]);
    else group.push(entry);
  }
  return [...groups.values()];
}

/** Cells of entries; of those whose timing differs in dummies alone, and of one cell, only what no other beats. */
function cellsOf(entries: readonly SignalEntry[]): Cell[] {
  const kept = groupBy(entries, ({ shotId, minimumId }) => shotId * 2 ** 24 + minimumId).flatMap(undominated);
  return groupBy(kept, ({ timeId, minimumId }) => timeId * 2 ** 24 + minimumId);
}

/** Groups of entries that can all be played. */
function groupsOf(entries: readonly SignalEntry[]): SignalGroup[] {
  const kept = groupBy(entries, ({ shotId }) => shotId).flatMap(undominated);
  return groupBy(kept, ({ timeId }) => timeId).map((own) => {
    own.sort((a, b) => (b.state.target ?? -1) - (a.state.target ?? -1));
    let target: number | null = 0;
    let difference: number | null = 0;
    let trainLoss = Number.POSITIVE_INFINITY;
    for (const { state } of own) {
      const apart = differenceOf(state);
      target = target === null || state.target === null ? null : Math.max(target, state.target);
      difference = difference === null || apart === null ? null : Math.max(difference, apart);
      trainLoss = Math.min(trainLoss, state.trainLoss);
    }
    return { entries: own, target, difference, trainLoss };
  });
}

function differenceOf({ target, comparison }: SignalState): number | null {
  return target === null || comparison === null ? null : Math.abs(target - comparison);
}

/** Entries that no other beats in signal, contrast, train and dummies; of equal ones the first. */
function undominated(entries: readonly SignalEntry[]): SignalEntry[] {
  if (entries.length === 1) return [...entries];
  const kept: SignalEntry[] = [];
  for (const entry of entries) {
    if (kept.some((other) => dominates(other.state, entry.state))) continue;
    let count = 0;
    for (const other of kept) if (!dominates(entry.state, other.state)) kept[count++] = other;
    kept.length = count;
    kept.push(entry);
  }
  return kept;
}

/** What has no signal or contrast is neither better nor worse than what has: such states are compared among themselves. */
function dominates(a: SignalState, b: SignalState): boolean {
  if (a.trainLoss > b.trainLoss || a.dummyShots > b.dummyShots) return false;
  const first = differenceOf(a);
  const second = differenceOf(b);
  if ((a.target === null) !== (b.target === null) || (first === null) !== (second === null)) return false;
  return (a.target ?? 0) >= (b.target ?? 0) && (first ?? 0) >= (second ?? 0);
}
