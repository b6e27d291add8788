import { hasRfCap } from './limits.js';
import type { SearchProblem } from './problem-to-solve.js';

/** What else the trade does where no way fits, or before one is taken: words, never ways (common practice, no source). */
export function otherMoves({ series, limits, set }: Pick<SearchProblem, 'series' | 'limits' | 'set'>): string[] {
  const moves: string[] = [];
  const swapped = set.phaseDirection !== undefined && set.phaseDirection !== series.parameters.phaseDirection;
  if (swapped && series.plane === 'axial')
    moves.push(
      'leave phase as it was and set saturation bands above and below first: they weaken the ghosts of blood that flows in, and take no time',
    );
  if (limits.holdS !== undefined) {
    moves.push(
      'coach, and practise the hold once; hold at the end of expiration',
      'give oxygen where it is prescribed: it may restore the preset',
    );
    if (series.purpose === 'dynamic') moves.push('a timed contrast phase is never split: its parts would show different moments');
    moves.push('another class: respiratory-triggered, single-shot or radial');
  }
  if (limits.timeS !== undefined)
    moves.push('another class, single-shot for one', 'give up the least useful series of the session, and say why');
  if (hasRfCap(limits))
    moves.push(
      'another class: a gradient echo for a train',
      'drop a fat-saturation pulse by hand, or split the slices over two acquisitions',
    );
  return moves;
}
