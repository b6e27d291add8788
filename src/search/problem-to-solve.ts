import type { Body } from '../calc/body.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { Readings } from '../calc/reading.js';
import type { Scanner } from '../calc/scanner.js';
import type { GivenParameters } from '../calc/series.js';
import type { Rules } from '../study/must-keep.js';
import type { StudySeries } from '../study/study.js';
import type { Bands } from './bands.js';
import type { Limits } from './limits.js';

/** Everything a search is asked with: plain data, so that it can be sent to a worker. */
export interface SearchProblem {
  readonly series: StudySeries;
  /** Field of the preset's file, tesla: the preset there is what everything is relative to. */
  readonly presetFieldT: number;
  readonly scanner: Scanner;
  readonly body: Body;
  readonly rules: Rules;
  readonly limits: Limits;
  readonly readings: Readings;
  readonly bands: Bands;
  /** Values that every way has: set by hand, not searched. */
  readonly set: GivenParameters;
  /** Parameters opened by hand beyond those of the class and the preset. */
  readonly opened: readonly ParameterKey[];
  /** Contrast was given and this volume belongs to it: nothing may change. */
  readonly frozen: boolean;
}
