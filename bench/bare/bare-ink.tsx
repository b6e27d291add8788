/**
 * The least a program in ink can be, as a yardstick: one frame of a few lines; each key changes one number, `q` ends.
 * It reads and writes as ink does by itself.
 */
import { Box, render, Text, useApp, useInput } from 'ink';
import { useState } from 'react';

function BareInk() {
  const [count, setCount] = useState(0);
  const { exit } = useApp();
  useInput((input) => {
    if (input === 'q') exit();
    else setCount((before) => before + 1);
  });
  return (
    <Box flexDirection="column">
      <Text>one number</Text>
      <Text>count {count}</Text>
      <Text>ready</Text>
    </Box>
  );
}

render(<BareInk />);
