import { describe, expect, it } from 'vitest';
import { isMeantRecord, type NamedRecord } from '../../src/study/record-meant.js';

const record: NamedRecord = {
  day: '2026-03-09',
  preset: 'liver-3t',
  region: 'liver',
  role: 'lead technologist',
  reasons: ['breath-hold-short', 'patient anxious'],
};

describe('isMeantRecord', () => {
  it.each([
    ['', true],
    ['liver', true],
    ['LIVER lead', true],
    ['knee', false],
    ['liver knee', false],
    ['breath-hold short', true],
    ['anxious', true],
    ['2026', true],
    ['2026-03', true],
    ['2026-03-09', true],
    ['2026-04', false],
    ['2025', false],
    ['2026-01..2026-03', true],
    ['2026-03..', true],
    ['..2026-03', true],
    ['..2026-02', false],
    ['2026-04..', false],
    ['2026-03-09..2026-03-09', true],
    ['2026-03-10..2026-04', false],
    ['..', false],
  ])('%j: %s', (typed, meant) => {
    expect(isMeantRecord(record, typed)).toBe(meant);
  });

  it('a record without a day is in no period, one without reasons is found by that', () => {
    const bare = { ...record, day: null, reasons: [] };
    expect(isMeantRecord(bare, '2026')).toBe(false);
    expect(isMeantRecord(bare, '..2026-12')).toBe(false);
    expect(isMeantRecord(bare, 'liver')).toBe(true);
    expect(isMeantRecord(bare, 'no reason given')).toBe(true);
    expect(isMeantRecord(record, 'no reason given')).toBe(false);
  });
});
