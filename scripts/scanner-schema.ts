import { pulseNames } from '../src/calc/scanner.js';
import { presetLimits } from '../src/study/limits.js';
import { scannerLimits, scannerNumbers, simultaneousCounts } from '../src/study/scanner-file.js';
import { closed, named, type Schema, text } from './schema-parts.js';

const factor = (description: string): Schema => ({ type: 'number', minimum: 1, maximum: 16, description });
const noise: Schema = { type: 'number', minimum: 1, maximum: 20, description: 'noise factor: 1 adds none' };
const count = (description: string): Schema => ({ type: 'integer', minimum: 1, maximum: 256, description });

const simultaneous = closed(Object.fromEntries(simultaneousCounts.map((number) => [String(number), noise])), [], {
  description: 'noise factor of slices excited together, by their number; a number that is left out is not known',
});

const noiseRow = closed(
  {
    phase: factor('acceleration R along phase'),
    slice: factor('acceleration R along partitions, 1 in 2D'),
    region: named(presetLimits.word, 'body region it was measured in; left out: any'),
    g: noise,
  },
  ['phase', 'slice', 'g'],
);

const coil = closed(
  {
    name: named(scannerLimits.name, 'nickname of the coil'),
    elements: closed(
      { AP: count('elements front to back'), RL: count('elements right to left'), HF: count('elements head to feet') },
      ['AP', 'RL', 'HF'],
      { description: 'elements along each body axis: they bound acceleration along it' },
    ),
    g: {
      type: 'array',
      maxItems: scannerLimits.noiseRows,
      items: noiseRow,
      description: 'measured noise factors; what is beyond them is not known',
    },
    simultaneousSliceG: simultaneous,
  },
  ['name', 'elements', 'g'],
);

const pulse = closed(
  {
    durationMs: { type: 'number', exclusiveMinimum: 0, maximum: 100, description: 'ms' },
    timeBandwidth: {
      type: 'number',
      minimum: 0,
      maximum: 50,
      description: 'time-bandwidth product of a Hann-windowed sinc; 0 is a hard pulse',
    },
    gaussian: { const: true, description: 'Gaussian, cut at two standard deviations' },
    powerFactor: {
      type: 'number',
      exclusiveMinimum: 0,
      maximum: 50,
      description: 'energy against a hard pulse of the same angle and duration',
    },
  },
  ['durationMs'],
);

/** The JSON Schema (draft 7) of a scanner file, from its table of numbers. */
export const scannerSchema: Schema = {
  $schema: 'http://json-schema.org/draft-07/schema#',
  title: 'Holdfast scanner',
  description: 'One scanner by a nickname: what the model needs to know of it, and nothing that identifies it.',
  ...closed(
    {
      $schema: { type: 'string', maxLength: presetLimits.source },
      format: { const: 'holdfast scanner' },
      version: { const: 1 },
      name: named(scannerLimits.name, 'nickname, by which it is chosen'),
      notes: text(presetLimits.notes, 'for the people who use this scanner'),
      ...Object.fromEntries(
        Object.entries(scannerNumbers).map(([key, { min, max, otherwise, help }]) => [
          key,
          { type: 'number', minimum: min, maximum: max, ...(otherwise === null ? {} : { default: otherwise }), description: help },
        ]),
      ),
      coils: { type: 'array', maxItems: scannerLimits.coils, items: coil, description: 'the first is taken where none is chosen' },
      simultaneousSliceG: simultaneous,
      pulses: closed(Object.fromEntries(pulseNames.map((name) => [name, pulse])), [], {
        description: 'RF pulses that differ from the usual ones',
      }),
    },
    ['format', 'version', 'name', 'fieldT'],
  ),
};
