import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { rulesSchema } from '../../scripts/rules-schema.js';
import { schemaText } from '../../scripts/schema-text.js';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { evaluate } from '../../src/calc/evaluate.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { checkMustKeeps, mustKeepCautions } from '../../src/study/must-keep.js';
import { readPreset } from '../../src/study/read-preset.js';
import { readRules } from '../../src/study/read-rules.js';
import { readSiteRules } from '../../src/study/read-site-rules.js';
import { noSiteRules, siteMustKeeps, withSiteRules } from '../../src/study/site-rules.js';
import { hostileFormulas } from '../formulas/hostile-formulas.js';

const parse = await loadParser();

function fileOf(rules: readonly object[], more: object = {}): string {
  return JSON.stringify({ format: 'holdfast rules', version: 1, ...more, rules }, null, 2);
}

function read(text: string) {
  return readSiteRules(text, 'rules.json', parse);
}

function codesOf(text: string): string[] {
  const outcome = read(text);
  return outcome.ok ? [] : outcome.problems.map(({ code }) => code);
}

const liver = (() => {
  const outcome = readPreset(readFileSync('presets/liver-3t.json', 'utf8'), 'liver-3t.json', parse);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
  return outcome.value;
})();

describe('schema/rules.schema.json', () => {
  it('is what the tables give today (else run: npm run schema)', () => {
    expect(readFileSync('schema/rules.schema.json', 'utf8')).toBe(schemaText(rulesSchema));
  });
});

describe('readSiteRules', () => {
  it('reads rules by region, by class, and for all', () => {
    const rules = [
      { region: 'Liver', mustKeep: { figure: 'voxelSliceMm', atMost: 4, source: 'site, 2024' } },
      { family: 'fast-spin-echo', mustKeep: { rule: 'blurFwhmPx < 3', source: 'site' } },
      { mustKeep: { parameter: 'averages', atMost: 6, when: 'scanTimeS > 4 min', source: 'site' } },
    ];
    const outcome = read(fileOf(rules, { notes: 'for all of us' }));
    expect(outcome).toEqual({ ok: true, value: { format: 'holdfast rules', version: 1, notes: 'for all of us', rules } });
  });

  it.each([
    ['{', ['not-json']],
    ['[]', ['wrong-type']],
    [fileOf([{ region: 'liver' }]), ['missing-key']],
    [fileOf([{ mustKeep: { figure: 'voxelSliceMm', atMost: 4 } }]), ['missing-key']],
    [fileOf([{ mustKeep: { figure: 'voxelSliceMm', source: 's' } }]), ['must-keep-form']],
    [fileOf([{ mustKeep: { rule: 'averages < 2', atMost: 4, source: 's' } }]), ['must-keep-form']],
    [fileOf([{ mustKeep: { figure: 'voxelSliceMm', rule: 'averages < 2', atMost: 4, source: 's' } }]), ['must-keep-form']],
    [fileOf([{ mustKeep: { figure: 'voxelSliceMn', atMost: 4, source: 's' } }]), ['unknown-word']],
    [fileOf([{ family: 'fast-spin', mustKeep: { figure: 'voxelSliceMm', atMost: 4, source: 's' } }]), ['unknown-word']],
    [fileOf([{ reigon: 'liver', mustKeep: { figure: 'voxelSliceMm', atMost: 4, source: 's' } }]), ['unknown-key']],
    [fileOf([], { format: 'holdfast preset' }), ['unknown-word']],
    [fileOf([]).replace('"version": 1', '"version": 1, "version": 1'), ['duplicate-key']],
    [' '.repeat(1_000_001), ['too-large']],
    ['\u0000', ['not-text']],
  ])('refuses %.60s', (text, codes) => {
    expect(codesOf(text)).toEqual(codes);
  });

  it.each(hostileFormulas)('refuses the formula %.60s with file, line and the part', (formula, code) => {
    const text = fileOf([{ mustKeep: { figure: 'voxelSliceMm', atMost: 4, source: 's' } }, { mustKeep: { rule: formula, source: 's' } }]);
    const outcome = read(text);
    expect(outcome.ok).toBe(false);
    if (outcome.ok) return;
    const [problem] = outcome.problems;
    // The schema counts characters before the formula is read.
    expect(problem?.code).toBe(formula === '' ? 'wrong-length' : code === 'formula-length' ? 'wrong-length' : code);
    const line = text.slice(0, text.indexOf('"rule"')).split('\n').length;
    expect(problem?.message).toMatch(new RegExp(`^rules\\.json, line ${line}, rules\\.2\\.mustKeep\\.rule: `));
  });

  it('says which name was meant', () => {
    const outcome = read(fileOf([{ mustKeep: { rule: 'voxelSliceMn <= 4', source: 's' } }]));
    expect(outcome.ok ? '' : outcome.problems[0]?.hint).toBe('Did you mean "voxelSliceMm"?');
  });
});

describe('site rules beside those of a preset', () => {
  const outcome = read(
    fileOf([
      { region: 'LIVER', mustKeep: { figure: 'voxelSliceMm', atMost: 2, source: 'our site, 2025' } },
      { region: 'knee', mustKeep: { figure: 'voxelSliceMm', atMost: 1, source: 'our site, 2025' } },
      { family: 'echo-planar-spin-echo', mustKeep: { rule: 'echoTimeMs <= 90 ms and chemicalShiftPx < 30', source: 'our site, 2025' } },
      { mustKeep: { figure: 'temporalResolutionMs', atMost: 50, source: 'our site, 2025' } },
    ]),
  );
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
  const site = outcome.value;

  it('hold for the region, upper and lower case alike, and for the class', () => {
    const counts = liver.series.map((series) => [series.id, siteMustKeeps(site, liver, series).length]);
    expect(counts).toEqual(liver.series.map(({ id, family }) => [id, family === 'echo-planar-spin-echo' ? 3 : 2]));
  });

  it('stand after those of the preset, and are not said twice', () => {
    const once = withSiteRules(liver, site);
    expect(once.series[0]?.mustKeep.slice(0, liver.series[0]?.mustKeep.length)).toEqual(liver.series[0]?.mustKeep);
    expect(withSiteRules(once, site)).toEqual(once);
    expect(withSiteRules(liver, noSiteRules)).toBe(liver);
  });

  it('crossed, they carry the sentence, the numbers and the source; without a value they are not checked', () => {
    const series = withSiteRules(liver, site).series.find(({ id }) => id === 't1-3d')!;
    const scanner = plainScanner(3);
    const { figures } = evaluate(series, scanner, unknownBody, baselineOf(series, scanner));
    const cautions = mustKeepCautions(checkMustKeeps(series.mustKeep, series.parameters, figures, readRules(series.mustKeep, parse)));
    expect(cautions).toEqual([
      {
        code: 'must-keep',
        level: 'caution',
        text: 'voxel, slice 3 mm: must be at most 2 mm (our site, 2025)',
        numbers: { voxelSliceMm: 3 },
      },
      {
        code: 'must-keep-not-checked',
        level: 'note',
        text: 'temporal resolution has no value here: must be at most 50 ms, not checked (our site, 2025)',
        numbers: {},
      },
    ]);
  });
});
