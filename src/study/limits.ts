/** Bounds on a preset file: what is larger is refused before it is read. */
export const presetLimits = {
  /** UTF-8 bytes. */
  bytes: 1_000_000,
  /** Objects and lists inside each other. */
  nesting: 20,
  series: 200,
  mustKeeps: 100,
  /** Characters of one text. */
  id: 64,
  title: 120,
  word: 60,
  source: 300,
  notes: 4000,
  /** Characters of one formula: 10 kB and more is refused. */
  formula: 9999,
  /** Tesla: fields that a file may name. */
  fieldT: { min: 0.05, max: 12 },
} as const;

/** Ids of studies and series: they become file names and words of a command line. */
export const idForm = '^[a-z0-9][a-z0-9.-]*$';
