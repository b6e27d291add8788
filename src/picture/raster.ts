import { glyphDots, glyphSize } from './bitmap-font.js';

/** A sheet of pixels to draw on: numbers of the palette, row after row. */
export interface Raster {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8Array;
}

/** An empty sheet of one colour. */
export function rasterOf(width: number, height: number, colour: number): Raster {
  const raster = { width, height, data: new Uint8Array(width * height).fill(colour) };
  return raster;
}

/** Colours one pixel; beyond the sheet nothing happens. */
export function setPixel({ width, height, data }: Raster, x: number, y: number, colour: number): void {
  if (x < 0 || y < 0 || x >= width || y >= height) return;
  data[y * width + x] = colour;
}

/** Fills a box. */
export function fillBox(raster: Raster, left: number, top: number, width: number, height: number, colour: number): void {
  for (let y = top; y < top + height; y += 1) for (let x = left; x < left + width; x += 1) setPixel(raster, x, y, colour);
}

/** Draws the rim of a box, `thick` pixels inwards. */
export function drawBox(raster: Raster, left: number, top: number, width: number, height: number, colour: number, thick = 1): void {
  fillBox(raster, left, top, width, thick, colour);
  fillBox(raster, left, top + height - thick, width, thick, colour);
  fillBox(raster, left, top, thick, height, colour);
  fillBox(raster, left + width - thick, top, thick, height, colour);
}

/** Draws a straight line, two pixels wide: equal steps along its longer side. */
export function drawLine(raster: Raster, x0: number, y0: number, x1: number, y1: number, colour: number): void {
  const steps = Math.max(1, Math.ceil(Math.max(Math.abs(x1 - x0), Math.abs(y1 - y0))));
  for (let i = 0; i <= steps; i += 1) {
    fillBox(raster, Math.round(x0 + ((x1 - x0) * i) / steps), Math.round(y0 + ((y1 - y0) * i) / steps), 2, 2, colour);
  }
}

/** Pixels of a text: width of its characters and their height, each dot `scale` pixels. */
export function textPixels(text: string, scale: number): { readonly width: number; readonly height: number } {
  return { width: [...text].length * glyphSize.stepColumns * scale, height: glyphSize.stepRows * scale };
}

/** Writes a text with its upper left corner at a place. */
export function drawText(raster: Raster, left: number, top: number, text: string, colour: number, scale: number): void {
  [...text].forEach((character, i) => {
    glyphDots(character).forEach((row, y) => {
      row.forEach((ink, x) => {
        if (ink) fillBox(raster, left + (i * glyphSize.stepColumns + x) * scale, top + y * scale, scale, scale, colour);
      });
    });
  });
}
