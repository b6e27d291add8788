import { afterAll, describe, expect, it } from 'vitest';
import { type ClassKey, classKeys } from '../../src/calc/classes.js';
import { Bests, bestsWithin } from '../../src/search/bests.js';
import { grain, wayKinds } from '../../src/search/candidate.js';
import { Pulse } from '../../src/search/control.js';
import { judgePoint } from '../../src/search/judge.js';
import { latticeSize } from '../../src/search/lattice.js';
import { mostChanges } from '../../src/search/search.js';
import { tablesOf } from '../../src/search/search-tables.js';
import { settingOf } from '../../src/search/setting.js';
import { WholeLatticeSearch } from '../../src/search/whole-lattice.js';
import { enumerate, nameOf } from './plain-enumeration.js';
import { Random } from './random.js';
import { randomProblem } from './random-problem.js';

// HOLDFAST_PROOF=long: a thousand lattices in all, up to 2 x 10^5 points.
const long = process.env['HOLDFAST_PROOF'] === 'long';
const latticesPerClass = long ? Math.ceil(1000 / classKeys.length) : Number(process.env['HOLDFAST_PROOF_LATTICES'] ?? 40);
const smallest = 100;
const largest = long ? 2e5 : 5e3;
const sizes: number[] = [];
let within = 0;

/** The seed of a lattice says all of it: a failure names it. */
function proveOne(key: ClassKey, seed: number): void {
  const random = new Random(seed);
  const wanted = Math.exp(random.between(Math.log(smallest), Math.log(largest)));
  let setting = settingOf(randomProblem(key, random, wanted));
  // Steps that the table refuses can leave a lattice smaller than any is meant to be: then another is drawn.
  while (latticeSize(setting.variables) < smallest) setting = settingOf(randomProblem(key, random, wanted));
  const said = `${key}, seed ${seed}: ${setting.variables.map(({ key: name, values }) => `${name} x ${values.length}`).join(', ')}`;
  const plain = enumerate(setting);
  expect(setting.variables.length, said).toBeGreaterThanOrEqual(5);
  expect(latticeSize(setting.variables), said).toBe(plain.size);
  sizes.push(plain.size);
  if (plain.fewest !== null) within += 1;

  const pulse = new Pulse({});
  const tables = tablesOf(setting);
  const bests = new Bests();
  let most = Math.min(mostChanges, setting.variables.length);
  bestsWithin(tables, most, bests, pulse);
  while (!bests.any && most < setting.variables.length) {
    most += 1;
    bestsWithin(tables, most, bests, pulse);
  }
  for (const kind of wayKinds) {
    for (const rank of [0, 1] as const) {
      const best = bests.best(kind, rank);
      const expected = plain.best.get(nameOf(kind, rank)) ?? null;
      // Not only the same point: every number the search compared is the one `evaluate` gives.
      expect(best, `${said}; ${nameOf(kind, rank)}`).toEqual(expected);
    }
  }

  const whole = new WholeLatticeSearch(tables, pulse, { fronts: true, nearest: true, count: true });
  whole.run();
  expect(whole.result().fitting, `${said}; fitting`).toBe(plain.fitting);
  // Where fronts alone are asked for, signals that cannot be on them are not formed.
  const fronts = new WholeLatticeSearch(tables, pulse, { fronts: true, nearest: false, count: false });
  fronts.run();
  for (const { timeSnr, timeLoss } of [whole, fronts]) {
    expect(
      timeSnr.points.map(({ timeS, value }) => [timeS, grain(value)]),
      `${said}; time and SNR`,
    ).toEqual(plain.timeSnr);
    expect(
      timeLoss.points.map(({ timeS, value }) => [timeS, -grain(value)]),
      `${said}; time and loss`,
    ).toEqual(plain.timeLoss);
    for (const { point, timeS, value } of timeSnr.points) {
      const judged = judgePoint(setting, point);
      expect([judged.isWay, judged.candidate.timeS, judged.candidate.snr], said).toEqual([true, timeS, value]);
    }
    for (const { point, timeS, value } of timeLoss.points) {
      const judged = judgePoint(setting, point);
      expect([judged.isWay, judged.candidate.timeS, judged.candidate.loss], said).toEqual([true, timeS, value]);
    }
  }
}

describe('the search equals plain enumeration with evaluate', () => {
  it.each(classKeys)('%s', { timeout: 3_600_000 }, (key) => {
    for (let i = 0; i < latticesPerClass; i += 1) proveOne(key, classKeys.indexOf(key) * 100_000 + i + 1);
  });

  afterAll(() => {
    sizes.sort((a, b) => a - b);
    const middle = sizes[sizes.length >> 1];
    console.log(
      `proof: ${sizes.length} lattices of ${sizes[0]} to ${sizes.at(-1)} points (median ${middle}, ${sizes.reduce((a, b) => a + b, 0)} in all); something fits in ${within}`,
    );
  });
});
