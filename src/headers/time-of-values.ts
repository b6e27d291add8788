import type { ClassKey } from '../calc/classes.js';
import { acquiredLines } from '../calc/lines.js';
import type { ParameterKey } from '../calc/parameters.js';
import { plainScanner } from '../calc/scanner.js';
import { fillDefaults, type GivenParameters } from '../calc/series.js';
import { seriesTime } from '../calc/time.js';
import { requiredParameters } from '../study/required-keys.js';

/** Required parameters that time does not hang on. */
const timeless: readonly ParameterKey[] = [
  'echoTimeMs',
  'pixelBandwidthHz',
  'flipAngleDeg',
  'inversionTimeMs',
  'fieldOfViewMm',
  'sliceThicknessMm',
];

/** What is missing before a time can be computed. */
export function lackingForTime(key: ClassKey, given: GivenParameters): readonly ParameterKey[] {
  return requiredParameters(key).filter((name) => given[name] === undefined && !timeless.includes(name));
}

/** Scan time of a class with these values, the others at their defaults, s. `lackingForTime` must be empty. */
export function timeOfValues(key: ClassKey, given: GivenParameters, fieldT: unknown): number {
  const parameters = fillDefaults(key, given);
  const scanner = plainScanner(typeof fieldT === 'number' && fieldT > 0 ? fieldT : 1.5);
  return seriesTime(key, parameters, acquiredLines(key, parameters), parameters.rounds, scanner).scanTimeS;
}
