interface Row {
  readonly label: string;
  readonly value: number;
}

const width = 360;
const labelWidth = 150;
const rowHeight = 20;

/**
 * Text as HTML and SVG may hold it.
 *
 * @example escapeHtml('<b> & "c"') //=> '&lt;b&gt; &amp; &quot;c&quot;'
 */
export function escapeHtml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;').replaceAll("'", '&#39;');
}

/** Horizontal bars, each with its count; the same content as words for those who do not see them. Nothing without rows. */
export function barPlot(title: string, rows: readonly Row[]): string {
  if (rows.length === 0) return '';
  const most = Math.max(1, ...rows.map(({ value }) => value));
  const longest = width - labelWidth - 44;
  const bars = rows.map(({ label, value }, i) => {
    const y = i * rowHeight;
    const length = (longest * value) / most;
    return [
      `<text x="${labelWidth - 6}" y="${y + 14}" text-anchor="end">${escapeHtml(shortened(label))}<title>${escapeHtml(label)}</title></text>`,
      `<rect class="bar" x="${labelWidth}" y="${y + 4}" width="${length.toFixed(1)}" height="${rowHeight - 8}"></rect>`,
      `<text x="${(labelWidth + length + 5).toFixed(1)}" y="${y + 14}">${value}</text>`,
    ].join('');
  });
  const words = rows.map(({ label, value }) => `${label} ${value}`).join(', ');
  return figure(title, words, rows.length * rowHeight + 4, bars.join(''));
}

/** A line over the months, zero drawn; only the words where there are fewer than two months. */
export function monthPlot(title: string, words: string, months: readonly Row[]): string {
  const [first, last] = [months[0], months.at(-1)];
  if (first === undefined || last === undefined || first === last)
    return `<figure><figcaption>${escapeHtml(title)}</figcaption>${escapeHtml(words)}</figure>`;
  const height = 110;
  const low = Math.min(0, ...months.map(({ value }) => value));
  const high = Math.max(0, ...months.map(({ value }) => value), low + 0.01);
  const x = (i: number) => 50 + (i * (width - 70)) / (months.length - 1);
  const y = (value: number) => 10 + ((high - value) / (high - low)) * (height - 34);
  const points = months.map(({ value }, i) => `${x(i).toFixed(1)},${y(value).toFixed(1)}`).join(' ');
  const scale = [low, 0, high].filter((value, i, all) => all.indexOf(value) === i);
  const drawing = [
    ...scale.map((value) => `<text x="44" y="${(y(value) + 4).toFixed(1)}" text-anchor="end">${(100 * value).toFixed(0)} %</text>`),
    `<line class="axis" x1="48" x2="${width - 12}" y1="${y(0).toFixed(1)}" y2="${y(0).toFixed(1)}"></line>`,
    `<polyline class="line" points="${points}"></polyline>`,
    `<text x="50" y="${height - 4}">${escapeHtml(first.label)}</text>`,
    `<text x="${width - 12}" y="${height - 4}" text-anchor="end">${escapeHtml(last.label)}</text>`,
  ];
  return figure(title, words, height, drawing.join(''), words);
}

function figure(title: string, words: string, height: number, drawing: string, below = ''): string {
  const svg = `<svg viewBox="0 0 ${width} ${height}" role="img" aria-label="${escapeHtml(`${title}: ${words}`)}">${drawing}</svg>`;
  return `<figure><figcaption>${escapeHtml(title)}</figcaption>${svg}${escapeHtml(below)}</figure>`;
}

function shortened(label: string): string {
  const characters = [...label];
  return characters.length <= 24 ? label : `${characters.slice(0, 22).join('')}...`;
}
