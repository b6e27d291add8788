import { mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { bundleProgram } from './harness/bundle-program.js';
import { keyBytes, pasted } from './harness/key-bytes.js';
import { type RunningProgram, type StartOptions, start } from './harness/start.js';
import { changedCells } from './harness/virtual-screen.js';

let file: string;
let folder: string;
let running: RunningProgram[] = [];

beforeAll(async () => {
  file = await bundleProgram(fileURLToPath(new URL('./programs/counter.tsx', import.meta.url)));
});
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'holdfast-e2e-'));
});
afterEach(async () => {
  for (const program of running) await program.close();
  running = [];
});

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const note = () => JSON.parse(readFileSync(join(folder, 'note'), 'utf8')) as { kind: string; count: number };
const modes = (name: string) => readFileSync(join(folder, name), 'utf8');

function launch(command: string, args: string[], options: StartOptions = {}): RunningProgram {
  const program = start(command, args, { ...options, env: { NOTE_FILE: join(folder, 'note'), ...options.env } });
  running.push(program);
  return program;
}

/** The program alone in its terminal. */
async function alone(options: StartOptions = {}, ...args: string[]): Promise<RunningProgram> {
  const program = launch('node', [file, ...args], options);
  await program.waitFor('count 5');
  return program;
}

/** The program under a shell that notes the terminal's modes before and after. */
async function underShell(options: StartOptions = {}): Promise<RunningProgram> {
  const script = `stty -a >${folder}/before; echo earlier text; node ${file}; code=$?; stty -a >${folder}/after; echo "code $code."`;
  const program = launch('bash', ['--norc', '-c', script], options);
  await program.waitFor('count 5');
  return program;
}

const pidOf = (program: RunningProgram) => Number(/pid (\d+)\./.exec(program.text())?.[1]);

/** The terminal is as it was found: screen, cursor, wrapping, paste marks, line modes. */
function expectRestored(program: RunningProgram): void {
  expect(program.screen.onAlternateScreen()).toBe(false);
  expect(program.screen.cursor().visible).toBe(true);
  expect(program.screen.terminal.modes.wraparoundMode).toBe(true);
  expect(program.screen.terminal.modes.bracketedPasteMode).toBe(false);
  expect(program.text()).toContain('earlier text');
  expect(program.text()).not.toContain('count');
  expect(modes('after')).toBe(modes('before'));
}

describe('drawing', () => {
  it('one key changes exactly the cells it should, in a few bytes', async () => {
    const program = await alone();
    const cells = program.screen.cells();
    const bytes = program.bytesWritten();
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    await pause(100);
    expect(changedCells(cells, program.screen.cells())).toEqual(['6,1']);
    expect(program.bytesWritten() - bytes).toBeLessThan(80);
  });

  it('shows something before ink is loaded, then the screen', async () => {
    const program = await alone();
    const output = program.output();
    expect(output.indexOf('loading')).toBeGreaterThan(0);
    expect(output.indexOf('loading')).toBeLessThan(output.indexOf('count'));
    expect(program.text()).not.toContain('loading');
  });

  it('a frame as tall as the terminal neither scrolls nor clears', async () => {
    const program = await alone({ columns: 80, rows: 10 }, 'tall');
    expect(program.text().split('\n')[9]).toBe('bottom line');
    const before = program.bytesWritten();
    for (let step = 1; step <= 3; step++) {
      program.press(keyBytes.up);
      await program.waitFor(`count ${5 + step}`);
    }
    expect(program.output().slice(before)).not.toContain('\u001b[2J');
    expect(program.bytesWritten() - before).toBeLessThan(240);
    expect(program.screen.scrolledLines()).toBe(0);
    expect(program.text().split('\n')[9]).toBe('bottom line');
  });

  it('puts the cursor on the cell that asks for it', async () => {
    const program = await alone();
    expect(program.screen.cursor()).toEqual({ x: 6, y: 1, visible: true });
  });

  it('keeps wide characters and what follows in their columns', async () => {
    const program = await alone();
    const line = program.text().split('\n')[4];
    expect(line).toBe('wide \u6f22\u5b57 end');
    expect(program.cell(5, 4)).toMatchObject({ text: '\u6f22', width: 2 });
    expect(program.cell(10, 4).text).toBe('e');
  });

  it('draws again for a new size, larger and smaller', async () => {
    const program = await alone({ columns: 80, rows: 24 }, 'tall');
    program.resize(100, 30);
    await program.waitFor('size 100 x 30');
    await program.waitFor((now) => now.text().split('\n')[29] === 'bottom line');
    program.resize(40, 9);
    await program.waitFor('size 40 x 9');
    await program.waitFor((now) => now.text().split('\n')[8] === 'bottom line');
    expect(program.text().match(/count/g)).toHaveLength(1);
  });

  it('draws where CI=1, and where NODE_ENV and DEV are set', async () => {
    const program = await alone({ env: { CI: '1', NODE_ENV: 'development', DEV: 'true' } });
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    program.resize(70, 20);
    await program.waitFor('size 70 x 20');
  });

  it.each([
    ['a colour by name', { TERM: 'xterm-256color' }, '2'],
    ['none with NO_COLOR', { TERM: 'xterm-256color', NO_COLOR: '1' }, 'default'],
    ['a colour with FORCE_COLOR all the same', { TERM: 'xterm-256color', NO_COLOR: '1', FORCE_COLOR: '1' }, '2'],
    ['none with FORCE_COLOR=0', { TERM: 'xterm-256color', FORCE_COLOR: '0' }, 'default'],
  ])('uses %s', async (_what, env, foreground) => {
    const program = await alone({ env });
    expect(program.cell(0, 1)).toMatchObject({ text: 'c', foreground });
  });

  it('shows stray prints after the screen was left, not over it', async () => {
    const program = await alone();
    program.press('p');
    await pause(100);
    expect(program.text()).not.toContain('stray');
    program.press('q');
    await program.exited;
    expect(program.text()).toBe('a stray print\ngoodbye 5');
  });
});

describe('keys', () => {
  it('an arrow in two parts is an arrow, an ESC alone is Escape', async () => {
    const program = await alone();
    program.press('\u001b');
    await pause(5);
    program.press('[A');
    await program.waitFor('count 6');
    expect(program.text()).not.toContain('escape');
    program.press('\u001b');
    await program.waitFor('2:escape');
  });

  it('several keys in one read are several keys', async () => {
    const program = await alone();
    program.press(`${keyBytes.up.repeat(3)}${keyBytes.down}${keyBytes.backspace.repeat(3)}`);
    await program.waitFor('7:backspace');
    await program.waitFor('count 7');
  });

  it('a paste comes whole, and holds no keys', async () => {
    const program = await alone();
    program.press(pasted('q 12 mm'));
    await program.waitFor('1:paste <q 12 mm>');
  });
});

describe('leaving', () => {
  it('by the program', async () => {
    const program = await underShell();
    program.press('q');
    await program.waitFor('code 0.');
    expectRestored(program);
    expect(program.text()).toContain('goodbye 5');
    expect(note()).toEqual({ kind: 'closed', count: 5 });
  });

  it.each([
    ['Ctrl-C', keyBytes.ctrlC, 130],
    ['Ctrl-\\', keyBytes.ctrlBackslash, 131],
  ])('by %s, which ends the process as its signal does', async (_name, key, code) => {
    const program = await underShell();
    program.press(keyBytes.up + key);
    await program.waitFor(`code ${code}.`);
    expectRestored(program);
    expect(note()).toEqual({ kind: 'signal', count: 6 });
  });

  it.each<[NodeJS.Signals, number]>([
    ['SIGTERM', 143],
    ['SIGHUP', 129],
    ['SIGINT', 130],
    ['SIGQUIT', 131],
    ['SIGUSR2', 140],
    ['SIGALRM', 142],
  ])('by %s', async (signal, code) => {
    const program = await underShell();
    process.kill(pidOf(program), signal);
    await program.waitFor(`code ${code}.`);
    expectRestored(program);
    expect(note().kind).toBe('signal');
  });

  it.each([
    ['an exception', 'x', 'thrown on purpose'],
    ['a rejection', 'r', 'rejected on purpose'],
    ['a component that throws', 'b', 'broken on purpose'],
  ])('by %s, with the message on the screen afterwards', async (_name, key, message) => {
    const program = await underShell();
    program.press(key);
    await program.waitFor('code 70.');
    expectRestored({ ...program, text: () => program.text().replaceAll('counter', '') });
    expect(program.text()).toContain(message);
    expect(note().kind).toBe('error');
  });

  it('by an exit from anywhere', async () => {
    const program = await underShell();
    program.press('e');
    await program.waitFor('code 3.');
    expectRestored(program);
    expect(note().kind).toBe('closed');
  });

  it('twice at once', async () => {
    const program = await underShell();
    const pid = pidOf(program);
    process.kill(pid, 'SIGTERM');
    process.kill(pid, 'SIGTERM');
    await program.waitFor('code 143.');
    expectRestored(program);
  });

  it('while it is still loading', async () => {
    const script = `stty -a >${folder}/before; echo earlier text; node ${file}; code=$?; stty -a >${folder}/after; echo "code $code."`;
    const program = launch('bash', ['--norc', '-c', script]);
    await program.waitFor((now) => now.output().includes('loading'));
    program.press(keyBytes.ctrlC);
    await program.waitFor('code 130.');
    expectRestored(program);
  });

  it('when the terminal goes away, having saved', async () => {
    const program = await alone();
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    const { pid } = program;
    program.hangUp();
    const alive = () => {
      try {
        return process.kill(pid, 0);
      } catch {
        return false;
      }
    };
    for (let tries = 0; tries < 300 && alive(); tries++) await pause(10);
    expect(alive()).toBe(false);
    expect(note()).toEqual({ kind: 'signal', count: 6 });
  });
});

describe('stopping and going on', () => {
  /** An interactive shell with job control. */
  async function shell(): Promise<RunningProgram> {
    const program = launch('bash', ['--norc', '--noprofile', '-i'], { env: { PS1: 'ready> ', TERM: 'xterm', HISTFILE: undefined } });
    await program.waitFor('ready>');
    // Readline marks pastes itself, which would be taken for ours.
    program.press(`bind 'set enable-bracketed-paste off'; stty -a >${folder}/before; echo earlier text\r`);
    await program.waitFor(/^earlier text/m);
    program.press(`node ${file}\r`);
    await program.waitFor('count 5');
    return program;
  }

  /** The shell has the terminal again, as it was. */
  async function expectStopped(program: RunningProgram): Promise<void> {
    await program.waitFor(/Stopped/);
    await program.waitFor(/ready> $|ready>$/);
    program.press(`stty -a >${folder}/after; echo modes noted\r`);
    await program.waitFor(/^modes noted/m);
    expectRestored(program);
  }

  it('Ctrl-Z gives the terminal back, fg takes it again with everything on it', async () => {
    const program = await shell();
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    program.press(keyBytes.ctrlZ);
    await expectStopped(program);
    program.press('fg\r');
    await program.waitFor('count 6');
    expect(program.screen.onAlternateScreen()).toBe(true);
    expect(program.text()).not.toContain('earlier');
    program.press(keyBytes.up);
    await program.waitFor('count 7');
    program.press(keyBytes.ctrlZ);
    await program.waitFor((now) => !now.screen.onAlternateScreen());
    await program.waitFor((now) => (now.text().match(/Stopped/g) ?? []).length === 2);
    program.press('fg\r');
    await program.waitFor('count 7');
    program.press('q');
    await program.waitFor('goodbye 7');
    program.press(`clear; echo earlier text; stty -a >${folder}/after; echo end noted\r`);
    await program.waitFor(/^end noted/m);
    expectRestored(program);
  });

  it('SIGTSTP from outside does the same', async () => {
    const program = await shell();
    process.kill(pidOf(program), 'SIGTSTP');
    await expectStopped(program);
    program.press('fg\r');
    await program.waitFor('count 5');
    program.press(keyBytes.up);
    await program.waitFor('count 6');
  });

  it('after SIGSTOP, which cannot be caught, fg draws everything again', async () => {
    const program = await shell();
    process.kill(pidOf(program), 'SIGSTOP');
    await program.waitFor(/Stopped/);
    program.press('fg\r');
    await program.waitFor((now) => now.text().startsWith('size') && now.text().includes('count 5'));
    await pause(100);
    expect(program.text()).not.toContain('ready>');
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    program.press('q');
    await program.waitFor('goodbye 6');
    expect(program.screen.onAlternateScreen()).toBe(false);
  });

  it('a size that changed meanwhile is seen', async () => {
    const program = await shell();
    program.press(keyBytes.ctrlZ);
    await program.waitFor(/Stopped/);
    program.resize(90, 20);
    await pause(50);
    program.press('fg\r');
    await program.waitFor('size 90 x 20');
  });

  it('is stopped again when it is sent to the background, and leaves the shell its screen', async () => {
    const program = await shell();
    program.press(keyBytes.ctrlZ);
    await program.waitFor(/Stopped/);
    program.press('bg\r');
    await pause(500);
    program.press('echo still here\r');
    await program.waitFor(/^still here/m);
    expect(program.screen.onAlternateScreen()).toBe(false);
    program.press('fg\r');
    await program.waitFor('count 5');
    program.press(keyBytes.up);
    await program.waitFor('count 6');
  });

  it('Ctrl-Z where nobody could start it again leaves it running', async () => {
    const program = await alone();
    program.press(keyBytes.ctrlZ);
    await program.waitFor((now) => now.output().includes('\u001b[?1049l'));
    await program.waitFor((now) => now.screen.onAlternateScreen() && now.text().includes('count 5'));
    program.press(keyBytes.up);
    await program.waitFor('count 6');
  });
});

describe('a slow line', () => {
  it('never has more than one frame that the terminal has not answered, and shows the last', async () => {
    const program = await alone({ answers: false });
    const frames = () => program.output().split('\u001b[?2026h').length - 1;
    program.answer();
    await pause(50);
    const before = frames();
    for (let step = 0; step < 20; step++) {
      program.press(keyBytes.up);
      await pause(20);
    }
    await program.waitFor(() => program.heldAnswers() === 1);
    await pause(200);
    expect(frames()).toBe(before + 1);
    expect(program.text()).not.toContain('count 25');
    program.answer();
    await program.waitFor('count 25');
    expect(frames()).toBe(before + 2);
  });

  it('that never answers is drawn to without waiting', async () => {
    const program = await alone({ answers: false });
    for (let step = 1; step <= 5; step++) {
      program.press(keyBytes.up);
      await program.waitFor(`count ${5 + step}`);
    }
    expect(program.heldAnswers()).toBe(1);
  });

  it('leaves no answer behind for the shell', async () => {
    const program = await underShell({ answers: false });
    program.answer();
    await pause(50);
    program.press(keyBytes.up);
    await program.waitFor('count 6');
    program.press('q');
    await program.waitFor((now) => !now.screen.onAlternateScreen());
    program.answer();
    await program.waitFor('code 0.');
    await pause(50);
    expect(program.text()).not.toContain('[0n');
    expectRestored(program);
  });
});
