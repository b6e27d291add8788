import { classRow } from '../calc/classes.js';
import { parameterKeys } from '../calc/parameters.js';
import { classOf, type Parameters } from '../calc/series.js';
import type { SeriesResult } from '../session/series-result.js';

/** The document that `figures --json` prints: one object, its keys in a fixed order. */
export function figuresJson(presetId: string, fieldT: number, results: readonly SeriesResult[]): string {
  const document = { preset: presetId, fieldT, series: results.map(seriesDocument) };
  return `${JSON.stringify(document, null, 2)}\n`;
}

function seriesDocument({ series, parameters, evaluation, cautions }: SeriesResult): object {
  return {
    id: series.id,
    parameters: classParameters(series, parameters),
    figures: evaluation.figures,
    fromReading: evaluation.fromReading,
    signals: evaluation.signals.map((signal) => ({
      tissue: signal.tissue,
      t1Ms: signal.t1Ms,
      t2Ms: signal.t2Ms,
      t2StarMs: signal.t2StarMs,
      protonDensity: signal.protonDensity,
      signal: signal.signal,
      secondSignal: signal.secondSignal,
      suppression: signal.suppression,
      diffusionFactor: signal.diffusionFactor,
    })),
    cautions: cautions.map(({ code, level, text }) => ({ code, level, text })),
  };
}

/** Every parameter the class has, in table order; absent ones left out. */
function classParameters(series: SeriesResult['series'], parameters: Parameters): Record<string, unknown> {
  const has = classRow(classOf(series)).parameters;
  const present = parameterKeys.filter((key) => has.includes(key) && parameters[key] !== undefined);
  return Object.fromEntries(present.map((key) => [key, parameters[key]]));
}
