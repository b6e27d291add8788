/** SGR "overlined", which nothing else in this program uses: the painter takes it as a mark and does not draw it. */
export const cursorMarkCode = 53;

/**
 * Marks the first character of a text as the place of the terminal's own cursor, which braille displays, screen magnifiers and
 * input methods follow. The painter puts the cursor on the first marked cell of a frame, and hides it when there is none.
 *
 * @param text At least one character wide.
 * @example cursorHere('12 mm') //=> '\u001b[53m1\u001b[55m2 mm'
 */
export function cursorHere(text: string): string {
  const [first = ' '] = text;
  return `\u001b[53m${first}\u001b[55m${text.slice(first.length)}`;
}
