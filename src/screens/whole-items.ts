import { fitText, textWidth } from '../terminal/text-width.js';

/**
 * A list in one line: as many items as fit whole, the rest counted with the key that shows them. One that is too long alone is cut.
 *
 * @example wholeItems('Off: ', ['a', 'b', 'c'], '', { columns: 18, key: 'd', ellipsis: '…' }) //=> 'Off: a; 2 more (d)'
 */
export function wholeItems(
  head: string,
  items: readonly string[],
  tail: string,
  { columns, key, ellipsis }: { readonly columns: number; readonly key: string; readonly ellipsis: string },
): string {
  const withShown = (shown: number, first = items[0] ?? '') => {
    const rest = items.length - shown;
    return `${head}${[first, ...items.slice(1, shown)].join('; ')}${rest === 0 ? '' : `; ${rest} more (${key})`}${tail}`;
  };
  for (let shown = items.length; shown > 1; shown -= 1) if (textWidth(withShown(shown)) <= columns) return withShown(shown);
  const one = withShown(1);
  const first = items[0] ?? '';
  const over = textWidth(one) - columns;
  return over <= 0 ? one : withShown(1, fitText(first, Math.max(1, textWidth(first) - over), ellipsis));
}
