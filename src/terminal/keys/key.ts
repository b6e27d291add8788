/** Keys that are not text. Page keys have a hyphen, as the words on keyboards have a gap. */
export type NamedKey =
  | 'up'
  | 'down'
  | 'left'
  | 'right'
  | 'home'
  | 'end'
  | 'page-up'
  | 'page-down'
  | 'insert'
  | 'delete'
  | 'backspace'
  | 'tab'
  | 'shift-tab'
  | 'enter'
  | 'escape';

/**
 * One key, as the rest of the program sees it.
 *
 * - `text`: one character (one Unicode code point) that was typed.
 * - `paste`: everything that was pasted, in one piece; lines end in `\n`, other control characters are left out.
 * - `control`: a letter held with Ctrl, in lower case (`{ name: 'control', text: 'r' }`).
 * - the named keys: `ctrl` and `shift` are there only when the terminal reports them.
 */
export type Key =
  | { readonly name: 'text' | 'paste' | 'control'; readonly text: string }
  | { readonly name: NamedKey; readonly ctrl?: true; readonly shift?: true };

/** What the terminal says of itself between the keys: it has carried out everything written before the question. */
export interface Answer {
  readonly kind: 'status';
}
