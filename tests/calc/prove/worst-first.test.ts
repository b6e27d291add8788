import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../../src/calc/baseline.js';
import { type CautionLevel, SaidCaution, worstFirst } from '../../../src/calc/caution.js';
import { plainScanner } from '../../../src/calc/scanner.js';
import { seriesOf } from '../series-of.js';

const { model } = baselineOf(seriesOf('spin-echo/2D'), plainScanner(1.5));
const caution = (level: CautionLevel, text: string) => new SaidCaution('must-keep', level, {}, model, () => text);

describe('the order of cautions', () => {
  it('is worst first, two as well as many; equals keep their order', () => {
    const note = caution('note', 'a');
    const error = caution('error', 'b');
    const middle = caution('caution', 'c');
    const later = caution('note', 'd');
    expect(worstFirst([note, error])).toEqual([error, note]);
    expect(worstFirst([note, later, middle, error]).map(({ text }) => text)).toEqual(['b', 'c', 'a', 'd']);
    expect(worstFirst([note])).toEqual([note]);
    expect(worstFirst([])).toEqual([]);
  });
});
