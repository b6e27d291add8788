import type { GivenParameters } from '../calc/series.js';

/** A session shown without a patient: which preset, what the patient allows, one series rewritten in some ways. */
export interface DemoSession {
  readonly title: string;
  readonly note: string;
  readonly presetId: string;
  readonly limits: { readonly holdS: number; readonly minutes: number };
  readonly rewrites: {
    readonly seriesId: string;
    readonly tries: readonly { readonly words: string; readonly set: GivenParameters }[];
  };
}

/** The demo session. Patient, limits and rewrites are invented. */
export const demoSession: DemoSession = {
  title: 'Demo session, invented',
  note: 'No real patient: this one, with 11 s a breath-hold and 25 minutes, is invented.',
  presetId: 'liver-3t',
  limits: { holdS: 11, minutes: 25 },
  rewrites: {
    seriesId: 't1-3d',
    tries: [
      { words: 'as the preset has it', set: {} },
      { words: '54 slices of 4 mm', set: { sliceThicknessMm: 4, sliceCount: 54 } },
      { words: '44 slices of 5 mm', set: { sliceThicknessMm: 5, sliceCount: 44 } },
      { words: '4 mm, phase voxel 2.3 mm', set: { sliceThicknessMm: 4, sliceCount: 54, matrixPhase: 165 } },
    ],
  },
};
