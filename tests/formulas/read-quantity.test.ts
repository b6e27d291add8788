import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readQuantity } from '../../src/formulas/read-quantity.js';

describe('readQuantity', () => {
  it.each([
    ['380', 'mm', 380],
    ['38 cm', 'mm', 380],
    ['38cm', 'mm', 380],
    ['0.38 m', 'mm', 380],
    ['500 um', 'mm', 0.5],
    ['1.2 s', 'ms', 1200],
    ['1.005 s', 'ms', 1005],
    ['250 us', 'ms', 0.25],
    ['250 \u00b5s', 'ms', 0.25],
    ['1:30', 's', 90],
    ['1:30', 'ms', 90_000],
    ['0:07.5', 's', 7.5],
    ['2 min', 's', 120],
    ['1500 ms', 's', 1.5],
    ['50 %', '%', 50],
    ['50%', '%', 50],
    ['90 deg', 'deg', 90],
    ['90\u00b0', 'deg', 90],
    ['20 kHz', 'Hz/px', 20_000],
    ['0.5 kHz/px', 'Hz/px', 500],
    ['635 Hz', 'Hz/px', 635],
    ['635 hz/PX', 'Hz/px', 635],
    ['6/8', '', 0.75],
    ['7 / 8', '', 0.875],
    ['1e3', '', 1000],
    ['  2  ', '', 2],
    ['+2', '', 2],
    ['.5', '', 0.5],
    ['-1', '', -1],
    ['2.89 T', 'T', 2.89],
  ])('%s in %s is %d', (text, unit, value) => {
    expect(readQuantity(text, unit)).toEqual({ ok: true, value });
  });

  it.each([
    ['38 kg', 'mm'],
    ['38 ms', 'mm'],
    ['1,5', ''],
    ['NaN', ''],
    ['nan', 'mm'],
    ['Infinity', 'ms'],
    ['1e999', ''],
    ['1e309', 'mm'],
    ['', ''],
    ['mm', 'mm'],
    ['1 2', ''],
    ['2 mm', ''],
    ['1:30', 'mm'],
    ['1:75', 's'],
    ['6/0', ''],
    ['6/8', 'mm'],
    ['0x10', ''],
    ['1_000', ''],
    ['5 constructor', 'mm'],
    ['5 __proto__', 'mm'],
  ])('%s in "%s" is refused with what was expected', (text, unit) => {
    const reading = readQuantity(text, unit);
    expect(reading.ok).toBe(false);
    if (!reading.ok) expect(reading.expected).not.toBe('');
  });

  it('never throws and never gives a number that is not finite', () => {
    fc.assert(
      fc.property(
        fc.oneof(fc.string(), fc.double().map(String)),
        fc.constantFrom('', 'mm', 'ms', 's', 'deg', '%', 'Hz/px', 'x'),
        (text, unit) => {
          const reading = readQuantity(text, unit);
          if (reading.ok) expect(Number.isFinite(reading.value)).toBe(true);
        },
      ),
    );
  });

  it('reads back every finite number that JavaScript prints', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (number) => {
        expect(readQuantity(String(number), '')).toEqual({ ok: true, value: number + 0 });
      }),
    );
  });
});
