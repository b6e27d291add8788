import { describe, expect, it } from 'vitest';
import { edit, seriesOf } from '../series-of.js';
import { cautionOf } from './caution-of.js';

const pair = (
  first: number,
  second: number,
  fieldT: number,
  key: 'spoiled-gradient-echo/2D' | 'spoiled-gradient-echo/3D' | 'spin-echo/2D' = 'spoiled-gradient-echo/2D',
) => edit(seriesOf(key, { repetitionTimeMs: 170, echoTimeMs: first, secondEchoTimeMs: second, pixelBandwidthHz: 1000 }), {}, { fieldT });

/** Echo time in ms after this many cycles of 3.4 ppm at 1.5 T. */
const cycles = (count: number) => (count * 1000) / (3.4 * 42.577478461 * 1.5);

describe('in- and opposed-phase pairs, judged at the real frequency', () => {
  it('2.3/4.6 ms are opposed and in phase at 1.5 T', () => {
    expect(pair(2.3, 4.6, 1.5).codes).not.toContain('echo-pair-phase');
  });

  it('copied to 3 T both are in phase, 1.00 and 2.00 cycles: an error that names better times', () => {
    const caution = cautionOf(pair(2.3, 4.6, 3), 'echo-pair-phase');
    expect(caution?.level).toBe('error');
    expect(caution?.text).toContain('both echoes are in phase');
    expect(caution?.text).toContain('1.00 and 2.00 cycles');
    expect(caution?.text).toContain('1.15/2.30');
    expect(caution?.text).toContain('3.45/2.30');
  });

  it('at 2.89 T the better times are 1.20/2.39', () => {
    expect(cautionOf(pair(2.3, 4.6, 2.89), 'echo-pair-phase')?.text).toContain('1.20/2.39');
  });

  it('3.45/2.30 at 3 T is a note: the opposed echo comes later, T2* in the way', () => {
    const caution = cautionOf(pair(3.45, 2.3, 3), 'echo-pair-phase');
    expect(caution?.level).toBe('note');
    expect(caution?.text).toContain('later');
  });

  it.each<[number, number, boolean]>([
    // 0.15 of a cycle is allowed for either echo
    [0.5 + 0.149, 1, false],
    [0.5 + 0.151, 1, true],
    [0.5 - 0.151, 1, true],
    [0.5, 1.149, false],
    [0.5, 1.151, true],
    [0.5, 0.849, true],
    [1.5, 2, false],
  ])('%d and %d cycles: %s', (first, second, off) => {
    const caution = cautionOf(pair(cycles(first), cycles(second), 1.5), 'echo-pair-phase');
    expect(caution?.level === 'error').toBe(off);
    if (!off) expect(caution).toBeUndefined();
  });

  it('names two opposed echoes, and echoes that are neither', () => {
    expect(cautionOf(pair(cycles(0.5), cycles(1.5), 1.5), 'echo-pair-phase')?.text).toContain('both echoes are opposed');
    expect(cautionOf(pair(cycles(0.75), cycles(1.25), 1.5), 'echo-pair-phase')?.text).toContain('neither');
  });

  it('says nothing of one echo, nor of spin echoes, which refocus the shift', () => {
    expect(edit(seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 170, echoTimeMs: 4.6 }), {}, { fieldT: 3 }).codes).not.toContain(
      'echo-pair-phase',
    );
    expect(pair(20, 80, 3, 'spin-echo/2D').codes).not.toContain('echo-pair-phase');
    expect(pair(2.3, 4.6, 3, 'spoiled-gradient-echo/3D').codes).toContain('echo-pair-phase');
  });
});
