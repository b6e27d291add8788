import { describe, expect, it } from 'vitest';
import { lobeMs, phaseEncodeArea, rampMs, readoutMtPerM, sliceSelectMtPerM } from '../../src/calc/gradients.js';

const limits = { gradientMtPerM: 40, slewTPerMPerS: 150 };

describe('gradients', () => {
  it('selects 2 mm at 10 mT/m with 851.4 Hz (published with gamma-bar 42.57; read in a secondary page)', () => {
    expect(sliceSelectMtPerM(0.8514, 2)).toBeCloseTo(10, 2);
    expect(sliceSelectMtPerM(0.85154956922, 2)).toBeCloseTo(10, 9);
  });

  it('reads 256 samples over 256 mm at 200 Hz/px with 4.697 mT/m (computed)', () => {
    expect(readoutMtPerM(200, 256, 256)).toBeCloseTo(4.69732, 5);
    expect(readoutMtPerM(400, 128, 256)).toBeCloseTo(4.69732, 5);
  });

  it('encodes a voxel of 1 mm with 11.743 mT/m ms (computed: 1 / (2 gamma-bar voxel))', () => {
    expect(phaseEncodeArea(1)).toBeCloseTo(11.743298, 5);
    expect(phaseEncodeArea(2)).toBeCloseTo(5.871649, 5);
  });

  it('ramps to 30 mT/m in 0.2 ms at 150 T/m/s', () => {
    expect(rampMs(30, limits)).toBeCloseTo(0.2, 12);
  });

  it('a small lobe is a triangle: 6 mT/m ms take 2 x 0.2 ms', () => {
    expect(lobeMs(6, limits)).toBeCloseTo(0.4, 12);
    expect(lobeMs(0, limits)).toBe(0);
  });

  it('a large lobe is a trapezoid: 50.667 mT/m ms are 1 ms of plateau between two ramps', () => {
    // 40 x (1 + 40/150) = 50.667
    expect(lobeMs(40 * (1 + 40 / 150), limits)).toBeCloseTo(1 + 80 / 150, 12);
  });

  it('triangle and trapezoid meet where the slew rate just reaches the maximum', () => {
    const area = (40 * 40) / 150;
    expect(lobeMs(area, limits)).toBeCloseTo(80 / 150, 12);
    expect(lobeMs(area * 1.0000001, limits)).toBeCloseTo(80 / 150, 6);
  });
});
