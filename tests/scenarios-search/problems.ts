import { unknownBody } from '../../src/calc/body.js';
import type { ClassKey } from '../../src/calc/classes.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { fillDefaults, type GivenParameters } from '../../src/calc/series.js';
import { usualBands } from '../../src/search/bands.js';
import type { Limits } from '../../src/search/limits.js';
import type { SearchProblem } from '../../src/search/problem-to-solve.js';
import type { StudySeries } from '../../src/study/study.js';
import { liverArterialPhase } from '../scenarios/invented-parameters.js';

/** An invented series. */
export function inventedSeries(key: ClassKey, given: GivenParameters, more: Partial<StudySeries>): StudySeries {
  const [family, acquisition] = key.split('/') as [StudySeries['family'], StudySeries['acquisition']];
  return {
    id: 'invented',
    title: 'Invented',
    priority: 1,
    mustKeep: [],
    ranges: {},
    pairedWith: [],
    locked: [],
    opened: [],
    family,
    acquisition,
    plane: 'axial',
    purpose: null,
    target: 'liver',
    comparison: 'spleen',
    contrastAgent: false,
    nullTissue: null,
    tissueOverrides: {},
    parameters: fillDefaults(key, given),
    ...more,
  };
}

export function problemOf(series: StudySeries, fieldT: number, limits: Limits, more: Partial<SearchProblem> = {}): SearchProblem {
  return {
    series,
    presetFieldT: fieldT,
    scanner: plainScanner(fieldT),
    body: unknownBody,
    rules: new Map(),
    limits,
    readings: {},
    bands: usualBands,
    set: {},
    opened: [],
    frozen: false,
    ...more,
  };
}

/** 3 T liver, arterial phase of 17 s: 80 x 60 lines, 1.2 x 1.9 x 3 mm; slices of at most 5 mm must be kept. */
const liverSeries = inventedSeries('spoiled-gradient-echo/3D', liverArterialPhase, {
  purpose: 'dynamic',
  mustKeep: [
    { figure: 'voxelSliceMm', atMost: 5, source: 'LI-RADS v2018 technical table as given by Santillan, Hepatoma Res 2020;6:63, table 3' },
  ],
});

export function liverProblem(limits: Limits, more: Partial<SearchProblem> = {}): SearchProblem {
  return problemOf(liverSeries, 3, limits, more);
}
