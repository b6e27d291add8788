import type { ObjectFile } from '../study/object-file.js';
import type { PicturePair } from './picture-pair.js';
import { valueAt } from './sample-picture.js';

/** Values that are drawn black and white. */
export type PictureWindow = readonly [number, number];

/** Window of the whole pictures: from nothing to white. */
export function wholeWindow({ white }: PicturePair): PictureWindow {
  return [0, white];
}

/** Window of the squares: the range of both, the brightest and darkest half percent aside, so that small differences are seen. */
export function squareWindow({ preset, now, white }: PicturePair, { zoom }: ObjectFile['look']): PictureWindow {
  const steps = 120;
  const values = new Float64Array(2 * steps * steps);
  for (const [which, picture] of [preset, now].entries()) {
    for (let i = 0; i < steps * steps; i += 1) {
      const x = zoom.atMm[0] + (((i % steps) + 0.5) / steps - 0.5) * zoom.sideMm;
      const y = zoom.atMm[1] + ((Math.floor(i / steps) + 0.5) / steps - 0.5) * zoom.sideMm;
      values[which * steps * steps + i] = valueAt(picture, x, y);
    }
  }
  values.sort();
  const at = (share: number) => values[Math.round(share * (values.length - 1))] as number;
  const [low, high] = [at(0.005), at(0.995)];
  return high - low > 1e-6 * white ? [low, high] : [low - white / 2, low + white / 2];
}
