import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { evaluate } from '../../src/calc/evaluate.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { checkMustKeeps } from '../../src/study/must-keep.js';
import { readPreset } from '../../src/study/read-preset.js';
import { readRules } from '../../src/study/read-rules.js';
import type { Study } from '../../src/study/study.js';
import { writePreset } from '../../src/study/write-preset.js';

const parse = await loadParser();
const folder = new URL('../../presets/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.json'));

function textOf(file: string): string {
  return readFileSync(new URL(file, folder), 'utf8');
}

function studyOf(file: string): Study {
  const read = readPreset(textOf(file), file, parse);
  if (!read.ok) throw new Error(JSON.stringify(read.problems, null, 2));
  return read.value;
}

describe('shipped presets', () => {
  it('are 26 studies with 130 series', () => {
    expect(files).toHaveLength(26);
    expect(files.reduce((count, file) => count + studyOf(file).series.length, 0)).toBe(130);
  });

  describe.each(files)('%s', (file) => {
    it('reads clean, carries its file name as id, and says what it is', () => {
      const study = studyOf(file);
      expect(`${study.id}.json`).toBe(file);
      expect(study.status).toBe('starter');
      expect(study.notes).toMatch(/^starting values, common practice, no source; review before use\./);
      expect(study.minimumSet.length).toBeGreaterThan(0);
    });

    it('is written as the tool writes presets', () => {
      expect(textOf(file)).toBe(writePreset(studyOf(file)));
    });

    it('keeps every one of its own must-keeps', () => {
      const study = studyOf(file);
      const scanner = plainScanner(study.fieldT);
      const results = study.series.flatMap((series) => {
        const { figures } = evaluate(series, scanner, unknownBody, baselineOf(series, scanner));
        return checkMustKeeps(series.mustKeep, series.parameters, figures, readRules(series.mustKeep, parse)).map(
          ({ status, text }) => `${series.id}: ${status}: ${text}`,
        );
      });
      expect(results.filter((result) => !result.includes(': kept: '))).toEqual([]);
    });

    it("never gives a society's name to common practice, and names a source for everything", () => {
      for (const { mustKeep } of studyOf(file).series) {
        for (const { source } of mustKeep)
          expect(source === 'common practice, no source' || /(LI-RADS|PI-RADS|ACR|MAGNIMS)/.test(source)).toBe(true);
      }
    });
  });

  it('dynamic series are after contrast and never split over the volumes of a timed phase', () => {
    const dynamic = files.flatMap((file) => studyOf(file).series.filter(({ purpose }) => purpose === 'dynamic'));
    expect(dynamic).toHaveLength(6);
    for (const series of dynamic) {
      expect(series.contrastAgent).toBe(true);
      expect(series.parameters.volumes).toBeGreaterThan(1);
      expect(series.parameters.rounds).toBe(1);
    }
  });
});
