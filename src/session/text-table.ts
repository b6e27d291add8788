/** How the cells of a column line up: at the left, at the right, or on the decimal point. */
export type Alignment = 'left' | 'right' | 'point';

export interface Column {
  readonly title: string;
  readonly align: Alignment;
}

/** Width that every table keeps to. */
export const tableWidth = 80;

/**
 * Lines of a table: a row of titles, then the rows. For a screen reader each row is one sentence instead, its first cell first.
 * Empty cells and dashes are not read out.
 *
 * @example textTable([{ title: 'series', align: 'left' }, { title: 'time', align: 'right' }], [['dwi', '0:40']], false)
 * //=> ['series  time', 'dwi     0:40']
 */
export function textTable(columns: readonly Column[], rows: readonly (readonly string[])[], reader: boolean): string[] {
  if (reader) return rows.map((row) => sentence(columns, row));
  const cells = columns.map((column, i) =>
    alignedCells(
      column,
      rows.map((row) => row[i] ?? ''),
    ),
  );
  const lines = [-1, ...rows.keys()].map((row) => cells.map((column) => column[row + 1] ?? ''));
  const wide = joined(lines, '  ');
  return Math.max(...wide.map(visibleLength)) <= tableWidth ? wide : joined(lines, ' ');
}

/** Characters that take a cell: colour codes take none. */
function visibleLength(text: string): number {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: the escape that starts a colour code
  return text.replace(/\u001b\[\d+m/g, '').length;
}

function joined(lines: readonly (readonly string[])[], gap: string): string[] {
  return lines.map((line) => line.join(gap).trimEnd());
}

function sentence(columns: readonly Column[], row: readonly string[]): string {
  const [first = '', ...others] = row;
  const parts = others.flatMap((cell, i) => {
    const value = cell.trim();
    const title = columns[i + 1]?.title ?? '';
    return value === '' || value === '-' ? [] : [title === '' ? value : `${title} ${value}`];
  });
  return `${first.trim()}: ${parts.join('; ')}.`;
}

/** The title and the cells of one column, all of one width. */
function alignedCells({ title, align }: Column, values: readonly string[]): string[] {
  const placed = align === 'point' ? onPoint(values) : values;
  const width = Math.max(title.length, ...placed.map(visibleLength));
  const place = (text: string) => {
    const blanks = ' '.repeat(width - visibleLength(text));
    return align === 'right' ? blanks + text : text + blanks;
  };
  return [place(title), ...placed.map(place)];
}

/** Pads numbers so that their points stand below each other; words start where the longest number does. */
function onPoint(values: readonly string[]): string[] {
  const wholes = values.map((value) => /^(?:x )?[+-]?\d[\d:]*/.exec(value)?.[0] ?? '');
  const left = Math.max(...wholes.map((whole) => whole.length), 0);
  return values.map((value, i) => (wholes[i] === '' ? value : ' '.repeat(left - (wholes[i] as string).length) + value));
}
