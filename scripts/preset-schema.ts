import { classKeys, classRow, families } from '../src/calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../src/calc/parameters.js';
import { tissueNames } from '../src/calc/tissues.js';
import { type InnerRow, innerKeys, mostBValues } from '../src/study/inner-keys.js';
import { idForm, presetLimits } from '../src/study/limits.js';
import { requiredParameters } from '../src/study/required-keys.js';
import { studyStates } from '../src/study/study.js';
import { mustKeepSchema } from './must-keep-schema.js';
import { closed, named, type Schema, text } from './schema-parts.js';

const id: Schema = { type: 'string', pattern: idForm, maxLength: presetLimits.id };

function innerSchema(row: InnerRow): Schema {
  if (row.kind === 'flag') return { type: 'boolean', description: row.help };
  if (row.kind === 'choice') return { enum: row.choices, description: row.help };
  const number: Schema = { type: row.whole ? 'integer' : 'number', minimum: row.min, maximum: row.max };
  const description = row.unit === '' ? row.help : `${row.help}, ${row.unit}`;
  if (row.kind === 'number') return { ...number, description };
  return { type: 'array', items: number, minItems: 1, maxItems: mostBValues, description };
}

function objectSchema(key: 'pacing' | 'diffusion', description: string): Schema {
  const rows = Object.entries(innerKeys[key]);
  return closed(
    Object.fromEntries(rows.map(([name, row]) => [name, innerSchema(row)])),
    rows.filter(([, row]) => row.required).map(([name]) => name),
    { description },
  );
}

/** The schema of one parameter, from its row. */
function parameterSchema(key: ParameterKey): Schema {
  const row = parameterRow(key);
  const words = [row.help, row.kind === 'number' && row.unit !== '' ? row.unit : '', row.dicom === null ? '' : `DICOM ${row.dicom}`];
  const description = words.filter((word) => word !== '').join('; ');
  const fixed = row.otherwise === 'required' || row.otherwise === 'absent' || row.otherwise === 'by-class';
  const otherwise = fixed ? {} : { default: row.otherwise };
  if (row.kind === 'flag') return { type: 'boolean', ...otherwise, description };
  if (row.kind === 'choice') return { enum: row.choices, ...otherwise, description };
  if (row.kind === 'object') return objectSchema(key as 'pacing' | 'diffusion', description);
  const low = row.aboveMin ? { exclusiveMinimum: row.min } : { minimum: row.min };
  return { type: row.whole ? 'integer' : 'number', ...low, maximum: row.max, ...otherwise, description };
}

const steppable = parameterKeys.filter((key) => parameterRow(key).kind !== 'object');

const limit: Schema = { type: 'number' };

const range: Schema = {
  type: ['object', 'array'],
  additionalProperties: false,
  properties: { min: limit, max: limit, step: { type: 'number', exclusiveMinimum: 0 } },
  required: ['min', 'max', 'step'],
  items: { type: ['number', 'string', 'boolean'], maxLength: presetLimits.word },
  minItems: 1,
  maxItems: 1000,
};

const override = closed(
  Object.fromEntries(
    ['t1Ms', 't2Ms', 't2StarMs', 'protonDensity'].map((key) => [
      key,
      { type: 'number', exclusiveMinimum: 0, maximum: key === 'protonDensity' ? 2 : 20000 },
    ]),
  ),
  [],
);

const tissue: Schema = { enum: tissueNames, description: 'name of the tissue table' };
const keyList: Schema = { type: 'array', items: { enum: parameterKeys }, maxItems: parameterKeys.length };
const idList: Schema = { type: 'array', items: { type: 'string' }, maxItems: presetLimits.series };

/** `if` and `then` of JSON Schema. */
function onlyWhere(condition: Schema, consequence: Schema): Schema {
  // biome-ignore lint/suspicious/noThenProperty: a keyword of JSON Schema, and no promise
  return { if: condition, then: consequence }; // oxlint-disable-line no-thenable
}

/** What a class asks beyond the table: the keys it needs, and that it exists. */
function classConditions(): Schema[] {
  const always = parameterKeys.filter((key) => parameterRow(key).otherwise === 'required');
  const acquisitions = families.flatMap((family): Schema[] => {
    const known = classKeys.map(classRow).filter((row) => row.family === family);
    if (known.length === 2) return [];
    return [
      onlyWhere(
        { properties: { family: { const: family } }, required: ['family'] },
        { properties: { acquisition: { enum: known.map((row) => row.acquisition) } } },
      ),
    ];
  });
  const needs = families.flatMap((family): Schema[] => {
    const key = classKeys.find((candidate) => classRow(candidate).family === family);
    const more = key === undefined ? [] : requiredParameters(key).filter((name) => !always.includes(name));
    if (more.length === 0) return [];
    return [
      onlyWhere({ properties: { family: { const: family } }, required: ['family'] }, { properties: { parameters: { required: more } } }),
    ];
  });
  return [...acquisitions, ...needs];
}

const series = closed(
  {
    id,
    title: named(presetLimits.title, 'words on screen'),
    plane: text(presetLimits.word, 'axial, sagittal, coronal oblique, short axis...'),
    purpose: text(presetLimits.word, 'what the series is for; dynamic marks a timed contrast phase'),
    priority: {
      type: 'number',
      minimum: 0,
      maximum: 1000,
      description: 'place in the running order, lower is earlier; left out: the place in the file',
    },
    family: { enum: families },
    acquisition: { enum: ['2D', '3D'] },
    target: tissue,
    comparison: tissue,
    contrastAgent: { type: 'boolean', default: false, description: 'acquired after contrast agent' },
    nullTissue: { ...tissue, description: 'tissue that the inversion time is to null' },
    tissueOverrides: { type: 'object', propertyNames: { enum: tissueNames }, additionalProperties: override },
    parameters: closed(
      Object.fromEntries(parameterKeys.map((key) => [key, parameterSchema(key)])),
      parameterKeys.filter((key) => parameterRow(key).otherwise === 'required'),
    ),
    ranges: { type: 'object', propertyNames: { enum: steppable }, additionalProperties: range },
    mustKeep: { type: 'array', items: mustKeepSchema, maxItems: presetLimits.mustKeeps },
    pairedWith: { ...idList, description: 'series that change together with this one' },
    locked: { ...keyList, description: 'parameters that a search may not touch' },
    opened: { ...keyList, description: 'parameters that a search may touch beyond the defaults of the class' },
  },
  ['id', 'title', 'family', 'acquisition', 'target', 'comparison', 'parameters'],
  { allOf: classConditions() },
);

const released = closed(
  {
    role: named(presetLimits.title, 'role of whoever released this revision; no name'),
    secondRole: named(presetLimits.title, 'a second role that agreed'),
    day: { type: 'string', pattern: '^[0-9]{4}-[0-9]{2}-[0-9]{2}$', description: 'YYYY-MM-DD' },
    reason: named(presetLimits.source, 'why it was released'),
  },
  ['role', 'day', 'reason'],
  { description: 'who released this revision, when and why; written by the program' },
);

/** The JSON Schema (draft 7) of a preset file, from the tables of parameters, figures, classes and tissues. */
export const presetSchema: Schema = {
  $schema: 'http://json-schema.org/draft-07/schema#',
  title: 'Holdfast preset',
  description: 'One study: its series, their parameters and what must be kept.',
  ...closed(
    {
      $schema: { type: 'string', maxLength: presetLimits.source },
      format: { const: 'holdfast preset' },
      version: { const: 1 },
      id,
      title: named(presetLimits.title, 'words on screen'),
      region: named(presetLimits.word, 'body region'),
      fieldT: { type: 'number', minimum: presetLimits.fieldT.min, maximum: presetLimits.fieldT.max, description: 'field strength, T' },
      status: { enum: studyStates, default: 'draft' },
      revision: { type: 'integer', minimum: 1, maximum: 1_000_000, default: 1 },
      released,
      notes: text(presetLimits.notes, 'for the people who use this preset'),
      minimumSet: {
        type: 'array',
        maxItems: presetLimits.series,
        items: { type: ['string', 'array'], items: { type: 'string' }, minItems: 1, maxItems: presetLimits.series },
        description: 'ids that must be acquired; of a list any one serves',
      },
      series: { type: 'array', minItems: 1, maxItems: presetLimits.series, items: series },
    },
    ['format', 'version', 'id', 'title', 'region', 'fieldT', 'series'],
  ),
};
