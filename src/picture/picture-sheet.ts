import type { ObjectFile, PlanePoint } from '../study/object-file.js';
import { greyOf, inks } from './palette.js';
import type { Picture } from './picture.js';
import type { PicturePair } from './picture-pair.js';
import { type PictureWindow, squareWindow, wholeWindow } from './picture-window.js';
import { drawBox, drawLine, drawText, fillBox, type Raster, rasterOf, setPixel, textPixels } from './raster.js';
import { extentOf, profileOf, valueAt } from './sample-picture.js';

/** What every picture says in its frame. */
export const frameWords = 'Illustration of the model, computed from an invented object. Never an image of a patient.';

/** Words of a sheet, put together by whoever draws it. */
export interface SheetWords {
  /** What is compared, one line or several. */
  readonly title: readonly string[];
  /** Name of the second picture: what was changed. */
  readonly now: string;
  /** Figures beside the pictures. */
  readonly figures: readonly string[];
  readonly notes: readonly string[];
}

const margin = 16;
const panel = 448;
const width = 3 * margin + 2 * panel;
const scale = 2;
const lineHeight = textPixels('x', scale).height;
const chartHeight = 190;
const profileSteps = 400;

/** Draws both pictures on one sheet: whole, a square of each larger, the profile along one line, figures and notes. */
export function pictureSheet(pair: PicturePair, object: ObjectFile, words: SheetWords): Raster {
  const extents = [extentOf(pair.preset), extentOf(pair.now)];
  const across = Math.max(...extents.map(([x]) => x));
  const down = Math.max(...extents.map(([, y]) => y));
  const wholeHeight = Math.max(80, Math.min(panel, Math.round((panel * down) / across)));
  const pixelMm = Math.max(across / panel, down / wholeHeight);
  const window = squareWindow(pair, object.look);
  const lines = (texts: readonly string[]) => texts.flatMap((text) => wrapped(text, width - 2 * margin));
  const head = lines(words.title);
  const frame = lines([frameWords]);
  const figures = lines(words.figures);
  const notes = lines([...words.notes, `Object: ${object.title} (${object.id}), plain shapes, invented.`]);
  const textLines = head.length + frame.length + figures.length + notes.length + 3;
  const height = textLines * lineHeight + wholeHeight + panel + chartHeight + 6 * margin;
  const sheet = rasterOf(width, height, inks.paper);
  let top = margin;
  const write = (texts: readonly string[], colour: number) => {
    for (const text of texts) {
      drawText(sheet, margin, top, text, colour, scale);
      top += lineHeight;
    }
  };
  write(head, inks.ink);
  write(frame, inks.now);
  top += margin / 2;

  const sides = [
    { picture: pair.preset, left: margin, colour: inks.preset, name: 'preset' },
    { picture: pair.now, left: 2 * margin + panel, colour: inks.now, name: words.now },
  ];
  for (const { left, colour, name } of sides) drawText(sheet, left, top, shortened(name, panel), colour, scale);
  top += lineHeight;
  const { zoom, profile } = object.look;
  for (const { picture, left, colour } of sides) {
    const view = { left, top, width: panel, height: wholeHeight, pixelMm, middleMm: [0, 0] as const };
    drawPicture(sheet, picture, view, wholeWindow(pair));
    drawBox(sheet, left, top, panel, wholeHeight, colour, 2);
    const [x, y] = placeIn(view, [zoom.atMm[0] - zoom.sideMm / 2, zoom.atMm[1] - zoom.sideMm / 2]);
    const side = Math.round(zoom.sideMm / pixelMm);
    drawBox(sheet, x, y, side, side, inks.quiet);
    scaleBar(sheet, view, barLength(across));
  }
  top += wholeHeight + margin;

  for (const { picture, left, colour } of sides) {
    const view = { left, top, width: panel, height: panel, pixelMm: zoom.sideMm / panel, middleMm: zoom.atMm };
    drawPicture(sheet, picture, view, window);
    drawBox(sheet, left, top, panel, panel, colour, 2);
    // Marks at both edges show the line of the profile without covering it.
    const [x0, y0] = placeIn(view, profile.fromMm);
    const [x1, y1] = placeIn(view, profile.toMm);
    if (y0 === y1) for (const x of [left + 2, left + panel - 14]) fillBox(sheet, x, y0 - 1, 12, 3, inks.quiet);
    else drawLine(sheet, x0, y0, x1, y1, inks.quiet);
    scaleBar(sheet, view, barLength(zoom.sideMm));
  }
  top += panel + margin;

  write([`square above: ${percent(window[0], pair.white)} to ${percent(window[1], pair.white)} of white, in both`], inks.quiet);
  const [far, deep] = [profile.toMm[0] - profile.fromMm[0], profile.toMm[1] - profile.fromMm[1]];
  write([`profile between the marks, ${Math.hypot(far, deep).toFixed(0)} mm`], inks.quiet);
  drawBox(sheet, margin, top, width - 2 * margin, chartHeight, inks.quiet);
  const profiles = sides.map(({ picture, colour }) => ({ colour, values: profileOf(picture, profile.fromMm, profile.toMm, profileSteps) }));
  const all = profiles.flatMap(({ values }) => values);
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const rise = (chartHeight - 12) / Math.max(high - low, 1e-9);
  for (const { colour, values } of profiles) {
    const x = (i: number) => margin + 2 + (i / (profileSteps - 1)) * (width - 2 * margin - 6);
    const y = (i: number) => top + chartHeight - 7 - ((values[i] as number) - low) * rise;
    for (let i = 1; i < profileSteps; i += 1) drawLine(sheet, x(i - 1), y(i - 1), x(i), y(i), colour);
  }
  top += chartHeight + margin;
  write(figures, inks.ink);
  write(notes, inks.quiet);
  return sheet;
}

interface View {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly pixelMm: number;
  readonly middleMm: PlanePoint;
}

function percent(value: number, white: number): string {
  return `${Math.round((100 * value) / white)} %`;
}

/** Pixel of a place in a view. */
function placeIn({ left, top, width: wide, height, pixelMm, middleMm }: View, [x, y]: PlanePoint): [number, number] {
  return [Math.round(left + wide / 2 + (x - middleMm[0]) / pixelMm), Math.round(top + height / 2 + (y - middleMm[1]) / pixelMm)];
}

function drawPicture(sheet: Raster, picture: Picture, view: View, [black, white]: PictureWindow): void {
  for (let j = 0; j < view.height; j += 1) {
    for (let i = 0; i < view.width; i += 1) {
      const x = view.middleMm[0] + (i + 0.5 - view.width / 2) * view.pixelMm;
      const y = view.middleMm[1] + (j + 0.5 - view.height / 2) * view.pixelMm;
      setPixel(sheet, view.left + i, view.top + j, greyOf((valueAt(picture, x, y) - black) / (white - black)));
    }
  }
}

/** A round length of about a fifth of an extent. */
function barLength(extentMm: number): number {
  return [200, 100, 50, 20, 10, 5, 2, 1].find((mm) => mm <= extentMm / 4) ?? 1;
}

function scaleBar(sheet: Raster, view: View, mm: number): void {
  const long = Math.round(mm / view.pixelMm);
  const [x, y] = [view.left + 12, view.top + view.height - 14];
  fillBox(sheet, x - 2, y - 2, long + 4, 8, inks.paper);
  fillBox(sheet, x, y, long, 4, inks.ink);
  const text = `${mm} mm`;
  const size = textPixels(text, scale);
  fillBox(sheet, x - 2, y - size.height, size.width, size.height - 4, inks.paper);
  drawText(sheet, x, y - size.height + 1, text, inks.ink, scale);
}

/** A text broken at blanks into lines of so many pixels. */
function wrapped(text: string, pixels: number): string[] {
  const most = Math.floor(pixels / textPixels('x', scale).width);
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1];
    if (last === undefined || last.length + 1 + word.length > most) lines.push(word.slice(0, most));
    else lines[lines.length - 1] = `${last} ${word}`;
  }
  return lines;
}

function shortened(text: string, pixels: number): string {
  const most = Math.floor(pixels / textPixels('x', scale).width);
  return text.length <= most ? text : `${text.slice(0, most - 3)}...`;
}
