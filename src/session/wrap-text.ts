/**
 * Breaks text into lines of at most so many characters, between words; a word longer than a line stands alone.
 *
 * @example wrapText('two words', 5) //=> ['two', 'words']
 */
export function wrapText(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line === '') line = word;
    else if (line.length + 1 + word.length <= width) line += ` ${word}`;
    else {
      lines.push(line);
      line = word;
    }
  }
  return [...lines, line];
}
