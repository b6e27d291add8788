import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { classRow } from '../../src/calc/classes.js';
import { evaluate } from '../../src/calc/evaluate.js';
import { type FigureKey, figureKeys } from '../../src/calc/figures.js';
import { isBreathHeld, isCine } from '../../src/calc/pacing.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { classOf, type Series } from '../../src/calc/series.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readPreset } from '../../src/study/read-preset.js';

const parse = await loadParser();
const folder = new URL('../../presets/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.json'));

/** Figures of the class that this series announces it has not, by what it is and not by what came out. */
function announcedNulls(series: Series): readonly FigureKey[] {
  const p = series.parameters;
  return [
    ...(isBreathHeld(p) ? [] : (['holdTimeS', 'holds'] as const)),
    ...(isCine(p) ? (['slicesPerRepetition', 'roundsNeeded'] as const) : (['temporalResolutionMs', 'cardiacPhases'] as const)),
    ...(p.inversionTimeMs === undefined ? (['nullTimeMs'] as const) : []),
  ];
}

describe.each(files)('figures of %s', (file) => {
  const read = readPreset(readFileSync(new URL(file, folder), 'utf8'), file, parse);
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  const { fieldT, series: all } = read.value;

  it.each(all)(
    '$id: every figure of its class, no other, nothing missing that is not announced; played as modelled, without an error',
    (series) => {
      const scanner = plainScanner(fieldT);
      const { figures, cautions } = evaluate(series, scanner, unknownBody, baselineOf(series, scanner));
      const row = classRow(classOf(series)).figures;
      const announced = announcedNulls(series);
      // Fluid may have passed its null before the first TI that a long cycle allows: then there is none, and the table of classes says so.
      const open = series.family === 'inversion-prepared-gradient-echo' ? ['nullTimeMs'] : [];
      const wrong = figureKeys.filter(
        (key) => !open.includes(key) && (figures[key] !== null) !== (row.includes(key) && !announced.includes(key)),
      );
      expect(wrong).toEqual([]);
      expect(cautions.filter(({ code, level }) => level === 'error' || code === 'slot-scaled').map(({ text }) => text)).toEqual([]);
    },
  );
});
