/**
 * A small program for tests of the terminal room. Up and down change a number, other keys are shown; `q` closes, `e` exits without
 * closing, `x` throws, `r` rejects, `b` breaks the component, `p` prints. With the argument `tall` the frame is as high as the screen.
 */
import { writeFileSync } from 'node:fs';
import { Box, Text } from 'ink';
import { colourLevel } from '../../../src/terminal/colour-level.js';
import type { Key } from '../../../src/terminal/keys/key.js';
import { type Mounted, mount } from '../../../src/terminal/mount.js';
import { cursorHere } from '../../../src/terminal/painter/cursor-mark.js';
import type { Size } from '../../../src/terminal/size.js';

const tall = process.argv.includes('tall');
const noteFile = process.env.NOTE_FILE;
let count = 5;
let keys = 0;
let last = '';
let broken = false;
let mounted: Mounted | undefined;

function Counter({ size }: { size: Size }) {
  if (broken) throw new Error('broken on purpose');
  return (
    <Box flexDirection="column" height={tall ? size.rows : 8} width={size.columns}>
      <Text>
        size {size.columns} x {size.rows}
      </Text>
      <Text color="green">count {cursorHere(String(count))}</Text>
      <Text>last {last}</Text>
      <Text>pid {process.pid}.</Text>
      <Text>wide {'\u6f22\u5b57'} end</Text>
      <Box flexGrow={1} />
      <Text bold>bottom line</Text>
    </Box>
  );
}

function onKey(key: Key): void {
  keys++;
  if (key.name === 'up') count++;
  else if (key.name === 'down') count--;
  else if (key.name === 'text' && key.text === 'q') void mounted?.close();
  else if (key.name === 'text' && key.text === 'x') {
    setTimeout(() => {
      throw new Error('thrown on purpose');
    });
  } else if (key.name === 'text' && key.text === 'r') void Promise.reject(new Error('rejected on purpose'));
  else if (key.name === 'text' && key.text === 'e') process.exit(3);
  else if (key.name === 'text' && key.text === 'b') broken = true;
  else if (key.name === 'text' && key.text === 'p') console.log('a stray print');
  else last = `${keys}:${key.name}${'text' in key ? ` <${key.text}>` : ''}`;
  mounted?.redraw();
}

mounted = await mount({
  element: (size) => <Counter size={size} />,
  colourLevel: colourLevel({ environment: process.env, isTerminal: process.stdout.isTTY }),
  firstFrame: 'loading',
  onKey,
  onLeave: (reason) => {
    if (noteFile !== undefined) writeFileSync(noteFile, JSON.stringify({ kind: reason.kind, count }));
  },
});
const reason = await mounted.closed;
if (reason.kind === 'closed') console.log(`goodbye ${count}`);
