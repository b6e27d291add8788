/**
 * The look of a cell as a string of SGR parameters in a fixed order (`1;31`), empty for plain text. Two cells look the
 * same exactly when these are equal, and `ESC [ 0 ; style m` sets the look whatever it was before.
 */
export type Style = string;

interface Look {
  /** On or off, in the order of the codes that turn them on. */
  readonly marks: readonly number[];
  readonly foreground: string;
  readonly background: string;
}

/** SGR codes that turn a mark on, and the code that turns it off again (ECMA-48 8.3.117). 53 (overlined) is not among
 * them: it marks the cell for the cursor, see `cursor-mark.ts`. */
const offCodes: ReadonlyMap<number, number> = new Map([
  [1, 22],
  [2, 22],
  [3, 23],
  [4, 24],
  [5, 25],
  [7, 27],
  [8, 28],
  [9, 29],
]);

const parsed = new Map<Style, Look>([['', { marks: [], foreground: '', background: '' }]]);
const mostKeptLooks = 2000;

function styleOf(look: Look): Style {
  return [...[...look.marks].sort((a, b) => a - b), look.foreground, look.background].filter((part) => part !== '').join(';');
}

function lookOf(style: Style): Look {
  return parsed.get(style) ?? applyTo({ marks: [], foreground: '', background: '' }, style.split(';').map(Number));
}

/** The colour that begins at `codes[at]` after 38 or 48, as parameters, and how many codes it takes. */
function extendedColour(codes: readonly number[], at: number): [string, number] {
  if (codes[at + 1] === 5 && codes[at + 2] !== undefined) return [codes.slice(at, at + 3).join(';'), 3];
  if (codes[at + 1] === 2 && codes[at + 4] !== undefined) return [codes.slice(at, at + 5).join(';'), 5];
  return ['', codes.length - at];
}

function applyTo(look: Look, codes: readonly number[]): Look {
  let marks = [...look.marks];
  let { foreground, background } = look;
  for (let at = 0; at < codes.length; ) {
    const code = codes[at] ?? 0;
    let taken = 1;
    if (code === 0) {
      marks = [];
      foreground = '';
      background = '';
    } else if (offCodes.has(code)) {
      if (!marks.includes(code)) marks.push(code);
    } else if (code >= 22 && code <= 29) {
      marks = marks.filter((mark) => offCodes.get(mark) !== code);
    } else if (code === 38) {
      [foreground, taken] = extendedColour(codes, at);
    } else if (code === 48) {
      [background, taken] = extendedColour(codes, at);
    } else if ((code >= 30 && code <= 37) || (code >= 90 && code <= 97)) {
      foreground = String(code);
    } else if ((code >= 40 && code <= 47) || (code >= 100 && code <= 107)) {
      background = String(code);
    } else if (code === 39) {
      foreground = '';
    } else if (code === 49) {
      background = '';
    }
    at += taken;
  }
  return { marks, foreground, background };
}

/** Parameters that set both colours: with no marks on, they are the style. A picture has little else. */
const bothColours = /^38;(?:5;\d+|2;\d+;\d+;\d+);48;(?:5;\d+|2;\d+;\d+;\d+)$/;
const coloursAlone = new Map<string, Style>();

function styleOfColours(before: Style, parameters: string): Style | null {
  // Marks come first in a style and have one digit, colours have two or more.
  const marked = before !== '' && (before.length === 1 || before[1] === ';');
  if (marked || !parameters.startsWith('38;')) return null;
  const known = coloursAlone.get(parameters);
  if (known !== undefined) return known;
  if (!bothColours.test(parameters)) return null;
  // Written anew: a part of a frame that is kept would keep the whole frame.
  const style = parameters.split(';').map(Number).join(';');
  if (coloursAlone.size >= mostKeptLooks) coloursAlone.clear();
  if (style === parameters) coloursAlone.set(style, style);
  return style;
}

/**
 * The style after an SGR sequence; codes it does not know change nothing.
 *
 * @param parameters What stands between `ESC [` and `m`.
 * @example styleAfter('1', '31') //=> '1;31'
 */
export function styleAfter(style: Style, parameters: string): Style {
  const colours = styleOfColours(style, parameters);
  if (colours !== null) return colours;
  const look = applyTo(lookOf(style), parameters.replaceAll(':', ';').split(';').map(Number));
  const next = styleOf(look);
  if (!parsed.has(next)) {
    if (parsed.size >= mostKeptLooks) parsed.clear();
    parsed.set(next, look);
  }
  return next;
}

/** True if a blank in this style shows nothing but the plain background: its text colour and weight do not matter. */
export function blankIsPlain(style: Style): boolean {
  if (style === '') return true;
  const look = lookOf(style);
  return look.background === '' && !look.marks.some((mark) => mark === 4 || mark === 7 || mark === 9);
}
