import { readSeries } from '../../src/headers/read-series.js';
import type { HeaderAnswer, HeadersFound } from '../../src/session/header-view.js';
import type { Effect } from '../../src/session/message.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { imagesOfPreset, singleFrames } from '../headers/attributes-of-preset.js';
import { type Attribute, dicomObject } from '../headers/dicom-object.js';
import { collectObjects } from '../headers/read-objects.js';
import { presetChoice } from './invented-state.js';

const echoTime = '0018,0081';
const scanningSequence = '0018,0020';
/** Left out everywhere: series stand in the order they come in. */
const seriesNumber = '0020,0011';

/** The images of some series of shipped presets, a few slices each, without the attributes that are left out of each. */
function invented(...wanted: readonly (readonly [preset: string, series: string, ...without: readonly string[]])[]): Buffer[] {
  return wanted.flatMap(([preset, id, ...without], at) => {
    const { study } = presetChoice(preset);
    const series = study.series.find((one) => one.id === id);
    if (series === undefined) throw new Error(`no series ${id}`);
    const few = { ...series, parameters: { ...series.parameters, sliceCount: 4 } };
    const kept = (image: readonly Attribute[]) => image.filter(({ tag }) => ![seriesNumber, ...without].includes(tag));
    return singleFrames(imagesOfPreset(few, study.fieldT), `1.2.3.${at + 1}`).map((image) => dicomObject(kept(image)));
  });
}

/** A folder of four series: one whole, one without its TE, one whose class nothing tells, one with diffusion. */
export const inventedFolder: readonly Buffer[] = invented(
  ['lumbar-spine-1.5t', 't2-sag'],
  ['lumbar-spine-1.5t', 't1-sag', echoTime],
  ['lumbar-spine-1.5t', 't2-ax', scanningSequence],
  ['brain-3t', 'dwi'],
);

const collected = collectObjects(inventedFolder).series();

/** What reading that folder gives. */
export const inventedHeaders: HeadersFound = {
  series: collected.map((one, at) => readSeries(one, `s${at + 1}`)),
  files: inventedFolder.length + 3,
  read: inventedFolder.length,
  passedOver: 1,
  notes: ['2 files, each is a packed file (zip or gzip)'],
  isStopped: false,
};

/** What the world answers to the screens of headers; null to what they do not ask. */
export function headerAnswer(effect: Effect): HeaderAnswer | null {
  if (effect.kind === 'read-headers') return { kind: 'headers', found: inventedHeaders };
  if (effect.kind !== 'class-headers') return null;
  const one = collected[Number(effect.id.slice(1)) - 1];
  return one === undefined ? null : { kind: 'header-series', series: readSeries(one, effect.id, effect.key ?? undefined) };
}

/** Sends keys one after the other, and answers at once what they ask of headers. */
export function pressAnswered(state: State, ...keys: readonly string[]): State {
  return keys.reduce((before, key) => {
    const named = key.length > 1 && !key.startsWith('paste ');
    const press = key.startsWith('paste ') ? { name: 'paste', text: key.slice(6) } : named ? { name: key } : { name: 'text', text: key };
    const [next, effects] = update(before, { kind: 'key', key: press, atMs: before.nowMs + 1000 });
    return effects.reduce((now, effect) => {
      const answer = headerAnswer(effect);
      return answer === null || !('ask' in effect) ? now : update(now, { kind: 'answer', ask: effect.ask, answer })[0];
    }, next);
  }, state);
}
