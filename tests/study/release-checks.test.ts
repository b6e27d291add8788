import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { shippedStudy } from '../../scripts/invented-records.js';
import type { Parameters } from '../../src/calc/series.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readRules } from '../../src/study/read-rules.js';
import { type CheckCircumstances, checkStudy, isReleasable } from '../../src/study/release-checks.js';
import type { Study, StudySeries } from '../../src/study/study.js';

const plain = { rules: new Map(), fieldT: null, previous: null };

function withSeries(study: Study, id: string, parameters: Partial<Parameters>, more: Partial<StudySeries> = {}): Study {
  const series = study.series.map((one) => (one.id === id ? { ...one, ...more, parameters: { ...one.parameters, ...parameters } } : one));
  return { ...study, series: series as StudySeries[] };
}

const failures = (study: Study, more: Partial<CheckCircumstances> = {}) =>
  checkStudy(study, { ...plain, ...more }).filter(({ level }) => level === 'failure');

describe('checkStudy', () => {
  it('finds no failure in any shipped preset', async () => {
    const parse = await loadParser();
    for (const name of readdirSync('presets')) {
      const study = shippedStudy(name.replace(/\.json$/, ''));
      const rules = readRules(
        study.series.flatMap(({ mustKeep }) => mustKeep),
        parse,
      );
      expect([name, failures(study, { rules })]).toEqual([name, []]);
    }
  });

  it('finds timing that is impossible, and figures that have no value', () => {
    const found = failures(withSeries(shippedStudy('brain-1.5t'), 't1', { repetitionTimeMs: 10, echoTimeMs: 15 }));
    expect(found.map(({ code, series }) => [series, code])).toContainEqual(['t1', 'timing-impossible']);
    expect(found.map(({ code }) => code)).toContain('figure-not-finite');
  });

  it('finds an in/opposed pair copied from 1.5 T to 3 T, and one that the exact field moves off', () => {
    // 2.30 and 4.60 ms are opposed and in phase at 1.5 T, and both in phase at 3 T (fat-water shift 3.4 ppm).
    const copied = withSeries(shippedStudy('liver-3t'), 'dual-echo', { echoTimeMs: 2.3, secondEchoTimeMs: 4.6 });
    expect(failures(copied).map(({ code }) => code)).toContain('echo-pair-phase');
    const study = shippedStudy('liver-1.5t');
    expect(failures(study)).toEqual([]);
    expect(failures(study, { fieldT: 1.2 }).map(({ code }) => code)).toContain('echo-pair-phase');
  });

  it('finds a null that drifted against the revision before: TR 9000 to 6000 with the same TI', () => {
    const study = shippedStudy('brain-3t');
    const flair = study.series.find(({ parameters }) => parameters.inversionTimeMs !== undefined && parameters.repetitionTimeMs > 5000)!;
    const shorter = withSeries(study, flair.id, { repetitionTimeMs: flair.parameters.repetitionTimeMs * 0.66, rounds: 2 });
    expect(failures(shorter, { previous: study }).map(({ code, series }) => [series, code])).toContainEqual([flair.id, 'null-drift']);
    expect(failures(shorter).filter(({ code }) => code === 'null-drift')).toEqual([]);
  });

  it('finds must-keeps that the preset itself crosses, and such without a source', () => {
    const thick = failures(withSeries(shippedStudy('liver-3t'), 't1-3d', { sliceThicknessMm: 6, sliceCount: 36 }));
    expect(thick.map(({ code }) => code)).toEqual(['must-keep']);
    expect(thick[0]!.text).toContain('LI-RADS');
    const unsourced = failures(
      withSeries(shippedStudy('liver-3t'), 't1-3d', {}, { mustKeep: [{ figure: 'voxelSliceMm', atMost: 5, source: ' ' }] }),
    );
    expect(unsourced.map(({ code }) => code)).toEqual(['source-missing']);
  });

  it('notes what is no failure: reviewed by nobody knows whom, a rule that is not read', () => {
    const study = withSeries(shippedStudy('liver-3t'), 't1-3d', {}, { mustKeep: [{ rule: 'averages >= 1', source: 'invented' }] });
    const found = checkStudy({ ...study, status: 'reviewed' }, plain);
    expect(found.map(({ level, code }) => `${level} ${code}`)).toEqual(['note must-keep-not-checked', 'note release-not-said']);
    expect(isReleasable(found)).toBe(true);
  });
});
