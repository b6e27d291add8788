import { existsSync, mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { SessionRecord } from '../../src/study/record.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';
import { keyBytes } from './harness/key-bytes.js';
import { type RunningProgram, type StartOptions, start } from './harness/start.js';

const bundle = new URL('../../dist/holdfast.js', import.meta.url).pathname;

/** A home of its own for one test: settings, drafts and records of nobody else. */
export function newHome(): string {
  return mkdtempSync(join(tmpdir(), 'holdfast-home-'));
}

/** The interface in a pseudo-terminal, and words for what hands do. */
export interface Interface {
  readonly program: RunningProgram;
  /** Narrows the list, opens what is meant, and waits for the running order. */
  readonly openPreset: (narrowing: string) => Promise<void>;
  /** Puts the hand of the series screen, or of a form, on the line with this label. */
  readonly goTo: (label: string) => Promise<void>;
  /** Presses keys one after the other and waits until the screen shows something. */
  readonly keys: (keys: string, then: string | RegExp) => Promise<void>;
  readonly escape: (then: string | RegExp) => Promise<void>;
  /** The first line of the screen. */
  readonly verdict: () => string;
  readonly records: () => readonly SessionRecord[];
}

/** The screen without its second line, which also tells how far a search is: that changes without any key. */
function byKeys(program: RunningProgram): string {
  return program
    .text()
    .split('\n')
    .filter((_line, row) => row !== 1)
    .join('\n');
}

/** Waits until the screen has not changed for a while. */
async function quiet(program: RunningProgram): Promise<void> {
  for (let before = ''; before !== byKeys(program); ) {
    before = byKeys(program);
    await new Promise((resolve) => setTimeout(resolve, 80));
  }
}

/** Opens the interface in a home; `holdfast` and its options, nothing else. */
export function openInterface(home: string, args: readonly string[] = [], options: StartOptions = {}): Interface {
  const env = {
    HOME: home,
    XDG_CONFIG_HOME: undefined,
    XDG_DATA_HOME: undefined,
    XDG_STATE_HOME: undefined,
    NO_COLOR: '1',
    ...options.env,
  };
  const program = start(process.execPath, [bundle, ...args], { ...options, env });
  const settled = async (then: string | RegExp) => program.waitFor(then, 20_000);
  const keys: Interface['keys'] = async (pressed, then) => {
    program.press(pressed);
    await settled(then);
  };
  return {
    program,
    keys,
    openPreset: async (narrowing) => {
      await settled('0.55 T');
      await keys(narrowing, `Type to narrow: ${narrowing}`);
      await keys(keyBytes.enter, 'Running order');
    },
    goTo: async (label) => {
      const here = new RegExp(`[>\\u25b8] ?${label.replace(/[()+]/g, '\\$&')}`);
      program.press(keyBytes.home);
      await quiet(program);
      for (let rows = 0; rows < 80; rows += 1) {
        const before = byKeys(program);
        if (here.test(before)) return;
        // One key at a time, each drawn before the next: the hand is on one line of the screen.
        program.press(keyBytes.down);
        await program.waitFor((running) => byKeys(running) !== before, 10_000);
        await quiet(program);
      }
      throw new Error(`no line ${label}; the screen shows:\n${program.text()}`);
    },
    escape: async (then) => {
      program.press(keyBytes.escape);
      await settled(then);
    },
    verdict: () => program.text().split('\n')[0] ?? '',
    records: () => {
      const file = join(home, '.local/share/holdfast/records.jsonl');
      if (!existsSync(file)) return [];
      return readFileSync(file, 'utf8')
        .split('\n')
        .filter((line) => line !== '')
        .map((line) => {
          const read = readRecordLine(line);
          if (!read.ok) throw new Error(read.problems[0]?.message);
          return read.value;
        });
    },
  };
}
