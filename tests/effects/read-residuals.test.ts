import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inventedRecords } from '../../scripts/invented-records.js';
import { openWorld } from '../../src/effects/open-world.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import type { SessionRecord } from '../../src/study/record.js';
import { recordLine } from '../../src/study/record-line.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { readTime, twelveTimes } from '../study/read-times.js';

async function worldWith(records: Iterable<SessionRecord> | null, more = '') {
  const home = temporaryFolder();
  const file = join(home, 'records.jsonl');
  if (records !== null) writeFileSync(file, [...records].map((record) => `\n${recordLine(record)}\n`).join('') + more);
  return openWorld({
    disk: nodeDisk,
    environment: {},
    homeFolder: home,
    workingFolder: home,
    shippedPresets: new URL('../../presets', import.meta.url).pathname,
    presets: undefined,
    records: file,
    programUrl: import.meta.url,
  });
}

const ask = (scanner: string) => ({ kind: 'read-residuals', ask: 1, scanner }) as const;

describe('how far predictions have been off, from the file of records', () => {
  it('counts this scanner alone; damaged lines are skipped', async () => {
    const others = Array.from({ length: 6 }, () => readTime(40, { scanner: 'other' }));
    const { runEffect, leave } = await worldWith([...twelveTimes(), ...others, readTime(5, {}, 'spin-echo/2D')], '{"half a line');
    const answer = await runEffect(ask('demo-3t'));
    if (answer?.kind !== 'residuals') throw new Error(JSON.stringify(answer));
    expect(answer.classes.map((one) => [one.class, one.time?.spread.count, one.time?.spread.median])).toEqual([
      ['spin-echo/2D', 1, 0.05],
      ['spoiled-gradient-echo/3D', 12, 0.034],
    ]);
    await leave(null);
  });

  it('of a scanner without readings, or where nobody recorded yet, is nothing', async () => {
    const { runEffect, leave } = await worldWith(twelveTimes());
    expect(await runEffect(ask('green room'))).toEqual({ kind: 'residuals', classes: [] });
    await leave(null);
    const empty = await worldWith(null);
    expect(await empty.runEffect(ask('demo-3t'))).toEqual({ kind: 'residuals', classes: [] });
    await empty.leave(null);
  });

  it('lets others go between two pieces, and gives way to a newer ask', async () => {
    const { runEffect, leave } = await worldWith(inventedRecords(300));
    let turns = 0;
    let running = true;
    const turn = () => {
      turns += 1;
      if (running) setImmediate(turn);
    };
    setImmediate(turn);
    const [first, second] = await Promise.all([runEffect(ask('invented scanner A')), runEffect(ask('invented scanner B'))]);
    running = false;
    expect(first).toBeNull();
    expect(second?.kind).toBe('residuals');
    expect(turns).toBeGreaterThan(5);
    await leave(null);
  });
});
