/**
 * `npm run prove`: do the tests notice when the model is wrong? Changes one number, sign, operator or comparison of src/calc at a
 * time on the way into a bundle of the tests, drawn at random, at least one a file, and runs the tests of the model on it: unit tests
 * first, the slow ones after them, and last, for what nothing else noticed, the golden file, which only says that something moved.
 *
 *   --seed N    the draw (printed; another each time)      --count N    changes to draw, 100
 *   --file TEXT only files whose path holds it             --all        every place once, none drawn
 *   --workers N 1 or 2                                     --list       print the draw and stop
 *   --skip TEXT leaves out test files whose path holds it
 *
 * Ends with 1 when fewer than 95 % are noticed without the golden file, or when an entry of prove-equivalents.json does not stand.
 */
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { type Mutant, mutantsOf } from './prove-mutants.js';
import { MutantRunner, type RunResult } from './prove-runner.js';

/** A change that cannot be noticed, and why. */
interface Equivalent {
  readonly file: string;
  readonly marked: string;
  readonly becomes: string;
  readonly because: string;
}

interface Verdict {
  readonly mutant: Mutant;
  readonly by: string;
  readonly noticed: 'by tests' | 'by the golden file only' | 'not';
}

const root = fileURLToPath(new URL('../', import.meta.url));
const goldenTest = 'tests/calc/golden.test.ts';
const needed = 0.95;

const { values: asked } = parseArgs({
  options: {
    seed: { type: 'string' },
    count: { type: 'string', default: '100' },
    file: { type: 'string', default: '' },
    skip: { type: 'string', multiple: true, default: [] },
    workers: { type: 'string', default: '2' },
    all: { type: 'boolean', default: false },
    list: { type: 'boolean', default: false },
  },
});
const seed = asked.seed === undefined ? Math.floor(Math.random() * 2 ** 31) : Number(asked.seed);

/** Small generator of even numbers in [0, 1), the same on every machine for the same seed. */
function drawing(from: number): () => number {
  let state = from >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

function filesUnder(folder: string, ending: string): string[] {
  return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith(ending))
    .map((name) => `${folder}/${name}`)
    .sort();
}

/** One place of each file, then places of all files alike until there are enough; of each place one change. */
function draw(places: readonly (readonly Mutant[])[], count: number, next: () => number): Mutant[] {
  const pick = <T>(from: readonly T[]): T => from[Math.floor(next() * from.length)] as T;
  const files = [...new Set(places.map((place) => (place[0] as Mutant).file))];
  const chosen = new Set(files.map((file) => pick(places.filter((place) => (place[0] as Mutant).file === file))));
  while (chosen.size < Math.min(count, places.length)) chosen.add(pick(places));
  return [...chosen].map((place) => pick(place));
}

function sameChange(mutant: Mutant, one: Equivalent): boolean {
  return mutant.file === one.file && mutant.marked === one.marked && mutant.becomes === one.becomes;
}

const sources = new Map(filesUnder('src/calc', '.ts').map((file) => [file, readFileSync(join(root, file), 'utf8')]));
const all = [...sources].flatMap(([file, source]) => mutantsOf(file, source));
const places = all.filter((place) => (place[0] as Mutant).file.includes(asked.file));
const equivalents = JSON.parse(readFileSync(join(root, 'scripts/prove-equivalents.json'), 'utf8')) as readonly Equivalent[];
const stale = equivalents.filter((one) => !all.flat().some((mutant) => sameChange(mutant, one)));
const next = drawing(seed);
const mutants = asked.all
  ? places.map((place) => place[Math.floor(next() * place.length)] as Mutant)
  : draw(places, Number(asked.count), next);

console.log(`${all.length} places in ${sources.size} files of src/calc; ${mutants.length} changes, seed ${seed}`);
if (asked.list) {
  for (const mutant of mutants) console.log(`${mutant.file}:${mutant.line}  ${mutant.marked}  becomes ${mutant.becomes}`);
  process.exit(0);
}

const tests = ['tests/calc', 'tests/presets', 'tests/scenarios']
  .flatMap((folder) => {
    try {
      return filesUnder(folder, '.test.ts');
    } catch {
      return [];
    }
  })
  .filter((file) => file !== goldenTest && !asked.skip.some((text) => file.includes(text)));

const runners = Array.from(
  { length: Math.min(2, Math.max(1, Number(asked.workers)), mutants.length) },
  () => new MutantRunner(root, sources),
);
const clear = () => {
  for (const runner of runners) runner.remove();
};
process.once('SIGINT', () => {
  clear();
  process.exit(130);
});

/** Unit tests in one run, what lasts longer in a second: most changes fall in the first. */
async function stages(runner: MutantRunner): Promise<{ readonly quick: string[]; readonly slow: string[]; readonly timeoutMs: number }> {
  const start = performance.now();
  const outcome = await runner.run([...tests, goldenTest], null, 900_000);
  if (outcome.kind !== 'passed') throw new Error(`the tests do not pass on the unchanged source: ${describe(outcome)}`);
  const msOf = (file: string) => outcome.msByFile.get(file) ?? 0;
  const isQuick = (file: string) => msOf(file) < 700 && !file.includes('/bloch/');
  return {
    quick: tests.filter(isQuick),
    slow: tests.filter((file) => !isQuick(file)).sort((a, b) => msOf(a) - msOf(b)),
    // A machine that others use may be slow for a while; a loop that never ends is what this is for.
    timeoutMs: 60_000 + 4 * (performance.now() - start),
  };
}

function describe(outcome: RunResult): string {
  return outcome.kind === 'failed' ? outcome.by : outcome.kind === 'timeout' ? 'no end within the time given' : 'passed';
}

async function judge(
  runner: MutantRunner,
  mutant: Mutant,
  { quick, slow, timeoutMs }: Awaited<ReturnType<typeof stages>>,
): Promise<Verdict> {
  for (const files of [quick, slow, [goldenTest]]) {
    if (files.length === 0) continue;
    const outcome = await runner.run(files, mutant, timeoutMs);
    if (outcome.kind === 'passed') continue;
    return { mutant, by: describe(outcome), noticed: files[0] === goldenTest ? 'by the golden file only' : 'by tests' };
  }
  return { mutant, by: '', noticed: 'not' };
}

function changeLines(mutant: Mutant): string {
  const lines = (sources.get(mutant.file) as string).split('\n');
  const before = lines[mutant.line - 1] as string;
  const after = mutant.marked.replace(`[[${mutant.was}]]`, mutant.becomes);
  return `    - ${before.trim()}\n    + ${after}`;
}

const verdicts: Verdict[] = [];
try {
  const plan = await stages(runners[0] as MutantRunner);
  console.log(`${plan.quick.length} quick test files, ${plan.slow.length} slow ones, then the golden file\n`);
  const waiting = [...mutants];
  await Promise.all(
    runners.map(async (runner) => {
      for (let mutant = waiting.shift(); mutant !== undefined; mutant = waiting.shift()) {
        const verdict = await judge(runner, mutant, plan);
        verdicts.push(verdict);
        const { file, line, was, becomes } = mutant;
        console.log(
          `${verdicts.length}/${mutants.length}  ${verdict.noticed.padEnd(23)} ${file}:${line}  ${was} -> ${becomes === '' ? '(nothing)' : becomes}  ${verdict.by}`,
        );
      }
    }),
  );
} finally {
  clear();
}

const claimed = (verdict: Verdict) => equivalents.find((one) => sameChange(verdict.mutant, one));
const counted = verdicts.filter((verdict) => verdict.noticed === 'by tests' || claimed(verdict) === undefined);
const refuted = verdicts.filter((verdict) => verdict.noticed === 'by tests' && claimed(verdict) !== undefined);
const byTests = counted.filter((verdict) => verdict.noticed === 'by tests').length;
const byAnything = counted.filter((verdict) => verdict.noticed !== 'not').length;
const percent = (part: number) => `${part} of ${counted.length}, ${((100 * part) / counted.length).toFixed(1)} %`;

console.log(`\nseed ${seed}, ${verdicts.length} changes, ${verdicts.length - counted.length} of them claimed to change nothing`);
console.log(`noticed by tests without the golden file: ${percent(byTests)}`);
console.log(`noticed with the golden file:             ${percent(byAnything)}`);
for (const kind of ['by the golden file only', 'not'] as const) {
  const these = counted.filter((verdict) => verdict.noticed === kind);
  if (these.length > 0) console.log(`\n${kind === 'not' ? 'not noticed' : 'noticed by the golden file only'}:`);
  for (const { mutant } of these) console.log(`  ${mutant.file}:${mutant.line}\n${changeLines(mutant)}`);
}
const silent = verdicts.filter((verdict) => !counted.includes(verdict));
if (silent.length > 0) console.log('\nclaimed to change nothing:');
for (const verdict of silent)
  console.log(`  ${verdict.mutant.file}:${verdict.mutant.line}\n${changeLines(verdict.mutant)}\n    because ${claimed(verdict)?.because}`);
for (const { mutant, by } of refuted)
  console.log(`\nclaimed to change nothing, but noticed: ${mutant.file}:${mutant.line} ${mutant.marked} by ${by}`);
for (const one of stale) console.log(`\nclaimed to change nothing, but no longer there: ${one.file} ${one.marked} -> ${one.becomes}`);
if (byTests < needed * counted.length || refuted.length > 0 || stale.length > 0) process.exitCode = 1;
