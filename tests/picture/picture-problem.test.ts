import { describe, expect, it } from 'vitest';
import { drawPictures, keepPreset } from '../../src/picture/picture-problem.js';
import { knownProblem } from '../session/drawn-picture.js';

const { problem, object } = knownProblem();
const thicker = { ...problem, parameters: { ...problem.parameters, sliceThicknessMm: problem.parameters.sliceThicknessMm * 2 } };
const wider = { ...thicker, body: { ...thicker.body, RL: 480 } };
const nearby = { ...object, look: { ...object.look, zoom: { ...object.look.zoom, atMm: [9, 9] as const } } };

describe('the picture of the preset', () => {
  it('is drawn once for all changes of a series, and anew for another body, preset or object', () => {
    let draws = 0;
    const keep = keepPreset();
    const counted: typeof keep = (key, draw) =>
      keep(key, () => {
        draws += 1;
        return draw();
      });
    const drawsAfter = (...asks: (readonly [typeof problem, typeof object])[]) => {
      for (const [asked, of] of asks) drawPictures(asked, of, counted);
      return draws;
    };
    expect(drawsAfter([problem, object], [thicker, object], [{ ...thicker, parameters: { ...thicker.parameters } }, object])).toBe(1);
    expect(drawsAfter([wider, object])).toBe(2);
    expect(drawsAfter([wider, nearby])).toBe(3);
    expect(drawsAfter([{ ...wider, preset: { ...wider.preset, parameters: thicker.parameters } }, nearby])).toBe(4);
    expect(drawsAfter([{ ...wider, presetFieldT: 1.5 }, nearby])).toBe(5);
  });

  it('kept or not, the pictures are the same', () => {
    const keep = keepPreset();
    for (const asked of [problem, thicker, wider, problem]) expect(drawPictures(asked, object, keep)).toEqual(drawPictures(asked, object));
  });
});
