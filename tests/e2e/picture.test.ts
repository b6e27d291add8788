import { describe, expect, it } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();
const half = /\u2580{20}/;

describe('see it, in a pseudo-terminal with the worker', () => {
  it('in true colour: both pictures in half blocks, close, with a divider, and back', async () => {
    const screen = open(newHome(), ['--color', 'true']);
    await screen.openPreset('3 liver');
    await screen.keys(keyBytes.enter, 'Series t1-3d');
    await screen.goTo('slice thickness');
    await screen.keys(`5${keyBytes.enter}`, 'slice thickness 3.0 mm to 5.0 mm');
    await screen.keys('s', 'an illustration, never an image of a patient');
    // The last lines of the frame that holds the pictures.
    await screen.program.waitFor(/\u2580[\s\S]*profile of[\s\S]*Small discs fade[\s\S]*h help/, 20_000);
    const whole = screen.program.text();
    expect(whole).toMatch(/preset, \d+ mm wide +now, \d+ mm wide/);
    expect(whole).toContain('Small discs fade and leaning edges widen (3.0 mm to 5.0 mm)');
    const row = whole.split('\n').findIndex((line) => half.test(line));
    const greys = Array.from({ length: 39 * 8 }, (_, i) => screen.program.cell(i % 39, row + Math.floor(i / 39)).background);
    expect(greys.every((grey) => /^#(..)\1\1$/.test(grey))).toBe(true);
    expect(new Set(greys).size).toBeGreaterThan(6);
    await screen.keys('z', /preset, 23 mm wide/);
    await screen.keys('d', /preset {34}\|now, \d+ mm wide/);
    await screen.keys('s', 'Series t1-3d');
    expect(screen.program.text()).not.toMatch(half);
  });

  it('in ASCII as a ramp, in reader mode as sentences', async () => {
    const ascii = open(newHome(), ['--ascii']);
    await ascii.openPreset('3 liver');
    await ascii.keys(keyBytes.enter, 'Series t1-3d');
    await ascii.keys('s', /[#%@]{6}/);
    expect(ascii.program.text()).not.toMatch(/[^\n\x20-\x7e]/);
    const reader = open(newHome(), ['--reader']);
    await reader.program.waitFor('0.55 T', 20_000);
    await reader.keys('3 liver', 'Type to narrow: 3 liver');
    await reader.keys(keyBytes.enter, 'Running order');
    await reader.keys(keyBytes.enter, 'Series t1-3d');
    await reader.keys('s', "Nothing is seen that is not seen in the preset's picture");
    expect(reader.program.text()).not.toMatch(/[\u2580\u2800-\u28ff]/);
  });
});
