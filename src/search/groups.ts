import { type FigureKey, figureTable } from '../calc/figures.js';
import { isCine } from '../calc/pacing.js';
import type { ParameterKey } from '../calc/parameters.js';
import { isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import type { SearchSetting } from './setting.js';

/**
 * Variables in three groups. `shared` ones touch lines and signal alike and are gone through one by one;
 * for each of their values `lines` (voxel, lines, averages) and `signal` (timing, angles, trains) are looked at apart and joined.
 */
export interface Groups {
  readonly shared: readonly number[];
  readonly lines: readonly number[];
  readonly signal: readonly number[];
  /** A must-keep or a band ties lines and signal together in a way that no bound knows: every line variable is shared. */
  readonly tied: boolean;
}

const signalKeys: readonly ParameterKey[] = [
  'repetitionTimeMs',
  'echoTimeMs',
  'secondEchoTimeMs',
  'inversionTimeMs',
  'echoTrainLength',
  'echoSpacingMs',
  'flipAngleDeg',
  'refocusingAngleDeg',
  'fatSuppression',
  'fatSuppressionEveryLines',
  'saturationBands',
  'flowCompensation',
  'slabSelective',
  'rfPulseStretch',
  'dummyShots',
  'volumes',
  'slabs',
  'referenceScanS',
  'linesPerBeat',
  'roundsPerHold',
  'reconstruction',
];
const alwaysShared: readonly ParameterKey[] = ['matrixRead', 'pixelBandwidthHz', 'rounds', 'simultaneousSlices'];

/** Figures that follow lines and voxel alone. */
const lineFigures: readonly string[] = [
  'linesPhase',
  'linesSlice',
  'voxelReadMm',
  'voxelPhaseMm',
  'voxelSliceMm',
  'voxelVolumeMm3',
  'displayedVoxelReadMm',
  'displayedVoxelPhaseMm',
  'coverageMm',
] satisfies readonly FigureKey[];
/** Figures that follow both. */
const bothFigures: readonly string[] = [
  'scanTimeS',
  'holdTimeS',
  'tableTimeS',
  'shots',
  'relativeSnr',
  'relativeContrast',
  'minimumEchoTimeMs',
  'minimumRepetitionTimeMs',
  'chemicalShiftMm',
] satisfies readonly FigureKey[];
const carriedKeys: readonly string[] = [
  'repetitionTimeMs',
  'echoTimeMs',
  'echoSpacingMs',
  'echoTrainLength',
  'rounds',
] satisfies readonly ParameterKey[];

/** Which group a name of a must-keep or band follows. */
export type Level = 'lines' | 'signal' | 'either' | 'both';

/** Level of one name; what no variable moves is `either`. */
function levelOfName(name: string, groups: Omit<Groups, 'tied'>, setting: SearchSetting): Level {
  if (Object.hasOwn(figureTable, name)) return lineFigures.includes(name) ? 'lines' : bothFigures.includes(name) ? 'both' : 'signal';
  if (carriedKeys.includes(name)) return 'signal';
  const at = setting.variables.findIndex(({ key, sliceCounts }) => key === name || (name === 'sliceCount' && sliceCounts !== null));
  if (at < 0 || groups.shared.includes(at)) return 'either';
  return groups.lines.includes(at) ? 'lines' : 'signal';
}

/** Level of several names together. */
export function levelOf(names: readonly string[], groups: Omit<Groups, 'tied'>, setting: SearchSetting): Level {
  let level: Level = 'either';
  for (const name of names) {
    const next = levelOfName(name, groups, setting);
    if (next === 'either' || next === level) continue;
    level = level === 'either' ? next : 'both';
  }
  return level;
}

/** Figures whose bands the join itself knows: they move one way with lines and noise. */
export const noiseFigures: readonly FigureKey[] = ['relativeSnr', 'relativeContrast'];

/** Splits the variables of a search. */
export function groupsOf(setting: SearchSetting): Groups {
  const { variables, baseline, problem } = setting;
  const { key } = baseline.model;
  const volume = problem.series.acquisition === '3D';
  const p = problem.series.parameters;
  const isShared = (name: ParameterKey): boolean => {
    if (alwaysShared.includes(name)) return true;
    // In 2D the slices share TR: their number moves splits and RF.
    if (!volume && (name === 'sliceThicknessMm' || name === 'sliceCount')) return true;
    // Blades follow the train; what a train starts from follows averages where each slice is excited once.
    if (key === 'rotating-strip-fast-spin-echo/2D' && name === 'echoTrainLength') return true;
    if (name === 'averages' && (key.startsWith('single-shot') || key.startsWith('echo-planar'))) return true;
    // Head-feet a saturation band excuses wrap.
    if (name === 'saturationBands' && (p.phaseDirection === 'HF' || variables.some((variable) => variable.key === 'phaseDirection')))
      return true;
    return isCine(p) && (name === 'linesPerBeat' || name === 'sliceCount');
  };
  const indices = variables.map((_, i) => i);
  const keyOf = (i: number) => (variables[i] as { key: ParameterKey }).key;
  const shared = indices.filter((i) => isShared(keyOf(i)));
  const rest = indices.filter((i) => !shared.includes(i));
  const signal = rest.filter((i) => signalKeys.includes(keyOf(i)));
  const lines = rest.filter((i) => !signal.includes(i));
  const groups = { shared, lines, signal };
  const tied =
    setting.bands.some(
      (band) => levelOf([band.figure], groups, setting) === 'both' && !(noiseFigures.includes(band.figure) && band.atMost === null),
    ) ||
    problem.series.mustKeep.some(
      (mustKeep) => !isTimeCap(mustKeep, problem.rules) && levelOf(namesOfMustKeep(mustKeep, problem.rules), groups, setting) === 'both',
    );
  return tied ? { shared: [...shared, ...lines], lines: [], signal, tied } : { ...groups, tied };
}
