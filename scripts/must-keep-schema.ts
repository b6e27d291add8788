import { figureKeys } from '../src/calc/figures.js';
import { parameterKeys, parameterRow } from '../src/calc/parameters.js';
import { presetLimits } from '../src/study/limits.js';
import { closed, named, type Schema } from './schema-parts.js';

const measurable = parameterKeys.filter((key) => parameterRow(key).kind === 'number' || key === 'diffusion');

const limit: Schema = { type: 'number' };
const someLimit: Schema = { anyOf: [{ required: ['atMost'] }, { required: ['atLeast'] }, { required: ['between'] }] };

/** One must-keep, of a preset or of a site. */
export const mustKeepSchema: Schema = closed(
  {
    figure: { enum: figureKeys },
    parameter: { enum: measurable, description: 'diffusion stands for its highest b-value, s/mm2' },
    atMost: limit,
    atLeast: limit,
    between: { type: 'array', items: limit, minItems: 2, maxItems: 2 },
    rule: named(presetLimits.formula, 'formula over parameter and figure keys'),
    when: named(presetLimits.formula, 'formula that says when this applies'),
    source: named(presetLimits.source, 'where this is asked for'),
  },
  ['source'],
  {
    oneOf: [
      { required: ['figure'], ...someLimit },
      { required: ['parameter'], ...someLimit },
      { required: ['rule'], not: someLimit },
    ],
  },
);
