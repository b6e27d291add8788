import { describe, expect, it } from 'vitest';
import { classKeys, classTable } from '../../../src/calc/classes.js';

/** Families by what they are (any textbook; Bernstein, King & Zhou, Handbook of MRI Pulse Sequences, 2004). */
const trains = ['fast-spin-echo', 'single-shot-fast-spin-echo', 'rotating-strip-fast-spin-echo'];
const echoPlanar = ['echo-planar-gradient-echo', 'echo-planar-spin-echo'];
/** No refocusing pulse. */
const gradientEchoes = ['spoiled-gradient-echo', 'balanced-steady-state', 'inversion-prepared-gradient-echo', 'echo-planar-gradient-echo'];

/** Echo spacing when a file leaves it out, ms (the preset contract; common practice, no source); 10 where none is played. */
const spacings: Readonly<Record<string, number>> = {
  'fast-spin-echo/2D': 10,
  'fast-spin-echo/3D': 4,
  'single-shot-fast-spin-echo/2D': 5,
  'rotating-strip-fast-spin-echo/2D': 5,
  'inversion-prepared-gradient-echo/3D': 7,
  'echo-planar-gradient-echo/2D': 0.7,
  'echo-planar-spin-echo/2D': 0.7,
};

describe.each(classKeys)('the class %s', (key) => {
  const row = classTable[key];
  const [family, acquisition] = key.split('/') as [string, string];

  it('is what its family is', () => {
    expect(row).toMatchObject({
      family,
      acquisition,
      train: trains.includes(family),
      gradientEcho: gradientEchoes.includes(family),
      echoPlanar: echoPlanar.includes(family),
    });
  });

  it('takes a volume whole, slices interleaved within TR, or slices one after the other', () => {
    const oneByOne = ['single-shot-fast-spin-echo/2D', 'balanced-steady-state/2D'].includes(key);
    expect(row.interleaving).toBe(acquisition === '3D' ? 'volume' : oneByOne ? 'slice-by-slice' : 'interleaved');
  });

  it('fills in what a file leaves out as the preset contract says', () => {
    const allLines = ['single-shot-fast-spin-echo', 'inversion-prepared-gradient-echo', ...echoPlanar].includes(family);
    expect(row.otherwise).toEqual({
      flipAngleDeg: gradientEchoes.includes(family) ? 'required' : 90,
      echoTrainLength: allLines ? 'lines' : 1,
      echoSpacingMs: spacings[key] ?? 10,
      slabSelective: family !== 'inversion-prepared-gradient-echo',
    });
  });
});
