import { describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readExpression } from '../../src/formulas/read-expression.js';

const parse = await loadParser();

const fov = { name: 'fieldOfViewMm', unit: 'mm', value: 380 };
const averages = { name: 'averages', unit: '', value: 4 };
const tr = { name: 'repetitionTimeMs', unit: 'ms', value: 600 };
const oversampling = { name: 'phaseOversamplingPercent', unit: '%', value: 20 };

describe('readExpression works out what a person types', () => {
  it.each([
    ['38 cm', fov, 380],
    ['1.2 mm * 256', fov, 307.2],
    ['fieldOfViewMm * 0.9', fov, 342],
    ['+10%', fov, 418],
    ['-10 %', fov, 342],
    ['/2', averages, 2],
    ['*1.5', averages, 6],
    ['-1', averages, 3],
    ['(2 + 1) * 2', averages, 6],
    ['2^3', averages, 8],
    ['1.2 s', tr, 1200],
    ['+ 0.1 s', tr, 700],
    ['380 mm / 1.9 mm', { name: 'matrixPhase', unit: '', value: 200 }, 200],
    ['+10%', oversampling, 30],
    ['20 kHz', { name: 'pixelBandwidthHz', unit: 'Hz/px', value: 200 }, 20_000],
  ] as const)('%s', (text, subject, value) => {
    expect(readExpression(text, subject, parse)).toEqual({ ok: true, value });
  });

  it.each([
    ['38 s', fov],
    ['2 mm * 3 mm', fov],
    ['10%', averages],
    ['x + 1', averages],
    ['sqrt(4)', averages],
    ['averages = 3', averages],
    ['a.b', averages],
    ['[1, 2]', averages],
    ['"x"', averages],
    ['2; 3', averages],
    ['import("fs")', averages],
    ['averages.constructor', averages],
    ['constructor', averages],
    ['__proto__', averages],
    ['1/0', averages],
    ['', averages],
    ['((((((((((((((((((((((((((((((((((((((((1))))))))))))))))))))))))))))))))))))))))', averages],
    ['1'.repeat(200), averages],
    ['38 cm + 2 s', fov],
  ] as const)('refuses %s, with what was given and what is expected', (text, subject) => {
    const reading = readExpression(text, subject, parse);
    expect(reading.ok).toBe(false);
    if (!reading.ok) expect(reading.expected.length).toBeGreaterThan(5);
  });
});
