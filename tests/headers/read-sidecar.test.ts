import { describe, expect, it } from 'vitest';
import { classRow } from '../../src/calc/classes.js';
import { fillDefaults } from '../../src/calc/series.js';
import { CollectedSeries } from '../../src/headers/collected-series.js';
import { readSeries } from '../../src/headers/read-series.js';
import { readSidecar } from '../../src/headers/read-sidecar.js';
import { publicProtocols } from '../calc/public-protocols.js';

function readText(json: object) {
  const attributes = readSidecar(JSON.stringify(json));
  if (typeof attributes === 'string') throw new Error(attributes);
  const header = { source: 'sidecar' as const, seriesKey: 'a', attributes };
  const series = new CollectedSeries(header);
  series.add(header);
  return readSeries(series, 's1');
}

const found = (read: ReturnType<typeof readText>, key: string) => {
  const { value, origin } = read.values.find((one) => one.key === key)!;
  return [value, origin];
};

/**
 * Fields with the units of the Brain Imaging Data Structure specification, "Magnetic Resonance Imaging" (times in seconds, angles in
 * degrees, partial Fourier as a fraction); names and units from memory of its tables.
 */
const bold = {
  MagneticFieldStrength: 3,
  ScanningSequence: ['EP', 'GR'],
  MRAcquisitionType: '2D',
  RepetitionTime: 0.8,
  EchoTime: 0.0331,
  FlipAngle: 52,
  ParallelReductionFactorInPlane: 1,
  PartialFourier: 0.875,
  PartialFourierDirection: 'PHASE',
  EffectiveEchoSpacing: 0.00058,
  MultibandAccelerationFactor: 8,
  SliceTiming: Array.from({ length: 72 }, (_, i) => (i % 9) * 0.08),
  NumberOfVolumesDiscardedByScanner: 4,
};

describe('a sidecar', () => {
  it('of an echo-planar series: seconds become ms, a fraction stays one, slices are counted', () => {
    const read = readText(bold);
    expect(read.decision.key).toBe('echo-planar-gradient-echo/2D');
    expect(found(read, 'repetitionTimeMs')).toEqual([800, 'read']);
    expect(found(read, 'echoTimeMs')).toEqual([33.1, 'read']);
    expect(found(read, 'flipAngleDeg')).toEqual([52, 'read']);
    expect(found(read, 'partialFourierPhase')).toEqual([0.875, 'read']);
    expect(found(read, 'simultaneousSlices')).toEqual([8, 'read']);
    expect(found(read, 'sliceCount')).toEqual([72, 'derived']);
    expect(found(read, 'dummyShots')).toEqual([4, 'read']);
    expect(found(read, 'echoSpacingMs')).toEqual([0.58, 'derived']);
    expect(found(read, 'phaseDirection')).toEqual([undefined, 'missing']);
  });

  it('of an accelerated echo-planar series: the effective spacing is the real one over the acceleration', () => {
    expect(found(readText({ ...bold, ParallelReductionFactorInPlane: 2 }), 'echoSpacingMs')).toEqual([1.16, 'derived']);
    const { ParallelReductionFactorInPlane: _, ...unsaid } = bold;
    expect(found(readText(unsaid), 'echoSpacingMs')).toEqual([undefined, 'missing']);
  });

  it('of an inversion-prepared series: the cycle, and the time between readouts', () => {
    const read = readText({
      MRAcquisitionType: '3D',
      ScanningSequence: 'GR_IR',
      SequenceVariant: 'SK\\SP\\MP',
      RepetitionTimePreparation: 2.3,
      RepetitionTimeExcitation: 0.0071,
      InversionTime: 0.9,
      EchoTime: 0.00298,
      FlipAngle: 9,
    });
    expect(read.decision.key).toBe('inversion-prepared-gradient-echo/3D');
    expect(found(read, 'repetitionTimeMs')).toEqual([2300, 'read']);
    expect(found(read, 'echoSpacingMs')).toEqual([7.1, 'derived']);
    expect(found(read, 'inversionTimeMs')).toEqual([900, 'read']);
  });

  it('whose RepetitionTime is that between readouts does not give the cycle', () => {
    const read = readText({
      MRAcquisitionType: '3D',
      ScanningSequence: ['GR', 'IR'],
      RepetitionTime: 0.0071,
      InversionTime: 0.9,
      EchoTime: 0.003,
    });
    expect(found(read, 'repetitionTimeMs')).toEqual([undefined, 'missing']);
    expect(found(read, 'echoSpacingMs')).toEqual([7.1, 'derived']);
  });

  it('says AcquisitionDuration of one volume, which is not the duration of the series', () => {
    expect(readText({ ...bold, AcquisitionDuration: 0.7 }).durationS).toBeNull();
  });

  it('of another kind, or no JSON, is told apart', () => {
    expect(readSidecar('{"Name": "a study", "BIDSVersion": "1.8.0"}')).toBe('no-sidecar');
    expect(readSidecar('[1, 2]')).toBe('no-sidecar');
    expect(readSidecar('{"EchoTime": 0.03')).toBe('not-json');
    expect(readSidecar('{"__proto__": {"EchoTime": 0.03}}')).toBe('no-sidecar');
  });

  it('made of the printed values of public protocols gives these values', () => {
    expect(publicProtocols.length).toBeGreaterThan(5);
    for (const { key, parameters } of publicProtocols) {
      const p = fillDefaults(key, parameters);
      const { family, acquisition } = classRow(key);
      const read = readText({
        MRAcquisitionType: acquisition,
        ScanningSequence: family.includes('gradient') ? ['GR'] : ['SE'],
        SequenceVariant: ['SP'],
        RepetitionTime: p.repetitionTimeMs / 1000,
        EchoTime: p.echoTimeMs / 1000,
        FlipAngle: p.flipAngleDeg,
        SliceThickness: p.sliceThicknessMm,
        ParallelReductionFactorInPlane: p.parallelFactorPhase,
        PartialFourier: p.partialFourierPhase,
        PartialFourierDirection: 'PHASE',
      });
      expect(found(read, 'repetitionTimeMs')).toEqual([p.repetitionTimeMs, 'read']);
      expect(found(read, 'echoTimeMs')).toEqual([p.echoTimeMs, 'read']);
      expect(found(read, 'sliceThicknessMm')).toEqual([p.sliceThicknessMm, 'read']);
      expect(found(read, 'parallelFactorPhase')).toEqual([p.parallelFactorPhase, 'read']);
      expect(found(read, 'partialFourierPhase')).toEqual([p.partialFourierPhase, 'read']);
      if (acquisition === '3D' && read.decision.key !== null) expect(found(read, 'partialFourierSlice')).toEqual([1, 'derived']);
    }
  });
});
