import { describe, expect, it } from 'vitest';
import { changesPicture } from '../../../src/calc/cautions/changes-picture.js';
import { parameterKeys } from '../../../src/calc/parameters.js';
import { fillDefaults, type Parameters } from '../../../src/calc/series.js';

const before = fillDefaults('spoiled-gradient-echo/3D', { fieldOfViewMm: 380, matrixRead: 320, matrixPhase: 200, sliceCount: 72 });
const withOther = (key: string): Parameters => ({ ...before, [key]: 'another value' });

describe('what shows in the picture', () => {
  it.each(parameterKeys.filter((key) => !['volumes', 'diffusion', 'pacing'].includes(key)))('%s does', (key) => {
    expect(changesPicture(withOther(key), before)).toBe(true);
  });

  it.each(['volumes', 'diffusion', 'pacing'])('%s does not: it says how often and when', (key) => {
    expect(changesPicture(withOther(key), before)).toBe(false);
  });

  it('equal values do not, whatever object they stand in', () => {
    expect(changesPicture({ ...before }, before)).toBe(false);
  });
});
