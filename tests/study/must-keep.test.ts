import { describe, expect, it } from 'vitest';
import { type Figures, figureKeys } from '../../src/calc/figures.js';
import { fillDefaults } from '../../src/calc/series.js';
import { loadParser } from '../../src/formulas/load-parser.js';
import { checkMustKeeps, mustKeepCautions } from '../../src/study/must-keep.js';
import { readRules } from '../../src/study/read-rules.js';
import type { MustKeep } from '../../src/study/study.js';

const parse = await loadParser();
const none = Object.fromEntries(figureKeys.map((key) => [key, null])) as unknown as Figures;
const figures: Figures = { ...none, voxelSliceMm: 6, voxelReadMm: 0.9, voxelPhaseMm: 1.1, scanTimeS: 300, relativeSnr: null };
const parameters = fillDefaults('echo-planar-spin-echo/2D', {
  repetitionTimeMs: 4000,
  echoTimeMs: 90,
  fieldOfViewMm: 380,
  matrixRead: 256,
  matrixPhase: 192,
  sliceCount: 20,
  sliceThicknessMm: 6,
  pixelBandwidthHz: 300,
  volumes: 30,
  diffusion: { bValuesSPerMm2: [50, 1400, 800], directions: 3, averages: [1, 8, 4] },
});
const source = 'Some paper, table 1';

function check(mustKeep: MustKeep) {
  const [result] = checkMustKeeps([mustKeep], parameters, figures, readRules([mustKeep], parse));
  return [result?.status, result?.text];
}

describe('checkMustKeeps', () => {
  it.each([
    [{ figure: 'voxelSliceMm', atMost: 5 }, 'crossed', 'voxel, slice 6 mm: must be at most 5 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', atMost: 6 }, 'kept', 'voxel, slice 6 mm: must be at most 6 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', atMost: 6 - 1e-12 }, 'kept', 'voxel, slice 6 mm: must be at most 6 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', atLeast: 7 }, 'crossed', 'voxel, slice 6 mm: must be at least 7 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', atLeast: 6 }, 'kept', 'voxel, slice 6 mm: must be at least 6 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', between: [3, 5] }, 'crossed', 'voxel, slice 6 mm: must be between 3 and 5 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', between: [7, 8] }, 'crossed', 'voxel, slice 6 mm: must be between 7 and 8 mm (Some paper, table 1)'],
    [{ figure: 'voxelSliceMm', between: [6, 8] }, 'kept', 'voxel, slice 6 mm: must be between 6 and 8 mm (Some paper, table 1)'],
    [
      { figure: 'voxelSliceMm', atLeast: 2, atMost: 5 },
      'crossed',
      'voxel, slice 6 mm: must be at least 2 mm and at most 5 mm (Some paper, table 1)',
    ],
    [
      { figure: 'relativeSnr', atLeast: 0.5 },
      'not checked',
      'SNR has no value here: must be at least 0.5, not checked (Some paper, table 1)',
    ],
    [{ parameter: 'echoTimeMs', atMost: 90 }, 'kept', 'TE 90 ms: must be at most 90 ms (Some paper, table 1)'],
    [
      { parameter: 'inversionTimeMs', atMost: 90 },
      'not checked',
      'TI has no value here: must be at most 90 ms, not checked (Some paper, table 1)',
    ],
    [{ parameter: 'diffusion', atLeast: 1400 }, 'kept', 'highest b-value 1400 s/mm2: must be at least 1400 s/mm2 (Some paper, table 1)'],
    [{ parameter: 'diffusion', atLeast: 1500 }, 'crossed', 'highest b-value 1400 s/mm2: must be at least 1500 s/mm2 (Some paper, table 1)'],
    [
      { rule: 'scanTimeS / volumes <= 15' },
      'kept',
      'scan time 300 s, volumes 30: must keep scanTimeS / volumes <= 15 (Some paper, table 1)',
    ],
    [
      { rule: 'voxelReadMm * voxelPhaseMm <= 0.5' },
      'crossed',
      'voxel, read 0.9 mm, voxel, phase 1.1 mm: must keep voxelReadMm * voxelPhaseMm <= 0.5 (Some paper, table 1)',
    ],
    [
      { rule: 'relativeSnr >= 0.5 or averages == 1' },
      'not checked',
      'must keep relativeSnr >= 0.5 or averages == 1: not checked, relativeSnr has no value (Some paper, table 1)',
    ],
    [
      { rule: 'relativeSnr >= 0.5 and averages == 2' },
      'crossed',
      'SNR has no value, averages 1: must keep relativeSnr >= 0.5 and averages == 2 (Some paper, table 1)',
    ],
    [{ rule: 'not flowCompensation' }, 'kept', 'flow compensation off: must keep not flowCompensation (Some paper, table 1)'],
    [
      { rule: 'not a rule at all' },
      'not checked',
      'must keep not a rule at all: not checked, the rule is not read yet (Some paper, table 1)',
    ],
    [{ figure: 'voxelSliceMm', atMost: 5, when: 'averages > 1' }, 'does not apply', 'only when averages > 1 (Some paper, table 1)'],
    [
      { figure: 'voxelSliceMm', atMost: 5, when: 'averages == 1' },
      'crossed',
      'voxel, slice 6 mm: must be at most 5 mm (Some paper, table 1)',
    ],
    [
      { figure: 'voxelSliceMm', atMost: 5, when: 'relativeSnr > 1' },
      'not checked',
      'applies when relativeSnr > 1, and that cannot be told here: not checked (Some paper, table 1)',
    ],
  ] as [Omit<MustKeep, 'source'>, string, string][])('%j is %s', (mustKeep, status, text) => {
    expect(check({ ...mustKeep, source })).toEqual([status, text]);
  });

  it('never keeps a rule that was not read', () => {
    const mustKeep: MustKeep = { rule: 'averages == 1', source };
    expect(checkMustKeeps([mustKeep], parameters, figures, new Map())[0]?.status).toBe('not checked');
  });
});

describe('mustKeepCautions', () => {
  it('says what is crossed and what was not checked, with the numbers', () => {
    const mustKeeps: MustKeep[] = [
      { figure: 'voxelSliceMm', atMost: 5, source },
      { figure: 'voxelReadMm', atMost: 1, source },
      { figure: 'relativeSnr', atLeast: 1, source },
      { figure: 'voxelSliceMm', atMost: 5, when: 'averages > 1', source },
    ];
    expect(mustKeepCautions(checkMustKeeps(mustKeeps, parameters, figures, readRules(mustKeeps, parse)))).toEqual([
      {
        code: 'must-keep',
        level: 'caution',
        text: 'voxel, slice 6 mm: must be at most 5 mm (Some paper, table 1)',
        numbers: { voxelSliceMm: 6 },
      },
      {
        code: 'must-keep-not-checked',
        level: 'note',
        text: 'SNR has no value here: must be at least 1, not checked (Some paper, table 1)',
        numbers: {},
      },
    ]);
  });
});
