import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach } from 'vitest';
import { keyBytes } from './harness/key-bytes.js';
import { implantPreset } from './implant-preset.js';
import { type Interface, newHome, openInterface } from './interface-driver.js';

type Open = (home: string, args?: readonly string[]) => Interface;

/** Opens interfaces that are closed after each test of the file that asks. */
export function interfacesClosedAfterEach(): Open {
  const opened: Interface[] = [];
  afterEach(async () => {
    for (const screen of opened.splice(0)) await screen.program.close();
  });
  return (home, args = []) => {
    const screen = openInterface(home, args);
    opened.push(screen);
    return screen;
  };
}

/** Opens the liver at 3 T for a patient who holds 11 s, on the dynamic series. */
export async function liverWithElevenSeconds(screen: Interface, then: string | RegExp = 'Series t1-3d'): Promise<void> {
  await screen.openPreset('3 liver');
  await screen.keys('p', 'This patient');
  await screen.keys(`11${keyBytes.enter}`, 'OVER by 6.0 s');
  await screen.escape('Running order');
  await screen.keys(keyBytes.enter, then);
}

/** Opens the lumbar study of an implant whose label allows 2.0 uT, at its running order; the scanner's own number is not typed yet. */
export async function lumbarUnderImplantCap(open: Open): Promise<Interface> {
  const home = newHome();
  const presets = join(home, 'presets');
  mkdirSync(presets);
  writeFileSync(join(presets, 'implant-lumbar.json'), JSON.stringify(implantPreset));
  const screen = open(home, ['--presets', presets]);
  await screen.openPreset('1.5 implant');
  await screen.keys('p', 'This patient');
  await screen.goTo('B1+rms at most');
  await screen.keys(`2.0${keyBytes.enter}`, 'B1+rms at most 2.0');
  await screen.escape('Running order');
  return screen;
}
