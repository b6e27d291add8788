import { families } from '../src/calc/classes.js';
import { presetLimits } from '../src/study/limits.js';
import { siteRulesLimits } from '../src/study/site-rules.js';
import { mustKeepSchema } from './must-keep-schema.js';
import { closed, named, type Schema, text } from './schema-parts.js';

const rule = closed(
  {
    region: named(presetLimits.word, 'only presets of this body region, upper and lower case alike; left out: all'),
    family: { enum: families, description: 'only series of this class; left out: all' },
    mustKeep: mustKeepSchema,
  },
  ['mustKeep'],
);

/** The JSON Schema (draft 7) of a file of site rules. */
export const rulesSchema: Schema = {
  $schema: 'http://json-schema.org/draft-07/schema#',
  title: 'Holdfast rules',
  description: 'What a site keeps in all its presets, beside what each preset keeps.',
  ...closed(
    {
      $schema: { type: 'string', maxLength: presetLimits.source },
      format: { const: 'holdfast rules' },
      version: { const: 1 },
      notes: text(presetLimits.notes, 'for the people who use these rules'),
      rules: { type: 'array', maxItems: siteRulesLimits.rules, items: rule },
    },
    ['format', 'version', 'rules'],
  ),
};
