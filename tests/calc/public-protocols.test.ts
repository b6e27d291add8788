import { describe, expect, it } from 'vitest';
import { publicProtocols } from './public-protocols.js';
import { edit, seriesOf } from './series-of.js';

describe('published protocols (sources beside each in public-protocols.ts)', () => {
  it('are ten', () => {
    expect(publicProtocols).toHaveLength(10);
  });

  it.each(publicProtocols)(
    '$id: the time lies within 3 % of the $statedDurationS s its source states',
    ({ key, fieldT, parameters, statedDurationS }) => {
      const { figures } = edit(seriesOf(key, parameters), {}, { fieldT });
      expect(Math.abs((figures.scanTimeS as number) / statedDurationS - 1)).toBeLessThan(0.03);
    },
  );

  it.each(publicProtocols)('$id: the acquired voxel', ({ key, fieldT, parameters, statedVoxelMm, printedVoxelIs }) => {
    const { figures } = edit(seriesOf(key, parameters), {}, { fieldT });
    const { fieldOfViewMm, matrixRead, matrixPhase, sliceThicknessMm } = parameters as Record<string, number> & typeof parameters;
    const [read, phase, slice] =
      printedVoxelIs === 'acquired'
        ? statedVoxelMm
        : [
            (fieldOfViewMm as number) / (matrixRead as number),
            (fieldOfViewMm as number) / (matrixPhase as number),
            sliceThicknessMm as number,
          ];
    expect(Math.abs((figures.voxelReadMm as number) / read - 1)).toBeLessThan(0.03);
    expect(Math.abs((figures.voxelPhaseMm as number) / phase - 1)).toBeLessThan(0.03);
    expect(Math.abs((figures.voxelSliceMm as number) / slice - 1)).toBeLessThan(0.03);
  });

  it('the inversion-prepared head series plays 256 readouts a cycle, as its source prints for 23.1 % slice oversampling', () => {
    const protocol = publicProtocols.find(({ id }) => id === 'inversion-prepared-head-0.8');
    expect(protocol?.parameters.sliceOversamplingPercent).toBeGreaterThan(23);
    const { figures } = edit(seriesOf('inversion-prepared-gradient-echo/3D', protocol?.parameters ?? {}), {}, { fieldT: 3 });
    expect(figures.linesSlice).toBe(256);
  });
});

describe('series of the ACR large phantom (ACR MRI accreditation, Phantom Test Guidance; parameters read in a secondary page, stated times values from memory)', () => {
  const phantom = {
    fieldOfViewMm: 250,
    matrixRead: 256,
    matrixPhase: 256,
    sliceCount: 1,
    sliceThicknessMm: 5,
    sliceGapMm: 5,
    pixelBandwidthHz: 150,
  };

  it.each<[string, { repetitionTimeMs: number; echoTimeMs: number; secondEchoTimeMs?: number }, number, number]>([
    ['200/20, stated 0:53', { repetitionTimeMs: 200, echoTimeMs: 20 }, 51.2, 53],
    ['500/20, stated 2:16', { repetitionTimeMs: 500, echoTimeMs: 20 }, 128, 136],
    ['2000/20,80, stated 8:56', { repetitionTimeMs: 2000, echoTimeMs: 20, secondEchoTimeMs: 80 }, 512, 536],
  ])('%s', (_what, timing, computed, stated) => {
    const { figures } = edit(seriesOf('spin-echo/2D', { ...phantom, ...timing }));
    expect(figures.scanTimeS).toBeCloseTo(computed, 9);
    expect(Math.abs((figures.scanTimeS as number) / stated - 1)).toBeLessThan(0.08);
    expect([figures.voxelReadMm, figures.voxelPhaseMm, figures.voxelSliceMm]).toEqual([0.9765625, 0.9765625, 5]);
  });
});
