import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { SessionRecord } from '../../src/study/record.js';
import { recordLine } from '../../src/study/record-line.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { countedByHand } from '../study/read-times.js';
import { runCommand } from './run-command.js';

const linesOf = (records: readonly SessionRecord[]) => records.map((record) => `\n${recordLine(record)}\n`).join('');

function fileOf(records: readonly SessionRecord[]) {
  const homeFolder = temporaryFolder();
  const file = join(homeFolder, 'records.jsonl');
  writeFileSync(file, linesOf(records));
  return (...args: string[]) => runCommand(['records', 'report', '--readings', file, ...args], { homeFolder });
}

const all = countedByHand();

describe('records report --readings', () => {
  it('the invented file of the example in README.md is the one counted by hand here', () => {
    expect(readFileSync('scripts/invented-readings.jsonl', 'utf8')).toBe(linesOf(all));
  });

  it('shows the error by class and scanner, its drift, small counts, and what to review', async () => {
    const { exit, out, err } = await fileOf(all)();
    expect([exit, err]).toEqual([0, '']);
    expect(out).toContain('Scanner demo-3t');
    expect(out).toMatch(/3D spoiled gradient echo\n.*\ntime +12 small +\+3\.4 % +\+2\.9 % to \+4\.1 % +\+6 % +\+1\.5 % since 2026-01/);
    expect(out).toMatch(/fast spin echo\n.*\ntime +1 +too few +- +-7 % +-/);
    expect(out).toMatch(/Scanner not named[\s\S]*TO REVIEW\. model error 5 %, the usual one/);
    expect(out.replace(/\s+/g, ' ')).toContain('8 % would cover them. Nothing was changed.');
    expect(out).not.toMatch(/\b(safe|cleared|compliant)\b/i);
    for (const line of out.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('says the same in JSON, without medians of fewer than five', async () => {
    const { out } = await fileOf(all)('--json');
    const { scanners, sessions } = JSON.parse(out);
    expect(sessions).toBe(18);
    const demo = scanners.find(({ scanner }: { scanner: string }) => scanner === 'demo-3t');
    expect(demo.classes[0].class).toBe('fast-spin-echo/2D');
    expect(demo.classes[0].time).toMatchObject({ readings: 1, median: null, lowQuartile: null, worst: -0.07, drift: null });
    expect(demo.classes[1].time).toMatchObject({ readings: 12, median: 0.034, worst: 0.06, drift: { change: 0.015 } });
    expect(demo.modelError).toMatchObject({ kind: 'raise', fromFile: true, percent: 4, suggestedPercent: 5 });
    const unnamed = scanners.find(({ scanner }: { scanner: string }) => scanner === '');
    expect(unnamed.modelError).toMatchObject({ kind: 'raise', fromFile: false, percent: 5, suggestedPercent: 8 });
  });

  it('takes filters, reads aloud, says that there is nothing, and refuses what it cannot write', async () => {
    const run = fileOf(all);
    expect((await run('--to', '2026-02-28')).out).toMatch(/time +6 /);
    expect((await run('--reader')).out).toContain(
      'time: readings 12 small; median +3.4 %; quartiles +2.9 % to +4.1 %; worst +6 %; drift +1.5 % since 2026-01.',
    );
    expect((await fileOf([])()).out).toContain('No record holds a reading that can be compared.');
    expect((await run('--html', 'x.html')).exit).toBe(64);
    expect((await run('--save-drafts')).exit).toBe(64);
  });
});
