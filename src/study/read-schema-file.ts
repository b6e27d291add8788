import type { SchemaError } from '../../build/validate-preset.js';
import type { Problem } from '../calc/problem.js';
import { cleanText } from './clean-text.js';
import { type LocatedFile, lineOf, locateIn, type PlacedProblem } from './located-file.js';
import { type JsonNode, jsonValue, readJson } from './read-json.js';
import { schemaProblems } from './schema-problems.js';

/** What kind of file is read: its bounds, its schema and the words for what is wrong. */
export interface FileKind {
  /** What the file is to a person: `preset`. */
  readonly thing: string;
  /** Most UTF-8 bytes. */
  readonly bytes: number;
  /** Most objects and lists inside each other. */
  readonly nesting: number;
  /** The compiled schema. */
  readonly validate: { (data: unknown): boolean; errors?: SchemaError[] | null };
  /** The published schema, as a person finds it. */
  readonly schema: string;
  /** One sentence on what such a file holds. */
  readonly about: string;
  /** What to do about a key that is not known, where more can be said than to look it up. */
  readonly hintFor?: (key: string) => string | null;
}

/**
 * A file whose structure is right as far as single complaints tell (its `problems` are keys that stand twice; `valid` is false where
 * only alternatives of the schema failed, which the checks of its kind can name), or everything wrong with it.
 */
export type SchemaFileReading =
  | {
      readonly ok: true;
      readonly value: unknown;
      readonly file: LocatedFile;
      readonly problems: readonly PlacedProblem[];
      readonly valid: boolean;
    }
  | { readonly ok: false; readonly problems: readonly Problem[] };

/** A file with a thousand mistakes is shown its first ones. */
const mostProblems = 20;

/** UTF-8 bytes of a text, counted no further than `enough`. */
function countBytes(text: string, enough: number): number {
  let bytes = 0;
  for (let i = 0; i < text.length && bytes <= enough; i += 1) {
    const unit = text.charCodeAt(i);
    // Each half of a surrogate pair counts two of the pair's four bytes.
    bytes += unit < 0x80 ? 1 : unit < 0x800 || (unit >= 0xd800 && unit <= 0xdfff) ? 2 : 3;
  }
  return bytes;
}

/** Anything but text, or too much of it: refused before it is read. */
function refusal(text: string, fileName: string, { thing, bytes, about }: FileKind): Problem | null {
  const name = cleanText(fileName, 200);
  if (text.length > bytes || countBytes(text, bytes) > bytes) {
    const message = `${name}: more than ${bytes / 1e6} MB were given; expected a ${thing} of at most ${bytes / 1e6} MB.`;
    return { code: 'too-large', path: '', message, hint: `${about}: check that this is the right file.` };
  }
  // Controls that neither JSON nor a text editor uses, and what a decoder puts where bytes are no UTF-8.
  const binary = text.search(/[^\P{Cc}\t\n\v\f\r\u007f-\u009f]|\uFFFD/u);
  if (binary === -1) return null;
  const message = `${name}, line ${lineOf(text, binary)}: bytes that are no text were given; expected a JSON file in UTF-8.`;
  return { code: 'not-text', path: '', message, hint: 'Check that this is the right file.' };
}

/** Keys that stand twice in one object, wherever they are. */
function duplicateKeys(node: JsonNode, file: LocatedFile, text: string, path: readonly (string | number)[] = []): PlacedProblem[] {
  if (node.kind === 'plain') return [];
  if (node.kind === 'array') return node.items.flatMap((item, i) => duplicateKeys(item, file, text, [...path, i]));
  const first = new Map<string, number>();
  return node.entries.flatMap((entry) => {
    const inner = duplicateKeys(entry.value, file, text, [...path, entry.key]);
    const before = first.get(entry.key);
    if (before === undefined) {
      first.set(entry.key, entry.keyOffset);
      return inner;
    }
    const placed = file.problem(
      [...path, entry.key],
      {
        code: 'duplicate-key',
        given: `the key "${cleanText(entry.key, 40)}" stands there twice, first on line ${lineOf(text, before)}`,
        expected: 'each key once',
        hint: 'Take one of them out.',
      },
      'key',
    );
    return [placed, ...inner];
  });
}

/** Problems in the order of the file, each once, the first ones of many. */
export function placedRefusal(problems: readonly PlacedProblem[]): { ok: false; problems: Problem[] } {
  const seen = new Set<string>();
  const sorted = [...problems]
    .sort((a, b) => a.offset - b.offset)
    .filter(({ message }) => !seen.has(message) && seen.add(message))
    .map(({ code, path, message, hint }) => ({ code, path, message, hint }));
  if (sorted.length <= mostProblems) return { ok: false, problems: sorted };
  const more = `and ${sorted.length - mostProblems} more problems.`;
  return {
    ok: false,
    problems: [...sorted.slice(0, mostProblems), { code: 'more-problems', path: '', message: more, hint: 'Mend these first.' }],
  };
}

/**
 * Reads the text of a file: size, text, strict JSON, duplicate keys, structure against the compiled schema.
 * Every problem names file, line, key, what was given, what was expected and what to do. Never throws for anything a file says.
 */
export function readSchemaFile(text: string, fileName: string, kind: FileKind): SchemaFileReading {
  const refusedWhole = refusal(text, fileName, kind);
  if (refusedWhole !== null) return { ok: false, problems: [refusedWhole] };
  const json = readJson(text, kind.nesting);
  if (!json.ok) {
    const { code, offset, given, expected } = json.fault;
    const hint =
      code === 'not-finite'
        ? 'Write a plain number.'
        : code === 'too-deep'
          ? `A ${kind.thing} has few levels: check that this is the right file.`
          : 'Mend the JSON at this line; it allows no comments and no trailing commas.';
    return placedRefusal([
      locateIn(fileName, text, null).problemAt(offset, '', { code, given: `${cleanText(given, 60)} was found`, expected, hint }),
    ]);
  }
  const file = locateIn(fileName, text, json.root);
  const value = jsonValue(json.root);
  const twice = duplicateKeys(json.root, file, text);
  const valid = kind.validate(value);
  const structural = valid ? [] : schemaProblems(kind.validate.errors ?? [], file, kind);
  if (structural.length > 0) return placedRefusal([...twice, ...structural]);
  return { ok: true, value, file, problems: twice, valid };
}

/** What is left to say where the schema does not hold and no check could say why. */
export function unexplained(file: LocatedFile, schema: string): PlacedProblem {
  const given = 'the file does not follow the schema';
  return file.problem([], { code: 'wrong-form', given, expected: `${schema} to hold`, hint: 'Compare the two.' });
}
