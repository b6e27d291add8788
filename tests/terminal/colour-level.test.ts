import { describe, expect, it } from 'vitest';
import { type ColourLevel, type ColourQuestion, colourLevel } from '../../src/terminal/colour-level.js';

type Environment = ColourQuestion['environment'];
const onTerminal = (environment: Environment) => colourLevel({ environment, isTerminal: true });

describe('the colour level', () => {
  it.each<[Environment, ColourLevel]>([
    [{}, 0],
    [{ TERM: 'dumb' }, 0],
    [{ TERM: 'dumb', COLORTERM: 'truecolor' }, 0],
    [{ TERM: 'vt100' }, 0],
    [{ TERM: 'xterm' }, 1],
    [{ TERM: 'linux' }, 1],
    [{ TERM: 'screen' }, 1],
    [{ TERM: 'xterm-256color' }, 2],
    [{ TERM: 'tmux-256color' }, 2],
    [{ TERM: 'xterm-direct' }, 3],
    [{ TERM: 'xterm-256color', COLORTERM: 'truecolor' }, 3],
    [{ TERM: 'xterm', COLORTERM: '24bit' }, 3],
  ])('of a terminal with %j is %i', (environment, level) => {
    expect(onTerminal(environment)).toBe(level);
  });

  it('is 0 where the output is no terminal', () => {
    expect(colourLevel({ environment: { TERM: 'xterm-256color' }, isTerminal: false })).toBe(0);
  });

  it('is 0 with NO_COLOR, unless that is empty', () => {
    expect(onTerminal({ TERM: 'xterm-256color', NO_COLOR: '1' })).toBe(0);
    expect(onTerminal({ TERM: 'xterm-256color', NO_COLOR: '' })).toBe(2);
  });

  it.each<[string, ColourLevel]>([
    ['0', 0],
    ['false', 0],
    ['1', 1],
    ['2', 2],
    ['3', 3],
    ['', 2],
    ['true', 2],
  ])('with FORCE_COLOR=%j is %i, NO_COLOR and pipe notwithstanding', (force, level) => {
    expect(colourLevel({ environment: { FORCE_COLOR: force, NO_COLOR: '1', TERM: 'xterm-256color' }, isTerminal: false })).toBe(level);
  });

  it('is at least 1 with a FORCE_COLOR that names no level', () => {
    expect(colourLevel({ environment: { FORCE_COLOR: 'true', TERM: 'dumb' }, isTerminal: false })).toBe(1);
  });

  it.each([
    ['never', 0],
    ['16', 1],
    ['256', 2],
    ['true', 3],
  ] as const)('with --color %s is %i whatever the environment says', (choice, level) => {
    for (const environment of [{ FORCE_COLOR: '0' }, { FORCE_COLOR: '3' }, { NO_COLOR: '1' }, { TERM: 'dumb' }]) {
      expect(colourLevel({ choice, environment, isTerminal: false })).toBe(level);
    }
  });
});
