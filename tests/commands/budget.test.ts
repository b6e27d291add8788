import { describe, expect, it } from 'vitest';
import { runCommand } from './run-command.js';

interface Document {
  readonly preset: string;
  readonly plan: readonly { readonly series: string; readonly choice: string; readonly changes: object; readonly timeS: number }[];
  readonly totalS: number;
  readonly spareS: number;
}

describe('holdfast budget', () => {
  it('prints one JSON document whose total is its series and their overhead', async () => {
    const { exit, out } = await runCommand(['budget', 'brain-child-fast-3t', '--minutes', '5', '--overhead', '10', '--json']);
    expect(exit).toBe(0);
    const document = JSON.parse(out) as Document;
    expect(Object.keys(document)).toEqual(['preset', 'fieldT', 'plan', 'totalS', 'spareS']);
    const kept = document.plan.filter(({ choice }) => choice !== 'skipped');
    expect(document.totalS).toBeCloseTo(
      kept.reduce((sum, { timeS }) => sum + timeS + 10, 0),
      6,
    );
    expect(document.spareS).toBeCloseTo(300 - document.totalS, 6);
  });

  it('as text it keeps to 80 columns and says what is given up', async () => {
    const { out } = await runCommand(['budget', 'brain-child-fast-3t', '--minutes', '3', '--overhead', '10']);
    expect(out.split('\n').every((line) => line.length <= 80)).toBe(true);
    expect(out).toMatch(/Given up: |No series is given up/);
  });

  it('exits 1 where not even the minimum set fits', async () => {
    const { exit, out } = await runCommand(['budget', 'brain-child-fast-3t', '--minutes', '0.2']);
    expect(exit).toBe(1);
    expect(out).toContain('The minimum set does not fit');
  });

  it('shortens or skips what a patient cannot hold, though there is time', async () => {
    const plan = async (...more: string[]) =>
      (JSON.parse((await runCommand(['budget', 'liver-3t', '--minutes', '40', ...more, '--json'])).out) as Document).plan;
    expect((await plan()).map(({ choice }) => choice)).not.toContain('shortened');
    expect((await plan('--hold', '11')).find(({ series }) => series === 't1-3d')?.choice).toBe('shortened');
  });

  it('says that nothing is left to plan where every series is done', async () => {
    const ids = ['ss-ax', 'dwi', 'ss-sag', 't2', 'flair', 't1'].flatMap((id) => ['--done', id]);
    const { exit, out } = await runCommand(['budget', 'brain-child-fast-3t', '--minutes', '5', ...ids]);
    expect(exit).toBe(0);
    expect(out).toContain('Every series is done: nothing is left to plan.');
  });

  it.each<[string, readonly string[], number, RegExp]>([
    ['no minutes', [], 64, /--minutes is missing/],
    ['minutes of nothing', ['--minutes', '0'], 64, /--minutes takes more than 0/],
    ['a longest series of nothing', ['--minutes', '5', '--longest', '0'], 64, /--longest takes more than 0/],
    ['a breath-hold of nothing', ['--minutes', '5', '--hold', '0'], 64, /--hold takes more than 0/],
    ['a negative overhead', ['--minutes', '5', '--overhead', '-1'], 64, /--overhead/],
    ['a series done that is not there', ['--minutes', '5', '--done', 't22'], 66, /Did you mean t2/],
  ])('refuses %s', async (_what, args, code, message) => {
    const { exit, err } = await runCommand(['budget', 'brain-child-fast-3t', ...args]);
    expect(exit).toBe(code);
    expect(err).toMatch(message);
  });
});
