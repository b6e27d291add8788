import { render } from 'ink-testing-library';
import { describe, expect, it } from 'vitest';
import { Frame } from '../../src/screens/frame.js';
import { line, span } from '../../src/screens/line.js';
import type { Look } from '../../src/screens/look.js';
import { asciiGlyphs } from '../../src/terminal/glyphs.js';

const plain: Look = { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false };

describe('a frame as ink draws it', () => {
  it('has its lines one under the other, blank ones too, and nothing between stretches of one line', () => {
    const { lastFrame, unmount } = render(<Frame lines={[line('OVER by 6.0 s'), line(''), [span('slices '), span('72')]]} look={plain} />);
    expect(lastFrame()).toBe('OVER by 6.0 s\n\nslices 72');
    unmount();
  });

  it('follows its lines when they change', () => {
    const { lastFrame, rerender, unmount } = render(<Frame lines={[line('slices 72')]} look={plain} />);
    rerender(<Frame lines={[line('slices 70')]} look={plain} />);
    expect(lastFrame()).toContain('slices 70');
    unmount();
  });
});
