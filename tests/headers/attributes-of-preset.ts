import type { StudySeries } from '../../src/study/study.js';
import { type Attribute, decimal, enhancedMrImage, mrImage } from './dicom-object.js';

/** Pulse sequence attributes of each family (PS3.3, C.8.3.1 and C.8.13.4), as a scanner would state them. */
const sequences: Readonly<Record<string, { readonly scanning: string; readonly variant: string; readonly more: readonly Attribute[] }>> = {
  'spin-echo': { scanning: 'SE', variant: 'NONE', more: [] },
  'fast-spin-echo': { scanning: 'SE', variant: 'SK', more: [cs('0018,9033', 'PARTIAL'), cs('0018,9034', 'LINEAR')] },
  'single-shot-fast-spin-echo': { scanning: 'SE', variant: 'SK', more: [cs('0018,9033', 'FULL')] },
  'rotating-strip-fast-spin-echo': { scanning: 'SE', variant: 'SK', more: [cs('0018,9032', 'RADIAL')] },
  'spoiled-gradient-echo': { scanning: 'GR', variant: 'SP', more: [cs('0018,9016', 'RF')] },
  'balanced-steady-state': { scanning: 'GR', variant: 'SS', more: [cs('0018,9017', 'FREE_PRECESSION')] },
  'inversion-prepared-gradient-echo': { scanning: 'GR\\IR', variant: 'SP\\MP', more: [] },
  'echo-planar-gradient-echo': { scanning: 'EP\\GR', variant: 'SS', more: [cs('0018,9018', 'YES')] },
  'echo-planar-spin-echo': { scanning: 'EP\\SE', variant: 'NONE', more: [cs('0018,9018', 'YES')] },
};

function cs(tag: string, value: string): Attribute {
  return { tag, vr: 'CS', value };
}
const ds = (tag: string, ...values: number[]): Attribute => ({ tag, vr: 'DS', value: decimal(...values) });
const is = (tag: string, value: number): Attribute => ({ tag, vr: 'IS', value: String(value) });
const us = (tag: string, ...value: number[]): Attribute => ({ tag, vr: 'US', value });
const fd = (tag: string, ...value: number[]): Attribute => ({ tag, vr: 'FD', value });
const ui = (tag: string, value: string): Attribute => ({ tag, vr: 'UI', value });
const sq = (tag: string, ...items: (readonly Attribute[])[]): Attribute => ({ tag, vr: 'SQ', value: items });

type Vector = readonly [number, number, number];
const axes: Readonly<Record<string, Vector>> = { RL: [1, 0, 0], AP: [0, 1, 0], HF: [0, 0, -1] };
/** Body axes along the rows and along the columns of a picture. */
const planes: Readonly<Record<string, readonly [string, string]>> = { axial: ['RL', 'AP'], sagittal: ['AP', 'HF'], coronal: ['RL', 'HF'] };

interface Placed {
  readonly row: Vector;
  readonly column: Vector;
  /** True where phase encoding runs along the rows. */
  readonly alongRows: boolean;
}

/** Orientation of the picture, tilted where the plane is said to be oblique, so that phase encoding runs along its body axis. */
function placed({ plane, parameters }: StudySeries): Placed {
  const named = Object.keys(planes).find((name) => plane.startsWith(name) && planes[name]!.includes(parameters.phaseDirection));
  const [row, column] = planes[named ?? 'axial'] as readonly [string, string];
  const tilt = plane.includes('oblique') ? Math.PI / 10 : 0;
  const alongRows = row === parameters.phaseDirection;
  const normal = Object.keys(axes).find((axis) => axis !== row && axis !== column) as string;
  // Turned about the phase axis, which stays where it is.
  const turned = axes[alongRows ? column : row]!.map(
    (part, i) => Math.cos(tilt) * part + Math.sin(tilt) * axes[normal]![i]!,
  ) as unknown as Vector;
  return { row: alongRows ? axes[row]! : turned, column: alongRows ? turned : axes[column]!, alongRows };
}

function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

/** One image: what all images of the series share, and what it has of its own. */
export interface PresetImages {
  readonly shared: readonly Attribute[];
  readonly own: readonly (readonly Attribute[])[];
}

/** How much a scanner writes: everything the standard has a keyword for, or the acquisition's duration as well. */
export interface WriteHow {
  readonly durationS?: number;
}

/** A series of a preset as attributes of its images: each parameter that has a keyword is stated by it. */
export function imagesOfPreset(series: StudySeries, fieldT: number, how: WriteHow = {}): PresetImages {
  const p = series.parameters;
  const sequence = sequences[series.family]!;
  const inverted = p.inversionTimeMs !== undefined && !sequence.scanning.includes('IR');
  const { row, column, alongRows } = placed(series);
  const normal = cross(row, column);
  const readPoints = p.displayMatrix ?? p.matrixRead;
  const phasePoints = Math.max(1, Math.round((readPoints * p.phaseFieldOfViewPercent) / 100));
  const lines = Math.max(1, Math.round((p.matrixPhase * p.phaseFieldOfViewPercent) / 100));
  const spacing = p.fieldOfViewMm / readPoints;
  const is3D = series.acquisition === '3D';
  const partial = [p.partialFourierPhase < 1 ? 'PHASE' : '', p.partialFourierSlice < 1 ? 'SLICE_SELECT' : ''].filter((word) => word !== '');
  const over =
    (p.phaseOversamplingPercent > 0 ? '2D' : '') + (p.sliceOversamplingPercent > 0 ? (p.phaseOversamplingPercent > 0 ? '_3D' : '3D') : '');
  const suppression = p.fatSuppression === 'spectral' ? 'FAT' : 'NONE';
  const options = [
    ...(p.pacing.kind === 'cardiac-gate' ? ['CG'] : []),
    ...(p.pacing.kind === 'respiratory-trigger' ? ['RG'] : []),
    ...(p.flowCompensation ? ['FC'] : []),
    ...(p.partialFourierPhase < 1 ? ['PFP'] : []),
    ...(p.fatSuppression === 'spectral' ? ['FS'] : []),
    ...(p.saturationBands > 0 ? ['SP'] : []),
  ];
  const held = p.pacing.kind === 'breath-hold' || p.pacing.breathHold === true;
  const shared: Attribute[] = [
    cs('0008,0060', 'MR'),
    cs('0018,0020', inverted ? `${sequence.scanning}\\IR` : sequence.scanning),
    cs('0018,0021', sequence.variant),
    cs('0018,0022', options.join('\\')),
    cs('0018,0023', series.acquisition),
    ds('0018,0050', p.sliceThicknessMm),
    ds('0018,0080', p.repetitionTimeMs),
    ...(p.inversionTimeMs === undefined ? [] : [ds('0018,0082', p.inversionTimeMs)]),
    ds('0018,0087', fieldT),
    ds('0018,0088', is3D ? p.sliceThicknessMm : Number((p.sliceThicknessMm + p.sliceGapMm).toFixed(6))),
    is('0018,0091', p.echoTrainLength),
    ds('0018,0093', (100 * p.matrixPhase) / p.matrixRead),
    ds('0018,0094', p.phaseFieldOfViewPercent),
    ds('0018,0095', p.pixelBandwidthHz),
    ...(p.pacing.kind === 'cardiac-gate' && p.pacing.periodMs !== undefined ? [is('0018,1062', p.pacing.periodMs)] : []),
    ds('0018,1100', p.fieldOfViewMm),
    us('0018,1310', ...(alongRows ? [0, p.matrixRead, lines, 0] : [p.matrixRead, 0, 0, lines])),
    cs('0018,1312', alongRows ? 'ROW' : 'COL'),
    ds('0018,1314', p.flipAngleDeg),
    ...sequence.more,
    cs('0018,9010', p.flowCompensation ? 'OTHER' : 'NONE'),
    cs('0018,9025', suppression),
    cs('0018,9026', p.fatSuppression === 'water-excitation' ? 'WATER' : 'NONE'),
    cs('0018,9027', p.saturationBands > 0 ? 'SLAB' : 'NONE'),
    ...(p.saturationBands > 0 ? [sq('0018,9107', ...Array.from({ length: p.saturationBands }, () => [fd('0018,9104', 60)]))] : []),
    cs('0018,9029', over === '' ? 'NONE' : over),
    fd('0018,9069', p.parallelFactorPhase),
    ...(how.durationS === undefined ? [] : [fd('0018,9073', how.durationS)]),
    cs('0018,9081', partial.length === 0 ? 'NO' : 'YES'),
    ...(partial.length === 0 ? [] : [cs('0018,9036', partial.length === 2 ? 'COMBINATION' : partial[0]!)]),
    cs('0018,9094', p.ellipticalSampling ? 'ELLIPSOIDAL' : 'FULL'),
    fd('0018,9155', p.parallelFactorSlice),
    cs('0018,9170', held ? 'BREATH_HOLD' : p.pacing.kind === 'respiratory-trigger' ? 'GATING' : 'NONE'),
    cs('0018,9037', p.pacing.kind === 'cardiac-gate' ? 'PROSPECTIVE' : 'NONE'),
    is('0020,0011', series.priority),
    is('0020,0105', p.volumes),
    us('0028,0010', alongRows ? readPoints : phasePoints),
    us('0028,0011', alongRows ? phasePoints : readPoints),
    ds('0028,0030', spacing, spacing),
    ds('0020,0037', ...row, ...column),
  ];
  const step = p.sliceThicknessMm + (is3D ? 0 : p.sliceGapMm);
  const places = Array.from({ length: p.sliceCount }, (_, i) =>
    ds('0020,0032', ...normal.map((part) => Number((part * i * step).toFixed(4)))),
  );
  return { shared, own: places.flatMap((place) => kinds(series).map((kind) => [place, ...kind])) };
}

/** Echoes, or b-values with their directions: the images of one place. */
function kinds({ parameters: p }: StudySeries): readonly (readonly Attribute[])[] {
  const echo = ds('0018,0081', p.echoTimeMs);
  if (p.diffusion !== undefined) {
    const { bValuesSPerMm2, directions, averages } = p.diffusion;
    return bValuesSPerMm2.flatMap((b, i) =>
      Array.from({ length: b === 0 ? 1 : directions }, (_, direction) => [
        echo,
        ds('0018,0083', averages[i]!),
        fd('0018,9087', b),
        cs('0018,9075', b === 0 ? 'NONE' : 'DIRECTIONAL'),
        ...(b === 0 ? [] : [fd('0018,9089', ...onSphere(direction, directions))]),
      ]),
    );
  }
  const averages = ds('0018,0083', p.averages);
  return [p.echoTimeMs, ...(p.secondEchoTimeMs === undefined ? [] : [p.secondEchoTimeMs])].map((time) => [ds('0018,0081', time), averages]);
}

/** Different directions of length one. */
function onSphere(i: number, of: number): Vector {
  const z = 1 - (2 * i + 1) / (2 * of);
  const angle = i * 2.4;
  const flat = Math.sqrt(1 - z * z);
  return [flat * Math.cos(angle), flat * Math.sin(angle), z];
}

/** The images as single-frame objects of one series. */
export function singleFrames({ shared, own }: PresetImages, seriesUid: string): readonly (readonly Attribute[])[] {
  return own.map((image, i) => [
    ui('0008,0016', mrImage),
    ui('0008,0018', `${seriesUid}.${i + 1}`),
    ui('0020,000d', '1.2.826.0.1.1'),
    ui('0020,000e', seriesUid),
    is('0020,0013', i + 1),
    ...shared,
    ...image,
  ]);
}

/** Which functional group an attribute of an enhanced object stands in (PS3.3, C.7.6.16 and C.8.13.5); those that are not here stand in the data set itself. */
const groups: Readonly<Record<string, readonly string[]>> = {
  '0028,9110': ['0018,0050', '0018,0088', '0028,0030'],
  '0018,9112': ['0018,0080', '0018,1314', '0018,0091'],
  '0018,9125': ['0018,1312', '0018,0093', '0018,0094'],
  '0018,9006': ['0018,0095'],
  '0018,9115': ['0018,9069', '0018,9155', '0018,9081', '0018,9036', '0018,9010', '0018,9026', '0018,9027', '0018,9107', '0018,0082'],
  '0020,9116': ['0020,0037'],
  '0020,9113': ['0020,0032'],
  '0018,9114': ['0018,9082'],
  '0018,9119': ['0018,0083'],
  '0018,9117': ['0018,9087', '0018,9075', '0018,9076'],
};

function grouped(attributes: readonly Attribute[]): { readonly inGroups: readonly Attribute[]; readonly outside: readonly Attribute[] } {
  const inGroups = Object.entries(groups).flatMap(([tag, members]) => {
    const own = attributes.filter((attribute) => members.includes(attribute.tag));
    return own.length === 0 ? [] : [sq(tag, own)];
  });
  return { inGroups, outside: attributes.filter(({ tag }) => !Object.values(groups).some((members) => members.includes(tag))) };
}

/** The images as one enhanced object: what is shared in the shared functional groups, the rest frame by frame. */
export function enhancedObject({ shared, own }: PresetImages, seriesUid: string): readonly Attribute[] {
  const { inGroups, outside } = grouped(shared);
  const frames = own.map((image) => {
    // Enhanced objects call the echo time effective, and put directions one sequence deeper.
    const renamed = image.flatMap((attribute): readonly Attribute[] => {
      if (attribute.tag === '0018,0081') return [fd('0018,9082', Number(attribute.value))];
      return attribute.tag === '0018,9089' ? [sq('0018,9076', [attribute])] : [attribute];
    });
    return grouped(renamed).inGroups;
  });
  return [
    ui('0008,0016', enhancedMrImage),
    ui('0008,0018', `${seriesUid}.1`),
    ui('0020,000d', '1.2.826.0.1.1'),
    ui('0020,000e', seriesUid),
    is('0020,0013', 1),
    is('0028,0008', own.length),
    ...outside,
    sq('5200,9229', inGroups),
    sq('5200,9230', ...frames),
  ];
}
