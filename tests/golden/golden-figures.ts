import { createHash } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { baselineOf } from '../../src/calc/baseline.js';
import { unknownBody } from '../../src/calc/body.js';
import { classRow } from '../../src/calc/classes.js';
import { type Evaluation, evaluate } from '../../src/calc/evaluate.js';
import type { Figures } from '../../src/calc/figures.js';
import { modelVersion } from '../../src/calc/model-version.js';
import { parameterKeys } from '../../src/calc/parameters.js';
import { resolveParameters } from '../../src/calc/resolve.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { classOf, type GivenParameters, type Parameters } from '../../src/calc/series.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { StudySeries } from '../../src/study/study.js';

type Plain = string | number | boolean | null | readonly Plain[] | { readonly [key: string]: Plain };

/** What the model says of one shipped series. */
export interface GoldenSeries {
  /** Of what the model reads of the series in its file: tells a changed preset from a changed model. */
  readonly preset: string;
  readonly parameters: Plain;
  readonly figures: Plain;
  /** Of the target and the comparison. */
  readonly signals: Plain;
  /** After one edit of bandwidth, phase lines, thickness and averages: what is carried, and the figures that compare. */
  readonly edited: Plain;
}

export interface Golden {
  readonly modelVersion: string;
  /** By `preset/series`. */
  readonly series: Readonly<Record<string, GoldenSeries>>;
}

const presetFolder = fileURLToPath(new URL('../../presets/', import.meta.url));
export const goldenFile = fileURLToPath(new URL('./figures.json', import.meta.url));

/** The figures that say nothing about a series beside itself. */
const comparing = [
  'relativeSnr',
  'relativeContrast',
  'contrastRatioChange',
  'rfPowerTrend',
  'sarTrendLow',
  'sarTrendHigh',
  'scanTimeS',
  'holdTimeS',
  'b1PlusRmsUt',
  'minimumEchoTimeMs',
  'minimumRepetitionTimeMs',
  'roundsNeeded',
  'blurFwhmPx',
] as const satisfies readonly (keyof Figures)[];

/** What the model reads of a series in a preset file. */
const readByModel = [
  'family',
  'acquisition',
  'plane',
  'purpose',
  'target',
  'comparison',
  'contrastAgent',
  'nullTissue',
  'tissueOverrides',
  'parameters',
];

function plain(value: unknown): Plain {
  return JSON.parse(JSON.stringify(value)) as Plain;
}

function classParameters(series: StudySeries, parameters: Parameters): Plain {
  const has = classRow(classOf(series)).parameters;
  return plain(Object.fromEntries(parameterKeys.filter((key) => has.includes(key)).map((key) => [key, parameters[key]])));
}

/** Target and comparison; the names stand in the preset. */
function pair({ signals }: Evaluation): Plain {
  return plain(signals);
}

/** One edit that moves timing, lines, noise and RF of every class. */
function editOf(p: Parameters): GivenParameters {
  return {
    pixelBandwidthHz: p.pixelBandwidthHz * 1.25,
    matrixPhase: Math.round(p.matrixPhase * 0.9),
    sliceThicknessMm: p.sliceThicknessMm * 1.2,
    averages: p.averages + 1,
  };
}

function goldenSeries(series: StudySeries, fieldT: number, given: string): GoldenSeries {
  const scanner = plainScanner(fieldT);
  const baseline = baselineOf(series, scanner);
  const asItIs = evaluate(series, scanner, unknownBody, baseline, { tissues: 'pair' });
  const { parameters, carried } = resolveParameters(baseline, editOf(series.parameters), scanner);
  const { figures } = evaluate({ ...series, parameters }, scanner, unknownBody, baseline, { tissues: 'pair' });
  return {
    preset: createHash('sha256').update(given).digest('hex').slice(0, 12),
    parameters: classParameters(series, series.parameters),
    figures: plain(asItIs.figures),
    signals: pair(asItIs),
    edited: plain({
      carried: Object.fromEntries(carried.map(({ key, to }) => [key, to])),
      figures: Object.fromEntries(comparing.map((key) => [key, figures[key]])),
    }),
  };
}

/** Everything the model says of every shipped preset, computed now. */
export function goldenNow(): Golden {
  const series: Record<string, GoldenSeries> = {};
  for (const file of readdirSync(presetFolder)
    .filter((name) => name.endsWith('.json'))
    .sort()) {
    const text = readFileSync(`${presetFolder}${file}`, 'utf8');
    const study = readPreset(text, file);
    if (!study.ok) throw new Error(study.problems[0]?.message);
    const given = JSON.parse(text) as { readonly fieldT: number; readonly series: readonly Record<string, unknown>[] };
    study.value.series.forEach((one, i) => {
      series[`${study.value.id}/${one.id}`] = goldenSeries(
        one,
        study.value.fieldT,
        JSON.stringify([given.fieldT, readByModel.map((key) => given.series[i]?.[key])]),
      );
    });
  }
  return { modelVersion, series };
}

/** The file as it stands, or null where there is none yet. */
export function goldenKept(): Golden | null {
  try {
    return JSON.parse(readFileSync(goldenFile, 'utf8')) as Golden;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}

/** The text of the file: one line for each part of a series, so that a difference can be read. */
export function goldenText(golden: Golden): string {
  const series = Object.entries(golden.series).map(([name, parts]) => {
    const lines = Object.entries(parts).map(([part, value]) => `      ${JSON.stringify(part)}: ${JSON.stringify(value)}`);
    return `    ${JSON.stringify(name)}: {\n${lines.join(',\n')}\n    }`;
  });
  return `{\n  "modelVersion": ${JSON.stringify(golden.modelVersion)},\n  "series": {\n${series.join(',\n')}\n  }\n}\n`;
}
