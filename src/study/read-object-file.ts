import { validate } from '../../build/validate-object.js';
import type { Outcome } from '../calc/problem.js';
import { cleanText } from './clean-text.js';
import type { Finding, JsonPath, PlacedProblem } from './located-file.js';
import { type ObjectFile, type ObjectShape, objectLimits } from './object-file.js';
import { type FileKind, placedRefusal, readSchemaFile, unexplained } from './read-schema-file.js';
import { ellipsesOf, liesWithin, overlap } from './shape-geometry.js';

const objectKind: FileKind = {
  thing: 'object file',
  bytes: objectLimits.bytes,
  nesting: objectLimits.nesting,
  validate,
  schema: 'schema/object.schema.json',
  about: 'An object file holds the plain shapes that a picture is computed of',
};

/**
 * Reads the text of an object file. Every problem names file, line, key, what was given, what was expected and what to do.
 * Never throws for anything a file says.
 */
export function readObjectFile(text: string, fileName: string): Outcome<ObjectFile> {
  const read = readSchemaFile(text, fileName, objectKind);
  if (!read.ok) return read;
  const given = read.value as ObjectFile;
  const problems: PlacedProblem[] = [...read.problems];
  checkObject(given, (path, finding) => problems.push(read.file.problem(path, finding)));
  if (problems.length > 0) return placedRefusal(problems);
  if (!read.valid) return placedRefusal([unexplained(read.file, objectKind.schema)]);
  const plain = JSON.parse(JSON.stringify(given)) as ObjectFile;
  return {
    ok: true,
    value: {
      ...plain,
      title: cleanText(plain.title),
      notes: cleanText(plain.notes),
      regions: plain.regions.map((region) => cleanText(region)),
    },
  };
}

type Say = (path: JsonPath, finding: Finding) => void;

/** What the structure cannot tell: the number of shapes, names, and that each shape replaces one thing wholly and nothing twice. */
function checkObject({ shapes, look }: ObjectFile, say: Say): void {
  const count = shapes.reduce((sum, { repeat }) => sum + (repeat?.count ?? 1), 0);
  if (count > objectLimits.shapes) {
    say(['shapes'], {
      code: 'wrong-length',
      given: `${count} shapes were given, repeated ones counted singly`,
      expected: `at most ${objectLimits.shapes}`,
      hint: 'Take some out: each costs time in every picture.',
    });
    return;
  }
  const [from, to] = [look.profile.fromMm, look.profile.toMm];
  if (from[0] === to[0] && from[1] === to[1]) {
    say(['look', 'profile'], { code: 'values-clash', given: 'a profile of no length', expected: 'two places', hint: 'Move one end.' });
  }
  const places = new Map<string, number>();
  shapes.forEach((shape, i) => {
    if (places.has(shape.id)) {
      say(['shapes', i, 'id'], {
        code: 'duplicate-id',
        given: `the shape "${shape.id}" stands there twice`,
        expected: 'an id for each shape of its own',
        hint: 'Rename one of them.',
      });
    }
    checkInside(shape, i, shapes, places, say);
    places.set(shape.id, i);
  });
  checkApart(shapes, say);
}

/** A shape takes the place of one thing: what it lies in goes on along the whole slice and holds it wholly. */
function checkInside(shape: ObjectShape, i: number, shapes: readonly ObjectShape[], places: ReadonlyMap<string, number>, say: Say): void {
  if (shape.inside === undefined) return;
  const place = places.get(shape.inside);
  const outer = place === undefined ? undefined : shapes[place];
  if (outer === undefined) {
    say(['shapes', i, 'inside'], {
      code: 'unknown-id',
      given: `"${cleanText(shape.inside, 40)}" was given`,
      expected: 'the id of a shape that stands before this one',
      hint: 'Move that shape up, or correct the id.',
    });
    return;
  }
  if (outer.halfAxesMm.length > 2 || outer.lengthMm !== undefined || outer.leanMmPerMm !== undefined || outer.repeat !== undefined) {
    say(['shapes', i, 'inside'], {
      code: 'values-clash',
      given: `"${outer.id}" does not go through the slice as one plain shape`,
      expected: 'an ellipse that does',
      hint: 'Put the inner shape beside it.',
    });
    return;
  }
  const whole = ellipsesOf(outer)[0] as ReturnType<typeof ellipsesOf>[number];
  if (heightsOf(shape).some((mm) => ellipsesOf(shape, mm).some((ellipse) => !liesWithin(ellipse, whole)))) {
    say(['shapes', i], {
      code: 'values-clash',
      given: `the shape "${shape.id}" leaves "${outer.id}"`,
      expected: 'it to lie inside wholly',
      hint: 'Move it, or make it smaller.',
    });
  }
}

/** Where along the slice a shape is looked at, mm: slices are seldom thicker than 8 mm. */
function heightsOf({ leanMmPerMm }: ObjectShape): readonly number[] {
  return leanMmPerMm === undefined ? [0] : [-4, 0, 4];
}

/** Shapes in one place would count twice. */
function checkApart(shapes: readonly ObjectShape[], say: Say): void {
  const leans = shapes.map((shape) => ({ inside: shape.inside, at: [-4, 0, 4].map((mm) => ellipsesOf(shape, mm)) }));
  shapes.forEach((shape, i) => {
    const [first, second] = ellipsesOf(shape);
    if (first !== undefined && second !== undefined && overlap(first, second)) {
      say(['shapes', i, 'repeat'], {
        code: 'values-clash',
        given: `repetitions of "${shape.id}" share a place`,
        expected: 'a step that is longer than the shape is wide',
        hint: 'Lengthen the step.',
      });
    }
    const other = leans.slice(0, i).findIndex(({ inside, at }) => {
      if (inside !== shape.inside) return false;
      return at.some((ellipses, h) => ellipses.some((a) => (leans[i]?.at[h] ?? []).some((b) => overlap(a, b))));
    });
    if (other === -1) return;
    say(['shapes', i], {
      code: 'values-clash',
      given: `the shapes "${shape.id}" and "${shapes[other]?.id ?? ''}" share a place`,
      expected: 'one tissue in each place',
      hint: 'Move one of them, or name the outer one as "inside" of the other.',
    });
  });
}
