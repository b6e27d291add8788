import { type Line, span } from './line.js';
import type { Look } from './look.js';

/** Where a ratio lies on a strip: 0 is the middle, 1 twice, -1 half; no further. */
function octaves(ratio: number): number {
  return Math.min(1, Math.max(-1, Math.log2(Math.max(ratio, 1e-6))));
}

/**
 * A ratio as a strip: its middle is the preset, its length the ratio; twice and half are equally far. A mark shows the limit.
 *
 * @param columns An odd number.
 */
export function strip(ratio: number | null, limitRatio: number | null, over: boolean, columns: number, { glyphs }: Look): Line {
  const middle = (columns - 1) / 2;
  const cells = Array.from({ length: columns }, (_, at) => (at === middle ? glyphs.barMiddle : glyphs.barTrack));
  if (ratio !== null) {
    const halves = Math.round(Math.abs(octaves(ratio)) * middle * 2);
    const way = ratio < 1 ? -1 : 1;
    for (let half = 0; half < halves; half += 2) {
      const whole = half + 1 < halves;
      cells[middle + way * (half / 2 + 1)] = whole ? glyphs.barFull : way > 0 ? glyphs.barLeftHalf : glyphs.barRightHalf;
    }
  }
  const mark = limitRatio === null ? -1 : middle + Math.round(octaves(limitRatio) * middle);
  const style = over ? 'trouble' : 'plain';
  if (mark === -1) return [span(cells.join(''), style)];
  return [span(cells.slice(0, mark).join(''), style), span(glyphs.marker, 'bold'), span(cells.slice(mark + 1).join(''), style)];
}
