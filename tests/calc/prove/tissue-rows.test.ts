import { describe, expect, it } from 'vitest';
import { tissueRows } from '../../../src/calc/tissue-table.js';
import { publishedTissues } from './published-tissues.js';

describe('the rows of the tissue table', () => {
  it.each(publishedTissues)('%s at %s T is as published', (tissue, fieldT, t1Ms, t2Ms, t2StarMs, protonDensity) => {
    const row = tissueRows.find((one) => one.tissue === tissue && one.fieldT === fieldT);
    expect(row).toMatchObject({ t1Ms, t2Ms, protonDensity });
    expect(row?.t2StarMs ?? null).toBe(t2StarMs);
  });

  it('are these and no others', () => {
    expect(tissueRows.map(({ tissue, fieldT }) => `${tissue} ${fieldT}`).sort()).toEqual(
      publishedTissues.map(([tissue, fieldT]) => `${tissue} ${fieldT}`).sort(),
    );
  });
});
