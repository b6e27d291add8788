import { type FigureKey, type Figures, figureTable } from '../calc/figures.js';
import { atLeast, atMost } from '../calc/rounding.js';

/** How far a figure may move from the preset's, as a ratio: no way loses more. `contrastRatio` 0.85 means within 15 % either way. */
export type Bands = Readonly<Partial<Record<FigureKey, number>>>;

/** Bands of a search unless the user widens them (common practice, no source). Without them "shortest" would keep a fifth of the signal. */
export const usualBands: Bands = {
  relativeSnr: 0.7,
  relativeContrast: 0.7,
  contrastRatio: 0.85,
  voxelVolumeMm3: 1.7,
  voxelPhaseMm: 1.35,
  voxelSliceMm: 1.7,
  blurFwhmPx: 1.5,
};

/** One band as limits on the figure itself. */
export interface BandLimit {
  readonly figure: FigureKey;
  readonly ratio: number;
  readonly atLeast: number | null;
  readonly atMost: number | null;
}

/** Whether a larger figure is the better one; null where neither is, and the band holds both ways. */
function betterHigher(figure: FigureKey): boolean | null {
  const { better } = figureTable[figure];
  return better === 'neither' ? null : better === 'higher';
}

/** The bands as limits on figures, by the preset's own figures. A figure that the preset does not have has no band. */
export function bandLimits(bands: Bands, preset: Figures): BandLimit[] {
  return (Object.keys(bands) as FigureKey[]).flatMap((figure) => {
    const ratio = bands[figure] as number;
    const own = preset[figure];
    if (own === null) return [];
    const higher = betterHigher(figure);
    const [a, b] = [own * ratio, own * (2 - ratio)];
    if (higher === null) return [{ figure, ratio, atLeast: Math.min(a, b), atMost: Math.max(a, b) }];
    return [{ figure, ratio, atLeast: higher ? a : null, atMost: higher ? null : a }];
  });
}

/** True when a figure keeps within its band; one without a value does not. */
export function withinBand(band: BandLimit, value: number | null): boolean {
  if (value === null) return false;
  return (band.atLeast === null || atLeast(value, band.atLeast)) && (band.atMost === null || atMost(value, band.atMost));
}
