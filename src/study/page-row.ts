/** One page of paper in a fixed-width type. */
export const pageLines = 60;
const pageColumns = 80;

/** A label and its items, joined by semicolons and wrapped within the page; nothing for no items. */
export function pageRow(label: string, items: readonly string[]): string[] {
  if (items.length === 0) return [];
  const indent = ' '.repeat(12);
  const lines: string[] = [];
  let line = label.length < indent.length ? label.padEnd(indent.length) : `${label}  `;
  for (const word of items.join('; ').split(' ')) {
    if (line.trimEnd().length + word.length + 1 > pageColumns && line.trim() !== '') {
      lines.push(line.trimEnd());
      line = indent;
    }
    line += `${word} `;
  }
  return [...lines, line.trimEnd()];
}
