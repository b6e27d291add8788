import { describe, expect, it } from 'vitest';
import { type FigureKey, figureKeys, figureTable } from '../../../src/calc/figures.js';

/**
 * Digits after the point in a table. Counts and nulls in whole numbers; seconds, the Ernst angle and lengths as the trade writes
 * them; never a third digit of relative SNR or B1+rms, whose model does not carry it (common practice, no source).
 */
const digits: Readonly<Record<number, readonly FigureKey[]>> = {
  0: [
    'holds',
    'tableTimeS',
    'linesPhase',
    'linesSlice',
    'shots',
    'slicesPerRepetition',
    'roundsNeeded',
    'coverageMm',
    'nullTimeMs',
    'temporalResolutionMs',
    'cardiacPhases',
  ],
  1: ['scanTimeS', 'holdTimeS', 'ernstAngleDeg'],
  2: [
    'voxelReadMm',
    'voxelPhaseMm',
    'voxelSliceMm',
    'voxelVolumeMm3',
    'displayedVoxelReadMm',
    'displayedVoxelPhaseMm',
    'relativeSnr',
    'relativeContrast',
    'b1PlusRmsUt',
    'rfPowerTrend',
    'sarTrendLow',
    'sarTrendHigh',
    'chemicalShiftPx',
    'chemicalShiftMm',
    'distortionPxPer100Hz',
    'minimumEchoTimeMs',
    'minimumRepetitionTimeMs',
    'blurFwhmPx',
    'inPhaseMs',
    'opposedPhaseMs',
  ],
  3: ['contrastRatio', 'contrastRatioChange'],
};

describe('the table of figures', () => {
  it.each(Object.entries(digits))('shows %s digits after the point where the trade does', (count, keys) => {
    expect(figureKeys.filter((key) => figureTable[key].digits === Number(count)).sort()).toEqual([...keys].sort());
  });
});
