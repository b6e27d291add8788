import { baselineOf } from '../calc/baseline.js';
import { unknownBody } from '../calc/body.js';
import { evaluate } from '../calc/evaluate.js';
import type { FigureKey } from '../calc/figures.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import { plainScanner, type Scanner } from '../calc/scanner.js';
import type { Study, StudySeries } from '../study/study.js';

/** One number without the scanner file and with it; null where it is not known or does not apply. */
export interface Both {
  readonly from: number | null;
  readonly to: number | null;
}

/** What a scanner changes in one series whose parameters stay. */
export interface SeriesChanges {
  readonly id: string;
  readonly acceleration: readonly [number, number];
  /** Noise factor of the series' own acceleration. */
  readonly g: Both;
  /** Noise factor of its simultaneous slices; null where they are not known. */
  readonly simultaneousG: Both;
  readonly shortestEchoTimeMs: Both;
  readonly shortestRepetitionTimeMs: Both;
  readonly slicesPerRepetition: Both;
  readonly chemicalShiftPx: Both;
  readonly relativeSnr: Both;
}

/** What changes when a scanner is chosen for a study: each series on a plain scanner at the field of its file, and on this one. */
export function scannerChanges(study: Study, scanner: Scanner): readonly SeriesChanges[] {
  const plain = plainScanner(study.fieldT);
  return study.series.map((series) => {
    const baseline = baselineOf(series, plain);
    const [before, after] = [plain, scanner].map((on) => evaluate(series, on, unknownBody, baseline).figures);
    const both = (key: FigureKey): Both => ({ from: before?.[key] ?? null, to: after?.[key] ?? null });
    const [phase, slice] = accelerationOf(series);
    const simultaneous = (on: Scanner) => {
      const count = series.parameters.simultaneousSlices;
      return count === 1 ? 1 : (on.simultaneousSliceG[count] ?? null);
    };
    return {
      id: series.id,
      acceleration: [phase, slice],
      g: { from: parallelNoiseFactor(null, phase, slice), to: parallelNoiseFactor(scanner.coil, phase, slice) },
      simultaneousG: { from: simultaneous(plain), to: simultaneous(scanner) },
      shortestEchoTimeMs: both('minimumEchoTimeMs'),
      shortestRepetitionTimeMs: both('minimumRepetitionTimeMs'),
      slicesPerRepetition: both('slicesPerRepetition'),
      chemicalShiftPx: both('chemicalShiftPx'),
      relativeSnr: both('relativeSnr'),
    };
  });
}

function accelerationOf({ acquisition, parameters }: StudySeries): readonly [number, number] {
  return [parameters.parallelFactorPhase, acquisition === '3D' ? parameters.parallelFactorSlice : 1];
}
