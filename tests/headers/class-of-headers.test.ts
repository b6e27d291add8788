import { describe, expect, it } from 'vitest';
import type { Attributes } from '../../src/headers/attribute-table.js';
import { classOfHeaders } from '../../src/headers/class-of-headers.js';
import { CollectedSeries } from '../../src/headers/collected-series.js';

function decide(...images: readonly Attributes[]): readonly [string | null, string] {
  const headers = images.map((attributes) => ({ source: 'dicom' as const, seriesKey: 'a', attributes }));
  const series = new CollectedSeries(headers[0]!);
  for (const header of headers) series.add(header);
  const { key, reason } = classOfHeaders(series);
  return [key, reason];
}

const spin2D: Attributes = { ScanningSequence: ['SE'], MRAcquisitionType: ['2D'] };
const gradient3D: Attributes = { ScanningSequence: ['GR'], MRAcquisitionType: ['3D'] };
const gradient2D: Attributes = { ScanningSequence: ['GR'], MRAcquisitionType: ['2D'] };

/** Terms and their meaning: DICOM PS3.3, C.8.3.1 (MR image) and C.8.13.4 (enhanced MR); thresholds are common practice, no source. */
const cases: readonly (readonly [string, readonly Attributes[], string | null, RegExp])[] = [
  ['a train of 16', [{ ...spin2D, EchoTrainLength: [16], AcquisitionMatrix: [320, 0, 0, 256] }], 'fast-spin-echo/2D', /echo train of 16/],
  ['a train of 1', [{ ...spin2D, EchoTrainLength: [1] }], 'spin-echo/2D', /EchoTrainLength 1/],
  ['no train stated', [spin2D], 'spin-echo/2D', /no echo train is stated/],
  [
    'two echoes, an image each',
    [
      { ...spin2D, EchoTrainLength: [2], EchoTime: [20] },
      { ...spin2D, EchoTrainLength: [2], EchoTime: [80] },
    ],
    'spin-echo/2D',
    /as many echo times/,
  ],
  [
    'a train for half the lines',
    [{ ...spin2D, EchoTrainLength: [140], AcquisitionMatrix: [256, 0, 0, 256] }],
    'single-shot-fast-spin-echo/2D',
    /one train reads/,
  ],
  [
    'a train for a quarter at R 2',
    [{ ...spin2D, EchoTrainLength: [70], AcquisitionMatrix: [256, 0, 0, 256], ParallelReductionFactorInPlane: [2] }],
    'single-shot-fast-spin-echo/2D',
    /one train reads/,
  ],
  [
    'FULL segments',
    [{ ...spin2D, EchoTrainLength: [60], SegmentedKSpaceTraversal: ['FULL'] }],
    'single-shot-fast-spin-echo/2D',
    /after one excitation/,
  ],
  ['a long train in 3D', [{ ...spin2D, MRAcquisitionType: ['3D'], EchoTrainLength: [220] }], 'fast-spin-echo/3D', /220/],
  [
    'a radial train',
    [{ ...spin2D, EchoTrainLength: [20], GeometryOfKSpaceTraversal: ['RADIAL'] }],
    'rotating-strip-fast-spin-echo/2D',
    /RADIAL/,
  ],
  ['a spiral', [{ ...spin2D, GeometryOfKSpaceTraversal: ['SPIRAL'] }], null, /SPIRAL/],
  ['inversion alone', [{ ScanningSequence: ['IR'], MRAcquisitionType: ['2D'], EchoTrainLength: [12] }], 'fast-spin-echo/2D', /without GR/],
  ['spoiled', [{ ...gradient3D, SequenceVariant: ['SK', 'SP'] }], 'spoiled-gradient-echo/3D', /SequenceVariant SP/],
  ['spoiled by RF', [{ ...gradient2D, Spoiling: ['RF'] }], 'spoiled-gradient-echo/2D', /Spoiling RF/],
  ['free precession', [{ ...gradient2D, SteadyStatePulseSequence: ['FREE_PRECESSION'] }], 'balanced-steady-state/2D', /FREE_PRECESSION/],
  [
    'free precession and spoiled',
    [{ ...gradient2D, SteadyStatePulseSequence: ['FREE_PRECESSION'], SequenceVariant: ['SP'] }],
    null,
    /contradict/,
  ],
  [
    'steady state, echo in the middle',
    [{ ...gradient2D, SequenceVariant: ['SS'], RepetitionTime: [3.4], EchoTime: [1.7] }],
    'balanced-steady-state/2D',
    /half of a short TR/,
  ],
  [
    'steady state, echo elsewhere',
    [{ ...gradient2D, SequenceVariant: ['SS'], RepetitionTime: [20], EchoTime: [4] }],
    null,
    /may be balanced or not/,
  ],
  ['transverse steady state', [{ ...gradient2D, SteadyStatePulseSequence: ['TRANSVERSE'] }], null, /neither spoiled nor balanced/],
  ['time-reversed', [{ ...gradient3D, SequenceVariant: ['TRSS'] }], null, /time-reversed/],
  ['nothing said', [gradient2D], null, /nothing says spoiled or balanced/],
  [
    'inversion, 3D',
    [{ ...gradient3D, SequenceVariant: ['SP', 'MP'], InversionTime: [900] }],
    'inversion-prepared-gradient-echo/3D',
    /inversion time/,
  ],
  ['inversion, 2D', [{ ...gradient2D, SequenceVariant: ['SP', 'MP'], InversionTime: [900] }], null, /not modelled/],
  [
    'trains of readouts, prepared by what is not said',
    [{ ...gradient3D, Spoiling: ['RF'], GradientEchoTrainLength: [225] }],
    null,
    /what prepares them/,
  ],
  ['an inversion time of 0', [{ ...gradient3D, SequenceVariant: ['SP'], InversionTime: [0] }], 'spoiled-gradient-echo/3D', /SP/],
  ['echo-planar, spin', [{ ScanningSequence: ['EP', 'SE'], MRAcquisitionType: ['2D'] }], 'echo-planar-spin-echo/2D', /echo-planar/],
  ['echo-planar, gradient', [{ ScanningSequence: ['EP', 'GR'], MRAcquisitionType: ['2D'] }], 'echo-planar-gradient-echo/2D', /echo-planar/],
  ['echo-planar alone', [{ ScanningSequence: ['EP'], MRAcquisitionType: ['2D'], FlipAngle: [90] }], null, /neither EchoPulseSequence nor/],
  [
    'echo-planar alone, diffusion',
    [{ ScanningSequence: ['EP'], MRAcquisitionType: ['2D'], DiffusionBValue: [1000] }],
    'echo-planar-spin-echo/2D',
    /diffusion/,
  ],
  [
    'echo-planar alone, small angle',
    [{ ScanningSequence: ['EP'], MRAcquisitionType: ['2D'], FlipAngle: [52] }],
    'echo-planar-gradient-echo/2D',
    /well under 90/,
  ],
  ['echo-planar, 3D', [{ ScanningSequence: ['EP', 'GR'], MRAcquisitionType: ['3D'] }], null, /not modelled/],
  ['both kinds of echo', [{ ScanningSequence: ['SE', 'GR'], MRAcquisitionType: ['2D'] }], null, /one train/],
  ['both kinds, enhanced', [{ EchoPulseSequence: ['BOTH'], MRAcquisitionType: ['2D'] }], null, /one train/],
  ['research alone', [{ ScanningSequence: ['RM'], MRAcquisitionType: ['2D'] }], null, /tells a spin echo/],
  ['2D or 3D not said', [{ ScanningSequence: ['SE'] }], null, /2D or 3D/],
  ['another nucleus', [{ ...spin2D, ImagedNucleus: ['23NA'] }], null, /not hydrogen/],
];

describe('the class that headers tell', () => {
  it.each(cases)('%s', (_, images, key, reason) => {
    const [found, why] = decide(...images);
    expect(found).toBe(key);
    expect(why).toMatch(reason);
  });
});
