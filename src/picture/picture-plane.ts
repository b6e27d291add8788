import type { PhaseDirection } from '../calc/series.js';

/** How the body lies in a picture, and which way phase is encoded. */
export interface PicturePlane {
  /** Body axes of the picture: to the right, and downwards. */
  readonly across: PhaseDirection;
  readonly down: PhaseDirection;
  /** True where phase is encoded up and down, false where across. */
  readonly phaseIsDown: boolean;
}

/**
 * The picture plane of a series: of an oblique plane the one it leans from; planes along the heart's axes are drawn as axial. A phase
 * direction that does not lie in the plane is drawn up and down.
 */
export function picturePlane(plane: string, phaseDirection: PhaseDirection): PicturePlane {
  const words = plane.toLowerCase();
  const [across, down]: [PhaseDirection, PhaseDirection] = words.includes('sag')
    ? ['AP', 'HF']
    : words.includes('cor')
      ? ['RL', 'HF']
      : ['RL', 'AP'];
  return { across, down, phaseIsDown: phaseDirection !== across };
}
