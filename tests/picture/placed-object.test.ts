import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { unknownBody } from '../../src/calc/body.js';
import { picturePlane } from '../../src/picture/picture-plane.js';
import { placeObject } from '../../src/picture/placed-object.js';
import { readObjectFile } from '../../src/study/read-object-file.js';
import { seriesOf } from '../calc/series-of.js';

const read = readObjectFile(readFileSync('objects/liver.json', 'utf8'), 'liver.json');
if (!read.ok) throw new Error('liver.json');
const liver = read.value;
const series = seriesOf('spin-echo/2D', {}, { target: 'liver', comparison: 'spleen' });
const axial = picturePlane('axial', 'AP');

describe('placeObject', () => {
  it('gives the body its typed size, else that of the object', () => {
    const typed = placeObject(liver, series, axial, { frontBackMm: 300, leftRightMm: 420 });
    expect(typed).toMatchObject({ ok: true, value: { bodyMm: [420, 300], enlarged: false } });
    expect(placeObject(liver, series, axial, unknownBody)).toMatchObject({ ok: true, value: { bodyMm: [350, 240], enlarged: false } });
  });

  it('turns the body with the plane', () => {
    expect(picturePlane('sagittal oblique', 'HF')).toEqual({ across: 'AP', down: 'HF', phaseIsDown: true });
    expect(picturePlane('coronal', 'RL')).toEqual({ across: 'RL', down: 'HF', phaseIsDown: false });
    const sagittal = placeObject(liver, series, picturePlane('sagittal', 'AP'), { frontBackMm: 300, leftRightMm: null });
    expect(sagittal).toMatchObject({ ok: true, value: { bodyMm: [300, 500] } });
  });

  it('a small body is drawn as large as the shapes need, and says so; far too small a one is refused', () => {
    const child = placeObject(liver, series, axial, { frontBackMm: 160, leftRightMm: 210 });
    if (!child.ok) throw new Error(child.problems[0]?.message);
    expect(child.value.enlarged).toBe(true);
    expect(child.value.bodyMm[0] / child.value.bodyMm[1]).toBeCloseTo(210 / 160, 6);
    expect(child.value.bodyMm[0]).toBeLessThanOrEqual(210 * 1.6);
    expect(placeObject(liver, series, axial, { frontBackMm: 60, leftRightMm: 60 })).toMatchObject({
      ok: false,
      problems: [{ code: 'body-too-small' }],
    });
  });

  it('roles become the tissues of the series, and each shape takes the place of what it lies in', () => {
    const placed = placeObject(liver, series, axial, unknownBody);
    if (!placed.ok) throw new Error('not placed');
    const of = (id: string) => placed.value.shapes.find(({ shape }) => shape.id === id);
    expect(of('outline')).toMatchObject({ tissue: 'subcutaneous fat', insteadOf: null });
    expect(of('target')).toMatchObject({ tissue: 'liver', insteadOf: 'skeletal muscle' });
    expect(of('disc-5')).toMatchObject({ tissue: 'spleen', insteadOf: 'liver' });
  });
});
