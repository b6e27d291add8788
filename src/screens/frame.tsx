import { Box, Text } from 'ink';
import { memo } from 'react';
import type { Line } from './line.js';
import { type Look, paintLine } from './look.js';

const Row = memo(function Row({ text }: { readonly text: string }) {
  return <Text wrap="truncate">{text === '' ? ' ' : text}</Text>;
});

/** Lines, one under the other. */
export function Frame({ lines, look }: { readonly lines: readonly Line[]; readonly look: Look }) {
  return (
    <Box flexDirection="column">
      {lines.map((each, row) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: a line is its place on the screen
        <Row key={row} text={paintLine(each, look)} />
      ))}
    </Box>
  );
}
