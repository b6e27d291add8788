import { type Line, line } from './line.js';
import type { Look } from './look.js';

/** How far a long work is; nothing while it has only just begun. */
export function shareBar(share: number | null, { glyphs }: Look, columns: number): Line[] {
  if (share === null) return [];
  const width = Math.min(columns, 60);
  const full = Math.round(share * width);
  return [line(`${glyphs.barFull.repeat(full)}${glyphs.barTrack.repeat(width - full)}`)];
}
