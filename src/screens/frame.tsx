import { Text } from 'ink';
import type { Line } from './line.js';
import { type Look, paintLine } from './look.js';

/** Lines, one under the other, as one text: ink then measures and places a single thing. */
export function Frame({ lines, look }: { readonly lines: readonly Line[]; readonly look: Look }) {
  return <Text wrap="truncate">{lines.map((each) => paintLine(each, look)).join('\n')}</Text>;
}
