import { describe, expect, it } from 'vitest';
import { diffused } from '../../src/picture/picture-field.js';
import { lineText } from '../../src/screens/line.js';
import { type Look, paintLine } from '../../src/screens/look.js';
import { picturePane, pictureView } from '../../src/screens/picture-pane.js';
import { asciiGlyphs, unicodeGlyphs } from '../../src/terminal/glyphs.js';
import { knownProblem, picturesOf } from '../session/drawn-picture.js';

const drawn = picturesOf(knownProblem().problem);
const looks: Readonly<Record<string, Look>> = {
  true: { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 3, reader: false },
  '256': { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 2, reader: false },
  '16': { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 1, reader: false },
  none: { glyphs: unicodeGlyphs, set: 'unicode', colourLevel: 0, reader: false },
  ascii: { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 3, reader: false },
};
const pane = (name: string, which: Parameters<typeof picturePane>[2] = 'preset', close = false) => {
  const look = looks[name] as Look;
  return picturePane(drawn, pictureView(drawn, close, 39, 13, look), which, 39, 13, look).map((line) => ({
    text: lineText(line),
    painted: paintLine(line, look),
  }));
};

describe('a pane of a picture', () => {
  it('is half blocks with two greys a cell where there are colours for it, each line left plain', () => {
    for (const [name, form] of [
      ['true', /^(?:E\[38;2;(\d+);\1;\1;48;2;(\d+);\2;\2m\u2580+)+E\[0m$/],
      ['256', /^(?:E\[38;5;(?:16|23[2-9]|24\d|25[0-5]|231);48;5;(?:16|23[2-9]|24\d|25[0-5]|231)m\u2580+)+E\[0m$/],
    ] as const) {
      for (const { painted } of pane(name)) expect(painted.replaceAll('\u001b', 'E')).toMatch(form);
    }
  });

  it('is dots with 16 colours or none, a ramp in ASCII: no colour codes', () => {
    for (const name of ['16', 'none'])
      for (const { text, painted } of pane(name)) expect([text, painted]).toEqual([expect.stringMatching(/^[ \u2800-\u28ff]{39}$/), text]);
    for (const { text, painted } of pane('ascii')) expect([text, painted]).toEqual([expect.stringMatching(/^[ .:\-=+*#%@]{39}$/), text]);
  });

  it('the target is bright and what lies around the body dark, in all of them', () => {
    expect(pane('ascii')[6]?.text).toMatch(/^[ .]{4}.*[#%@]{3}.*[ .]{4}$/);
    const filled = (text: string) =>
      [...text].reduce((sum, sign) => sum + (sign === ' ' ? 0 : (sign.charCodeAt(0) & 0xff).toString(2).replaceAll('0', '').length), 0);
    expect(filled(pane('none')[6]?.text ?? '')).toBeGreaterThan(4 * filled(pane('none')[0]?.text ?? ''));
  });

  it('a divider takes each side from its own picture', () => {
    const other = { ...drawn, pair: { ...drawn.pair, now: { ...drawn.pair.now, values: drawn.pair.now.values.map(() => 0) } } };
    const look = looks.ascii as Look;
    const lines = picturePane(other, pictureView(other, false, 39, 13, look), { from: 18 }, 39, 13, look).map(lineText);
    for (const text of lines) expect(text.slice(18).trim()).toBe('');
    expect(lines[6]?.slice(0, 18)).toMatch(/[#%@]/);
  });

  it('close, one acquired voxel takes two cells or more', () => {
    for (const look of Object.values(looks)) {
      const { view } = pictureView(drawn, true, 39, 13, look);
      const cellMm = view.squareMm * (view.columns / 39);
      expect(drawn.voxelMm / cellMm).toBeGreaterThanOrEqual(2 - 1e-9);
    }
  });
});

describe('error diffusion (Floyd & Steinberg 1976)', () => {
  it.each([0, 0.1, 0.37, 0.5, 0.9, 1])('a field of %f has that share of its squares on', (grey) => {
    const on = diffused(new Float64Array(64 * 64).fill(grey), 64);
    expect(on.reduce((sum, one) => sum + one, 0) / on.length).toBeCloseTo(grey, 1);
  });
});
