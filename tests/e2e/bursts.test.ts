import { describe, expect, it } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();
const { up, down, tab } = keyBytes;

/** Work on the series screen as key repeat types it: lines, steps, undo, redo, panes, the next series. */
const burst = [down, '+', '-', down, '+', 'u', 'r', up, tab, down, tab, tab, '-', '+', down, 'n'].join('').repeat(4);

describe('bursts of keys', () => {
  it('three thousand keys in bursts leave the program alive, with the session on its screen', async () => {
    const screen = open(newHome());
    await screen.openPreset('3 liver');
    await screen.keys(keyBytes.enter, 'Series t1-3d');
    for (let typed = 0; typed < 3000; typed += burst.length) {
      screen.program.press(burst);
      await screen.keys('h', 'Keys of this screen');
      await screen.escape('Series ');
    }
    expect(screen.program.text()).toContain('liver-3t');
  });
});
