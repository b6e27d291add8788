import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { plainScanner } from '../../src/calc/scanner.js';
import type { SeriesCarry } from '../../src/search/carry.js';
import { carrySeries } from '../../src/search/carry-series.js';
import { carriedDraft, carryStudy } from '../../src/search/carry-study.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { Study, StudySeries } from '../../src/study/study.js';
import { writePreset } from '../../src/study/write-preset.js';

const studies: readonly Study[] = readdirSync('presets').map((name) => {
  const outcome = readPreset(readFileSync(`presets/${name}`, 'utf8'), name);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
  return outcome.value;
});

function carry(series: StudySeries, fromT: number, toT: number): SeriesCarry {
  return carrySeries(series, { from: plainScanner(fromT), to: plainScanner(toT), aim: 'contrast', rules: new Map() });
}

/** There and back: the ratio of the preset, the ratio at the end, and what either way says of it. */
const trips = studies.flatMap((study) => {
  const away = study.fieldT === 1.5 ? 3 : 1.5;
  return study.series.map((series) => {
    const there = carry(series, study.fieldT, away);
    const back = carry({ ...series, parameters: there.parameters }, away, study.fieldT);
    const [before, after] = [there.contrast.from, back.contrast.to];
    const drift = before === null || after === null ? null : after / before - 1;
    // A way there that no scanner could play is no way back.
    const played = there.evaluation.cautions.every(({ code }) => code !== 'timing-impossible');
    return { name: `${study.id} ${series.id}`, drift: played ? drift : null, reasons: [there.contrast, back.contrast] };
  });
});

describe('every shipped series carried between 1.5 T and 3 T and back', () => {
  it('is all of them', () => {
    expect(trips).toHaveLength(130);
  });

  it('returns the contrast ratio within 2 % for at least 100', () => {
    const kept = trips.filter(({ drift }) => drift !== null && Math.abs(drift) <= 0.02);
    expect(kept.length).toBeGreaterThanOrEqual(100);
  });

  it('names the reason of each of the others', () => {
    const others = trips.filter(({ drift }) => drift === null || Math.abs(drift) > 0.02);
    const without = others.filter(({ reasons }) => {
      return !reasons.some(({ status, words }) => (status === 'unsolvable' || status === 'not known') && words.length > 40);
    });
    expect(without.map(({ name }) => name)).toEqual([]);
  });
});

describe('every shipped study carried to 0.55 T, 2.89 T and back to its own field', () => {
  const carried = studies.map((study) => ({
    study,
    low: carryStudy(study, { from: plainScanner(study.fieldT), to: plainScanner(0.55), aim: 'shift', rules: new Map() }),
  }));

  it('names the tissues that are extrapolated, and what else has no source there', () => {
    const named = new Set(carried.flatMap(({ low }) => low.series.flatMap(({ extrapolated }) => extrapolated)));
    expect(named.size).toBeGreaterThan(3);
    for (const { low } of carried) {
      for (const { extrapolated, evaluation, gaps } of low.series) {
        const said = evaluation.cautions
          .filter(({ code }) => code === 'extrapolated-tissue')
          .map(({ text }) => text.split(':')[0] as string);
        expect(said.filter((tissue) => !extrapolated.includes(tissue))).toEqual([]);
        expect(gaps.map(({ what }) => what)).toContain('SAR trend');
      }
    }
  });

  it('gives drafts that read back, keep their must-keeps, and say where they come from', () => {
    for (const { study, low } of carried) {
      const draft = carriedDraft(low, study);
      const read = readPreset(writePreset(draft), 'draft.json');
      if (!read.ok) throw new Error(`${study.id}: ${JSON.stringify(read.problems)}`);
      expect(read.value).toEqual(draft);
      expect(draft).toMatchObject({ status: 'draft', revision: 1, fieldT: 0.55 });
      expect(draft.id).not.toBe(study.id);
      expect(draft.notes).toContain(`carried from ${study.id} revision ${study.revision}, ${study.fieldT} T, to 0.55 T`);
      expect(draft.series.map(({ mustKeep }) => mustKeep)).toEqual(study.series.map(({ mustKeep }) => mustKeep));
    }
  });
});
