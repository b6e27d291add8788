import { encode } from 'fast-png';
import { palette } from './palette.js';
import type { Raster } from './raster.js';

/** A sheet as the bytes of a PNG file; the caption goes into the file as well, so that it stays with the pixels. */
export function pngFile({ width, height, data }: Raster, caption: string): Uint8Array {
  return encode({
    width,
    height,
    data,
    channels: 1,
    depth: 8,
    palette: palette.map((colour) => [...colour]),
    text: { Description: caption },
  });
}
