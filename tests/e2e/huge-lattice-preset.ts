import { liverArterialPhase } from '../scenarios/invented-parameters.js';

/** 3D T1 of the liver in which so much is opened that its lattice holds more than 10^12 ways, read matrix and bandwidth among them. Invented. */
export const hugeLatticePreset = {
  format: 'holdfast preset',
  version: 1,
  id: 'huge-liver',
  title: 'Liver, everything opened',
  region: 'liver',
  fieldT: 3,
  series: [
    {
      id: 't1',
      title: 'T1',
      plane: 'axial',
      family: 'spoiled-gradient-echo',
      acquisition: '3D',
      target: 'liver',
      comparison: 'spleen',
      parameters: liverArterialPhase,
      opened: [
        'flipAngleDeg',
        'pixelBandwidthHz',
        'matrixRead',
        'fieldOfViewMm',
        'sliceCount',
        'phaseFieldOfViewPercent',
        'phaseOversamplingPercent',
        'referenceLines',
        'saturationBands',
      ],
    },
  ],
};
