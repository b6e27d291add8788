import type { DrawnPictures } from '../picture/picture-problem.js';
import { profileOf } from '../picture/sample-picture.js';
import { pictureSentences } from '../session/picture-sentences.js';
import { pictureSet } from '../session/picture-view.js';
import type { State } from '../session/state.js';
import { fitText } from '../terminal/text-width.js';
import { beside, fill, type Line, line, span, wrap } from './line.js';
import type { Look } from './look.js';
import { picturePane, pictureView } from './picture-pane.js';
import { Plot } from './plot.js';

/** What every picture says in its frame. */
const frame = 'Computed from an invented object: an illustration, never an image of a patient';

/** Preset and now side by side as pictures of an invented object, or one with a divider; a profile and what differs below. */
export function pictureScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const { picture, place } = state;
  const drawn = picture?.seriesId === place.seriesId ? picture.drawn : null;
  const [, ...sentences] = pictureSentences(state);
  const roomy = rows >= 30;
  const words = sentences.flatMap((each) => wrap(each, columns)).map((each) => line(each));
  const wordRows = Math.min(words.length, rows >= 42 ? 16 : roomy ? 8 : 3);
  const head = line(fitText(frame, columns, look.glyphs.ellipsis), 'attention');
  if (drawn === null) {
    const said = picture?.trouble ?? (picture === null ? 'No picture yet' : 'Drawing...');
    return fill([head, ...wrap(said, columns).map((each) => line(each, picture?.trouble == null ? 'quiet' : 'trouble')), ...words], rows);
  }
  const stale = state.open.picture !== undefined ? ', drawing' : '';
  const profileRows = roomy ? 6 : 3;
  const pictureRows = rows - 2 - profileRows - 1 - wordRows;
  return fill(
    [
      head,
      ...panes(state, drawn, look, columns, pictureRows, stale),
      ...profile(drawn, look, columns, profileRows),
      ...words.slice(0, wordRows),
    ],
    rows,
  );
}

/** The pictures beside a series: whole above, close below. */
export function besidePane(state: State, look: Look, columns: number, rows: number): Line[] {
  const { picture, place } = state;
  const head = wrap(frame, columns).map((each) => line(each, 'attention'));
  const drawn = picture?.seriesId === place.seriesId ? picture.drawn : null;
  if (drawn === null) return fill([...head, line(picture?.trouble ?? 'Drawing...', 'quiet')], rows);
  const stale = state.open.picture !== undefined ? ', drawing' : '';
  const each = Math.floor((rows - head.length - 2) / 2);
  const both = [false, true].flatMap((close) => {
    const eyes = { ...state.pictureEyes, close, divider: null };
    return panes({ ...state, pictureEyes: eyes }, drawn, look, columns, each, stale);
  });
  return fill([...head, ...both], rows);
}

/** The pictures with their names above. */
function panes(state: State, drawn: DrawnPictures, look: Look, columns: number, rows: number, stale: string): Line[] {
  const { close, divider } = state.pictureEyes;
  const name = pictureSet(state).of === 'way' ? 'this way' : 'now';
  const scale = (squareMm: number, wide: number) => `${(squareMm * wide).toFixed(0)} mm wide`;
  if (divider !== null) {
    const from = Math.round(divider * columns);
    const seen = pictureView(drawn, close, columns, rows, look);
    const right = `${name}, ${scale(seen.view.squareMm, seen.view.columns)}${stale}`;
    return [dividerLine('preset', right, from, columns, look), ...picturePane(drawn, seen, { from }, columns, rows, look)];
  }
  const half = Math.floor((columns - 1) / 2);
  const seen = pictureView(drawn, close, half, rows, look);
  const wide = scale(seen.view.squareMm, seen.view.columns);
  const titles = beside([line(`preset, ${wide}`, 'first')], [line(`${name}, ${wide}${stale}`, 'second')], half, ' ', look.glyphs.ellipsis);
  const [left, right] = (['preset', 'now'] as const).map((which) => picturePane(drawn, seen, which, half, rows, look)) as [Line[], Line[]];
  return [...titles, ...left.map((each, row) => [...each, span(' '), ...(right[row] ?? [])])];
}

/** The divider stands in the line above the picture, between the names of its sides. */
function dividerLine(left: string, right: string, from: number, columns: number, { glyphs }: Look): Line {
  const at = Math.min(columns - 1, from);
  const cellsOf = (text: string, room: number) => (room <= 0 ? '' : fitText(text, room, glyphs.ellipsis).padEnd(room));
  return [span(cellsOf(left, at), 'first'), span(glyphs.verticalRule, 'inverse'), span(cellsOf(right, columns - at - 1), 'second')];
}

/** Both values along one line of the object, as two curves. */
function profile({ pair, look: object }: DrawnPictures, look: Look, columns: number, rows: number): Line[] {
  const { fromMm, toMm } = object.profile;
  const plot = new Plot(columns, rows, look);
  const curves = (['preset', 'now'] as const).map((which) => profileOf(pair[which], fromMm, toMm, 2 * columns));
  const all = curves.flat();
  const [low, high] = [Math.min(...all), Math.max(...all)];
  const place = (value: number) => Math.round(((value - low) / Math.max(high - low, 1e-12)) * (4 * rows - 1));
  curves.forEach((values, which) => {
    // Without colours the curves differ by their dots.
    for (const [x, value] of values.entries()) if (which === 0 || x % 3 === 0) plot.dot(x, place(value), which as 0 | 1);
  });
  const mm = Math.hypot(toMm[0] - fromMm[0], toMm[1] - fromMm[1]).toFixed(0);
  return [
    line(fitText(`profile of ${mm} mm across the discs: preset drawn through, now in dots`, columns, look.glyphs.ellipsis), 'quiet'),
    ...plot.lines(),
  ];
}
