import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { objectSchema } from '../../scripts/object-schema.js';
import { schemaText } from '../../scripts/schema-text.js';
import { readObjectFile } from '../../src/study/read-object-file.js';
import { readPreset } from '../../src/study/read-preset.js';

const shipped = readdirSync('objects').map((name) => ({ name, text: readFileSync(`objects/${name}`, 'utf8') }));
const knee = JSON.parse(readFileSync('objects/knee.json', 'utf8')) as { shapes: Record<string, unknown>[] };

/** Problems of the knee's object after a change, as messages. */
function wrong(change: (file: typeof knee) => void): string[] {
  const file = structuredClone(knee);
  change(file);
  const read = readObjectFile(JSON.stringify(file, null, 2), 'mine.json');
  return read.ok ? [] : read.problems.map(({ message }) => message);
}

describe('schema/object.schema.json', () => {
  it('is what the tables give today (else run: npm run schema)', () => {
    expect(readFileSync('schema/object.schema.json', 'utf8')).toBe(schemaText(objectSchema));
  });
});

describe('shipped objects', () => {
  it.each(shipped)('$name is right, named by its id, and says that it is invented', ({ name, text }) => {
    const read = readObjectFile(text, name);
    if (!read.ok) throw new Error(JSON.stringify(read.problems));
    expect(`${read.value.id}.json`).toBe(name);
    expect(read.value.notes).toMatch(/^Invented/);
  });

  it('there is one for every region of the shipped presets, and one for any other', () => {
    const objects = shipped.map(({ name, text }) => readObjectFile(text, name)).flatMap((read) => (read.ok ? [read.value] : []));
    const regions = objects.flatMap((object) => object.regions);
    expect(new Set(regions).size).toBe(regions.length);
    const asked = readdirSync('presets').map((name) => {
      const read = readPreset(readFileSync(`presets/${name}`, 'utf8'), name);
      if (!read.ok) throw new Error(name);
      return read.value.region;
    });
    expect(asked.filter((region) => !regions.includes(region))).toEqual([]);
    expect(objects.filter((object) => object.regions.length === 0)).toHaveLength(1);
  });

  it('each holds discs of 2, 3, 5 and 8 mm and lines of 0.4 to 2 mm of the comparison in the target, an oblique edge, fluid and a vessel', () => {
    for (const { text } of shipped) {
      const shapes = (JSON.parse(text) as typeof knee).shapes as { id: string; tissue: string; inside?: string }[];
      const ids = shapes.map(({ id }) => id);
      for (const id of ['disc-2', 'disc-3', 'disc-5', 'disc-8', 'standing-0.4', 'standing-2', 'lying-0.4', 'lying-2', 'oblique-edge']) {
        expect(shapes.find((shape) => shape.id === id)).toMatchObject({ tissue: 'comparison', inside: 'target' });
      }
      expect(ids).toEqual(expect.arrayContaining(['fluid', 'vessel', 'target', 'comparison']));
    }
  });
});

describe('readObjectFile', () => {
  it('refuses a negative axis, by line and key', () => {
    expect(wrong(({ shapes }) => Object.assign(shapes[2] as object, { halfAxesMm: [4, -4, 4] }))).toEqual([
      expect.stringMatching(/^mine\.json, line \d+, shapes\.3\.halfAxesMm\.2: -4 was given; expected a number from more than 0 to 1000\.$/),
    ]);
  });

  it('refuses an unknown tissue and names the nearest', () => {
    const file = structuredClone(knee);
    Object.assign(file.shapes[0] as object, { tissue: 'artcular cartilage' });
    const read = readObjectFile(JSON.stringify(file, null, 2), 'mine.json');
    if (read.ok) throw new Error('it was taken');
    expect(read.problems[0]?.message).toMatch(/line \d+, shapes\.1\.tissue: "artcular cartilage" was given/);
    expect(read.problems[0]?.hint).toBe('Did you mean "articular cartilage"?');
  });

  it('refuses 10,000 ellipses, listed or repeated', () => {
    const many = (count: number) =>
      Array.from({ length: count }, (_, i) => ({ id: `e${i}`, tissue: 'CSF', atMm: [0, i / 20], halfAxesMm: [0.01, 0.01] }));
    expect(wrong((file) => Object.assign(file, { shapes: many(1000) }))).toEqual([
      expect.stringMatching(/shapes: 1000 items were given; expected at most 300/),
    ]);
    // As text it is larger than an object file may be.
    expect(wrong((file) => Object.assign(file, { shapes: many(10_000) }))[0]).toMatch(/more than 0\.2 MB were given/);
    const repeated = many(250).map((shape) => ({ ...shape, repeat: { count: 40, stepMm: [1, 0] } }));
    expect(wrong((file) => Object.assign(file, { shapes: repeated }))).toEqual([
      expect.stringMatching(/10000 shapes were given, repeated ones counted singly; expected at most 300/),
    ]);
  });

  it('refuses what would count twice or lie in two things', () => {
    expect(wrong(({ shapes }) => Object.assign(shapes[1] as object, { atMm: [10, 0] }))[0]).toContain(
      'the shapes "comparison" and "target" share a place',
    );
    expect(wrong(({ shapes }) => Object.assign(shapes[2] as object, { atMm: [-43, -22] }))[0]).toContain(
      'the shape "disc-8" leaves "target"',
    );
    expect(wrong(({ shapes }) => Object.assign(shapes[6] as object, { repeat: { count: 3, stepMm: [1, 0] } }))[0]).toContain(
      'repetitions of "standing-2" share',
    );
    expect(wrong(({ shapes }) => Object.assign(shapes[2] as object, { inside: 'nothing' }))[0]).toContain(
      'expected the id of a shape that stands before',
    );
    expect(wrong(({ shapes }) => Object.assign(shapes[3] as object, { inside: 'disc-8' }))[0]).toContain('does not go through the slice');
    expect(wrong(({ shapes }) => Object.assign(shapes[1] as object, { id: 'target' }))[0]).toContain('stands there twice');
  });

  it('never throws, whatever stands there', () => {
    for (const text of [
      '',
      '{',
      '[]',
      'null',
      '{"format":"holdfast object"}',
      JSON.stringify({ ...knee, shapes: [{}] }),
      JSON.stringify({ ...knee, look: {} }),
    ]) {
      expect(readObjectFile(text, 'x.json').ok).toBe(false);
    }
  });
});
