import { describe, expect, it } from 'vitest';
import type { Effect } from '../../src/session/message.js';
import { pictureSentences } from '../../src/session/picture-sentences.js';
import { pictureSet } from '../../src/session/picture-view.js';
import { update } from '../../src/session/update.js';
import { pictureFailed, picturesOf, withPicture } from './drawn-picture.js';
import { onField, press, sessionOn } from './invented-state.js';
import { atScanner, startWithScanners } from './shipped-scanners.js';

const order = press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape');
const dwi = press(order, 'end', 'enter');
const asked = (effects: readonly Effect[]) => effects.filter((effect) => effect.kind === 'picture');
/** What the first picture among some effects is asked with. */
function problemIn(effects: readonly Effect[]) {
  const effect = effects.find(({ kind }) => kind === 'picture');
  if (effect?.kind !== 'picture') throw new Error('no picture was asked for');
  return effect.problem;
}
const key = (text: string) => ({ kind: 'key', key: { name: 'text', text }, atMs: 0 }) as const;

describe('pictures in the interface', () => {
  it('are asked for when their screen is opened, and not before', () => {
    const [edited, before] = update(onField(dwi, 'sliceThicknessMm'), key('-'));
    expect(asked(before)).toEqual([]);
    const [open, effects] = update(edited, key('s'));
    expect(open.place.screen).toBe('picture');
    expect(asked(effects)).toHaveLength(1);
    expect(open.open.picture).toBe(open.picture?.ask);
  });

  it('are asked for once for the same values, and keep what was drawn until the new ones are there', () => {
    const shown = withPicture(press(dwi, 's'));
    expect(shown.open.picture).toBeUndefined();
    expect(asked(update(shown, key('z'))[1])).toEqual([]);
    const again = press(press(shown, 'escape'), 's');
    expect(again.asks).toBe(shown.asks);
    const changed = press(press(onField(press(shown, 'escape'), 'sliceThicknessMm'), '+'), 's');
    expect(changed.picture?.ask).not.toBe(shown.picture?.ask);
    expect(changed.picture?.drawn).toBe(shown.picture?.drawn);
  });

  it('an answer to an older ask is dropped', () => {
    const [first, effects] = update(dwi, key('s'));
    const problem = problemIn(effects);
    const second = press(press(onField(press(first, 'escape'), 'sliceThicknessMm'), '+'), 's');
    const late = update(second, {
      kind: 'answer',
      ask: first.picture?.ask ?? -1,
      answer: { kind: 'pictures', pictures: picturesOf(problem) },
    })[0];
    expect(late.picture?.drawn).toBeNull();
    expect(late.open.picture).toBe(second.picture?.ask);
  });

  it('the divider moves within the picture, undo of the session has nothing to do with it', () => {
    const shown = withPicture(press(dwi, 's', 'd'));
    expect(shown.pictureEyes.divider).toBe(0.5);
    expect(press(shown, ...Array<string>(30).fill('right')).pictureEyes.divider).toBe(1);
    expect(press(shown, ...Array<string>(30).fill('left')).pictureEyes.divider).toBe(0);
    expect(press(shown, 'd').pictureEyes.divider).toBeNull();
    expect(shown.past).toBe(dwi.past);
  });

  it('stand beside the series of a wide screen once they are kept there, and follow the edits', () => {
    const wide = { ...onField(dwi, 'sliceThicknessMm'), size: { columns: 160, rows: 50 } };
    const kept = press(wide, 's', 'k', 'escape');
    expect(kept.place.screen).toBe('series');
    const [, effects] = update(kept, key('+'));
    expect(asked(effects)).toHaveLength(1);
    expect(asked(update({ ...kept, size: { columns: 100, rows: 30 } }, key('+'))[1])).toEqual([]);
    expect(asked(update(press(wide, 's', 'k', 'k', 'escape'), key('+'))[1])).toEqual([]);
  });

  it('compare with the preset at the field of its file, as its picture is drawn, on whatever scanner the session is', () => {
    const chosen = press(atScanner(startWithScanners(['shoulder-1.5t']), 'demo-3t shoulder'), 'enter', 'enter');
    const said = pictureSentences(press(chosen, 'o', 'enter', 's'));
    // At the same bandwidth fat lies 2.894 T / 1.5 T times as far away.
    expect(said).toContain('Fat lies further from its place (0.60 mm to 1.16 mm)');
    expect(said).toContain('chemical shift: 0.60 mm to 1.16 mm');
  });

  it('say each difference in a sentence, and what failed', () => {
    const thin = press(press(onField(dwi, 'sliceThicknessMm'), '3', 'enter'), 's');
    const said = pictureSentences(thin);
    expect(said[0]).toContain('never an image of a patient');
    expect(said).toContain("The grain is coarser (50 % of the preset's)");
    expect(said).toContain('Small discs stand out and leaning edges sharpen (6.0 mm to 3.0 mm)');
    expect(pictureSentences(press(dwi, 's'))).toContain("Nothing is seen that is not seen in the preset's picture");
    expect(said).toContain('Assumed: the target has a signal to noise of 20 in the preset');
    expect(pictureSentences(withPicture(press(dwi, 's')))).toContain('The highest b-value is drawn.');
    expect(pictureSentences(pictureFailed(press(dwi, 's'))).at(-1)).toContain('TE is not shorter than TR');
  });

  it('from the ways the way under the hand is drawn', () => {
    const series = press(order, 'enter');
    expect(pictureSet(press(series, 's')).of).toBe('now');
  });
});
