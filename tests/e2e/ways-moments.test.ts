import { describe, expect, it } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach, liverWithElevenSeconds, lumbarUnderImplantCap } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();

describe('moments at the console, by the ways to fit', () => {
  it('an arterial phase of 17.0 s for a patient of 11 s: the search ran by itself, one key takes a way, one takes it back', async () => {
    const screen = open(newHome());
    await liverWithElevenSeconds(screen, /f: \d+ ways to fit/);
    await screen.keys('f', 'Proven: none is better');
    const text = screen.program.text();
    expect(screen.verdict()).toContain('OVER by 6.0 s: breath-hold 17.0 s, this patient 11 s');
    expect(text).toMatch(/1 closest to the preset\s+FITS, \d+\.\d s to spare/);
    expect(text).toMatch(/Gives up: /);
    expect(text).not.toMatch(/^ +4 /m);

    await screen.keys(keyBytes.enter, 'Way 1 taken');
    expect(screen.verdict()).toMatch(/^FITS, \d+\.\d s to spare: breath-hold \d+\.\d s, this patient 11 s/);
    await screen.keys('u', 'Undone: Way 1 taken');
    expect(screen.verdict()).toContain('OVER by 6.0 s');

    await screen.keys('f', 'Ways to fit');
    await screen.keys('m', /4 shortest/);
    await screen.keys('c', 'Front: most SNR in each breath-hold');
    expect(screen.verdict()).toContain('OVER by 6.0 s');
    await screen.escape('Ways to fit');
    await screen.keys('2', 'Way 2 taken');
    expect(screen.verdict()).toMatch(/^FITS/);
    await screen.keys('a', 'Ways to fit');
    expect(screen.program.text()).toMatch(/[>\u25b8] +2 best signal/);
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('a cap on B1+rms: not searched for without its reading; with it one key takes a way that fits', async () => {
    const screen = await lumbarUnderImplantCap(open);
    await screen.keys('f', "is not searched for: type the scanner's number (d)");
    await screen.keys('d', 'Scanner readings');
    await screen.keys(`2.8${keyBytes.enter}`, 'B1+rms 2.8');
    await screen.escape('Ways to fit');
    await screen.program.waitFor('Proven: none is better', 60_000);
    expect(screen.verdict()).toContain('OVER by 0.80 uT');
    expect(screen.program.text()).toMatch(/1 .*FITS, 0\.\d\d uT to spare/);
    await screen.keys(keyBytes.enter, 'Way 1 taken');
    expect(screen.verdict()).toMatch(/^FITS, 0\.\d\d uT to spare: B1\+rms 1\.\d\d uT, cap 2 uT/);
    expect(screen.program.text()).toContain("read the scanner's displayed value again before starting");
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('the clock: the plan into the minutes left is one step in the running order', async () => {
    const screen = open(newHome());
    await screen.openPreset('1.5 lumbar');
    await screen.keys('p', 'This patient');
    await screen.goTo('time left');
    await screen.keys(`9${keyBytes.enter}`, 'time left 9');
    await screen.escape('Running order');
    expect(screen.verdict()).toMatch(/^OVER by /);
    await screen.keys('b', /Together \d+:\d\d of 9:00/);
    await screen.keys(keyBytes.enter, 'Plan taken');
    expect(screen.verdict()).not.toMatch(/^OVER .*time left/);
    await screen.keys('u', 'Undone: Plan taken');
    expect(screen.verdict()).toMatch(/^OVER by /);
  });
});
