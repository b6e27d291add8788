import { seriesNullMs } from '../calc/baseline.js';
import { classRow } from '../calc/classes.js';
import type { SeriesModel } from '../calc/model.js';
import { nullTissueOf, simpleNullMs } from '../calc/null-time.js';
import { effectiveRepetitionTimeMs } from '../calc/pacing.js';
import { tissueOf } from '../calc/tissues.js';
import type { NullCarry } from './carry.js';
import type { CarrySetting, Settled } from './carry-setting.js';

/** The textbook's null of a series, ms: `T1 ln(2 / (1 + e^(-TR/T1)))`; trains count TR less the train (Haacke et al., Magnetic Resonance Imaging, 1999). */
function textbookNullMs(model: SeriesModel, t1Ms: number): number {
  const p = model.series.parameters;
  const trainMs = classRow(model.key).train ? p.echoTrainLength * p.echoSpacingMs : 0;
  return simpleNullMs(t1Ms, Math.max(1, effectiveRepetitionTimeMs(p) - trainMs));
}

/** Both nulls at both fields, or null for a series without one. */
export function carriedNulls({ series, baseline, to }: CarrySetting, settled: Settled): NullCarry | null {
  const before = series.parameters;
  const name = nullTissueOf(series, before.fatSuppression, before.inversionTimeMs);
  const ownToMs = seriesNullMs(settled.model);
  if (name === null || baseline.nullMs === null || ownToMs === null) return null;
  const [old, now] = [tissueOf(name, baseline.model.scanner.fieldT, series), tissueOf(name, to.fieldT, series)];
  if (old === null || now === null) return null;
  return {
    tissue: name,
    ownFromMs: baseline.nullMs,
    ownToMs,
    simpleFromMs: textbookNullMs(baseline.model, old.t1Ms),
    simpleToMs: textbookNullMs(settled.model, now.t1Ms),
  };
}
