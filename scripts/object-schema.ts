import { tissueNames } from '../src/calc/tissues.js';
import { idForm, presetLimits } from '../src/study/limits.js';
import { objectLimits, tissueRoles } from '../src/study/object-file.js';
import { closed, named, type Schema } from './schema-parts.js';

const { placeMm, halfAxisMm, shapes, repeats, word } = objectLimits;
const id: Schema = {
  type: 'string',
  minLength: 1,
  maxLength: presetLimits.id,
  pattern: idForm,
  description: 'small letters, digits, dots and dashes',
};
const tissue: Schema = { enum: [...tissueRoles, ...tissueNames], description: "a tissue of the table, or a role in the series' own pair" };
const point = (description: string): Schema => ({
  type: 'array',
  minItems: 2,
  maxItems: 2,
  items: { type: 'number', minimum: -placeMm, maximum: placeMm },
  description,
});
const length = (most: number, description: string): Schema => ({ type: 'number', exclusiveMinimum: 0, maximum: most, description });

const shape = closed(
  {
    id,
    tissue,
    inside: {
      ...id,
      description: 'id of an earlier shape, through everything along the slice, whose place it takes; left out: of the body',
    },
    atMm: point('middle: to the right and downwards from the middle of the field'),
    halfAxesMm: {
      type: 'array',
      minItems: 2,
      maxItems: 3,
      items: length(halfAxisMm, 'mm'),
      description: 'half axes in the plane; a third one along the slice makes an ellipsoid',
    },
    turnDeg: { type: 'number', minimum: -180, maximum: 180, description: 'clockwise in the picture' },
    lengthMm: length(halfAxisMm, 'length along the slice, centred in it; left out: through everything'),
    leanMmPerMm: {
      type: 'array',
      minItems: 2,
      maxItems: 2,
      items: { type: 'number', minimum: -4, maximum: 4 },
      description: 'how far it moves in the plane with each mm along the slice',
    },
    repeat: closed(
      { count: { type: 'integer', minimum: 2, maximum: repeats }, stepMm: point('from one to the next') },
      ['count', 'stepMm'],
      { description: 'the same shape again and again' },
    ),
  },
  ['id', 'tissue', 'atMm', 'halfAxesMm'],
);

const circle = (description: string): Schema =>
  closed({ atMm: point('middle'), radiusMm: length(halfAxisMm, 'radius') }, ['atMm', 'radiusMm'], { description });
const extent = (description: string): Schema => ({ type: 'number', minimum: 20, maximum: 2000, description });

/** The JSON Schema (draft 7) of an object file. */
export const objectSchema: Schema = {
  $schema: 'http://json-schema.org/draft-07/schema#',
  title: 'Holdfast object',
  description: 'An invented object of one body region, made of plain shapes for judging pictures by eye. No anatomy, and of no patient.',
  ...closed(
    {
      $schema: { type: 'string', maxLength: presetLimits.source },
      format: { const: 'holdfast object' },
      version: { const: 1 },
      id,
      title: named(presetLimits.title, 'what it is, in a few words'),
      notes: named(presetLimits.notes, 'that it is invented, and what it is for'),
      regions: {
        type: 'array',
        maxItems: 20,
        items: named(word, 'body region of presets'),
        description: 'none: any region without an object of its own',
      },
      body: closed(
        {
          frontBackMm: extent('front to back, where none is typed'),
          leftRightMm: extent('right to left, where none is typed'),
          headFeetMm: extent('head to feet, as far as the coil sees'),
          fatRimMm: { type: 'number', minimum: 0, maximum: 200, description: 'thickness of the fat around' },
          tissue,
        },
        ['frontBackMm', 'leftRightMm', 'headFeetMm', 'fatRimMm', 'tissue'],
      ),
      shapes: { type: 'array', maxItems: shapes, items: shape },
      look: closed(
        {
          target: circle('place in plain target'),
          comparison: circle('place in plain comparison'),
          zoom: closed({ atMm: point('middle'), sideMm: length(placeMm, 'side') }, ['atMm', 'sideMm'], {
            description: 'square shown larger',
          }),
          profile: closed({ fromMm: point('beginning'), toMm: point('end') }, ['fromMm', 'toMm'], { description: 'line of the profile' }),
        },
        ['target', 'comparison', 'zoom', 'profile'],
      ),
    },
    ['format', 'version', 'id', 'title', 'notes', 'regions', 'body', 'shapes', 'look'],
  ),
};
