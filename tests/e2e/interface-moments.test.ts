import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { newHome } from './interface-driver.js';
import { interfacesClosedAfterEach, liverWithElevenSeconds, lumbarUnderImplantCap } from './moment-beginnings.js';

const open = interfacesClosedAfterEach();

const times = (count: number, key: string) => key.repeat(count);

describe('moments at the console', () => {
  it('an arterial phase of 17.0 s is made to fit 11 s, each price read before it is paid, and recorded', async () => {
    const screen = open(newHome());
    await liverWithElevenSeconds(screen);
    expect(screen.verdict()).toContain('OVER by 6.0 s: breath-hold 17.0 s, this patient 11 s');

    await screen.goTo('slices');
    // One step down: 70 slices, 78 encoded, 58 lines: 80 x 58.5 x 3.55 ms. The price stands there before the key.
    expect(screen.program.text()).toMatch(/Next step\s+- 70\s+\+ 74/);
    const price = /breath-hold\s+(\d+\.\d s)\s+\d+\.\d s/.exec(screen.program.text())?.[1];
    expect(price).toBeDefined();
    await screen.keys('-', 'slices 72 to 70');
    expect(screen.verdict()).toContain(`breath-hold ${price}`);
    await screen.keys(times(8, '-'), 'slices 56 to 54');
    await screen.goTo('slice thickness');
    await screen.keys('++', 'slice thickness 3.5 mm to 4.0 mm');
    expect(screen.verdict()).toContain('OVER by 1.8 s: breath-hold 12.8 s');

    await screen.goTo('phase matrix');
    expect(screen.program.text()).toMatch(/verdict\s+OVER \d\.\d s/);
    await screen.keys(times(4, '-'), 'phase matrix 176 to 168');
    expect(screen.verdict()).toContain('TOO CLOSE, 0.3 s to spare: breath-hold 10.7 s');
    await screen.keys('-', 'phase matrix 168 to 160');
    expect(screen.verdict()).toContain('FITS, 0.8 s to spare: breath-hold 10.2 s, this patient 11 s');

    await screen.keys('e', 'Record: planned to used');
    await screen.keys(keyBytes.tab, /Reasons: NONE GIVEN\s*$/m);
    await screen.keys(keyBytes.enter, 'Reasons: 1');
    await screen.keys('s', 'saved in');
    const [record] = screen.records();
    expect(record?.reasons).toEqual(['breath-hold-short']);
    expect(record?.limits.holdS).toBe(11);
    const [series] = record?.series ?? [];
    expect(series?.id).toBe('t1-3d');
    expect([series?.planned.parameters.sliceCount, series?.used.parameters.sliceCount]).toEqual([72, 54]);
    expect([series?.planned.parameters.matrixPhase, series?.used.parameters.matrixPhase]).toEqual([200, 160]);
    expect(series?.used.figures.holdTimeS).toBeCloseTo(10.224, 3);
    screen.program.press('q');
    expect((await screen.program.exited).exitCode).toBe(0);
  });

  it('a cap on B1+rms is judged from the number the scanner displays: 130 degrees OVER, 125 TOO CLOSE, 120 FITS', async () => {
    const screen = await lumbarUnderImplantCap(open);
    await screen.keys(keyBytes.enter, 'Series t2-sag');
    expect(screen.verdict()).toContain('NOT JUDGED: B1+rms cap 2 uT');
    await screen.keys('d', 'Scanner readings');
    await screen.keys(`2.8${keyBytes.enter}`, 'B1+rms 2.8');
    await screen.escape('Series t2-sag');
    expect(screen.verdict()).toContain('OVER by 0.80 uT: B1+rms 2.80 uT, cap 2 uT');

    await screen.goTo('refocusing angle');
    await screen.keys(`130${keyBytes.enter}`, 'refocusing angle 180 deg to 130 deg');
    expect(screen.verdict()).toMatch(/^OVER by 0\.0\d uT: B1\+rms 2\.04 uT, cap 2 uT/);
    await screen.keys('-', '130 deg to 125 deg');
    expect(screen.verdict()).toMatch(/^TOO CLOSE, 0\.0\d uT to spare: B1\+rms 1\.97 uT/);
    await screen.keys('-', '125 deg to 120 deg');
    expect(screen.verdict()).toMatch(/^FITS, 0\.1\d uT to spare: B1\+rms 1\.89 uT/);
    expect(screen.program.text()).toContain("read the scanner's displayed value again before starting");
    expect(screen.program.text()).not.toMatch(/\b(safe|cleared|compliant)\b/i);
  });

  it('pain: what falls beyond the time is seen, one series is skipped, and the record says why', async () => {
    const screen = open(newHome());
    await screen.openPreset('1.5 lumbar');
    await screen.keys('p', 'This patient');
    await screen.goTo('time left');
    await screen.keys(`12${keyBytes.enter}`, 'time left 12');
    await screen.goTo('no series longer than');
    await screen.keys(`2 min${keyBytes.enter}`, 'no series longer than 2 min');
    await screen.escape('Running order');
    expect(screen.program.text()).toContain("the patient's time ends here: 12:00");
    expect(screen.verdict()).toMatch(/^OVER by .*still to do 12:55, time left 12:00/);
    await screen.keys(times(2, keyBytes.down), 'stir-sag:');
    await screen.keys('k', 'stir-sag skipped');
    expect(screen.verdict()).not.toContain('time left');
    expect(screen.program.text()).toContain('2:01 to spare');

    await screen.keys('e', 'Record: planned to used');
    await screen.keys(keyBytes.tab, /Reasons: NONE GIVEN\s*$/m);
    await screen.keys(times(2, keyBytes.down) + keyBytes.enter, 'pain: yes');
    await screen.keys('s', 'saved in');
    const [record] = screen.records();
    expect(record?.reasons).toEqual(['pain']);
    expect(record?.series.map(({ id, outcome }) => [id, outcome])).toEqual([['stir-sag', 'given-up']]);
    expect([record?.limits.minutesLeft, record?.limits.longestSeriesS]).toEqual([12, 120]);
  });

  it('a trainee looks and goes back: undo, why, range chart; nothing is lost and nothing saved unasked', async () => {
    const home = newHome();
    const screen = open(home);
    await screen.openPreset('3 liver');
    await screen.keys(times(3, keyBytes.down), 't2fs:');
    await screen.keys(keyBytes.enter, 'Series t2fs');
    await screen.goTo('averages');
    expect(screen.program.text()).toMatch(/SNR\s+71 %/);
    await screen.keys('-', 'averages 2 to 1');
    await screen.keys('u', 'Undone: averages 2 to 1');
    expect(screen.program.text()).toContain('as the preset');

    await screen.keys(keyBytes.tab, 'w explains the figure');
    await screen.goTo('SNR');
    await screen.keys('w', 'Macovski');
    expect(screen.program.text()).toMatch(/SNR: 100 %/);
    await screen.escape('Series t2fs');
    await screen.keys(times(2, keyBytes.tab), 'step 1');
    await screen.goTo('accelerate phase');
    await screen.keys('c', 'Range chart: acceleration, phase');
    await screen.keys(keyBytes.right, /acceleration, phase 3: scan time/);
    await screen.escape('Series t2fs');
    expect(screen.program.text()).toContain('as the preset');
    screen.program.press('q');
    expect((await screen.program.exited).exitCode).toBe(0);
    expect(screen.records()).toEqual([]);
    expect(existsSync(join(home, '.local/share/holdfast/presets'))).toBe(false);
  });

  it('the line drops in the middle: the next start offers the session, nothing missing, terminal and process clean', async () => {
    const home = newHome();
    const first = open(home);
    await liverWithElevenSeconds(first);
    await first.goTo('slices');
    await first.keys(times(9, '-'), 'slices 56 to 54');
    await first.keys('p', 'This patient');
    await first.keys('s', 'Practice hold runs');
    first.program.kill('SIGHUP');
    expect((await first.program.exited).signal).toBe(1);
    expect(first.program.screen.onAlternateScreen()).toBe(false);

    const second = open(home);
    await second.program.waitFor('Unfinished: 3 T  Liver', 20_000);
    await second.keys(keyBytes.enter, 'everything as it was');
    expect(second.program.text()).toContain('This patient');
    expect(second.program.text()).toMatch(/practice hold\s+\d+\.\d s, s stops it/);
    expect(second.verdict()).toContain('OVER by 1.8 s');
    await second.escape('Series t1-3d');
    expect(second.program.text()).toMatch(/slices\s+72\s+54/);
    await second.keys('u', 'Undone: slices 56 to 54');
  });

  it('a program that is killed outright leaves a session that is offered', async () => {
    const home = newHome();
    const first = open(home);
    await liverWithElevenSeconds(first);
    await first.goTo('slices');
    await first.keys('-', 'slices 72 to 70');
    // Longer than the quiet time after which a change is saved.
    await new Promise((resolve) => setTimeout(resolve, 2500));
    first.program.kill('SIGKILL');
    await first.program.exited;
    const second = open(home);
    await second.program.waitFor('Unfinished: 3 T  Liver', 20_000);
    await second.keys(keyBytes.enter, 'everything as it was');
    expect(second.program.text()).toMatch(/slices\s+72\s+70/);
  });
});
