import { type SchemaError, validate } from '../../build/validate-preset.js';
import type { Outcome, Problem } from '../calc/problem.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { cleanText } from './clean-text.js';
import { presetLimits } from './limits.js';
import { type LocatedFile, lineOf, locateIn, type PlacedProblem } from './located-file.js';
import { presetProblems } from './preset-checks.js';
import type { PresetFile } from './preset-file.js';
import { type JsonNode, jsonValue, readJson } from './read-json.js';
import { schemaProblems } from './schema-problems.js';
import type { Study } from './study.js';
import { studyOfFile } from './study-of-file.js';

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
function refusal(text: string, fileName: string): Problem | null {
  const name = cleanText(fileName, 200);
  if (text.length > presetLimits.bytes || countBytes(text, presetLimits.bytes) > presetLimits.bytes) {
    const message = `${name}: more than ${presetLimits.bytes / 1e6} MB were given; expected a preset of at most ${presetLimits.bytes / 1e6} MB.`;
    return { code: 'too-large', path: '', message, hint: 'A preset is one study: check that this is the right file.' };
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

function refused(problems: readonly PlacedProblem[]): { ok: false; problems: Problem[] } {
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
 * Reads the text of a preset file: size, text, strict JSON, duplicate keys, structure against the compiled schema, then what
 * structure cannot tell. Every problem names file, line, key, what was given, what was expected and what to do. Never throws for
 * anything a file says. Rules are checked where a parser is handed in (`loadParser` in formulas); without one they are taken as
 * they are, and count as not checked until they are read.
 *
 * @example readPreset('{', 'liver.json').ok //=> false
 */
export function readPreset(text: string, fileName: string, parse?: ParseExpression): Outcome<Study> {
  const refusedWhole = refusal(text, fileName);
  if (refusedWhole !== null) return { ok: false, problems: [refusedWhole] };

  const json = readJson(text, presetLimits.nesting);
  if (!json.ok) {
    const { code, offset, given, expected } = json.fault;
    const hint =
      code === 'not-finite'
        ? 'Write a plain number.'
        : code === 'too-deep'
          ? 'A preset has few levels: check that this is the right file.'
          : 'Mend the JSON at this line; it allows no comments and no trailing commas.';
    return refused([
      locateIn(fileName, text, null).problemAt(offset, '', { code, given: `${cleanText(given, 60)} was found`, expected, hint }),
    ]);
  }
  const file = locateIn(fileName, text, json.root);
  const value = jsonValue(json.root);
  const twice = duplicateKeys(json.root, file, text);
  const valid = validate(value);
  const errors: readonly SchemaError[] = validate.errors ?? [];
  const structural = valid ? [] : schemaProblems(errors, file);
  if (structural.length > 0) return refused([...twice, ...structural]);

  const preset = value as PresetFile;
  const deeper = presetProblems(preset, file, parse);
  if (twice.length + deeper.length > 0) return refused([...twice, ...deeper]);
  if (!valid)
    return refused([
      file.problem([], {
        code: 'wrong-form',
        given: 'the file does not follow the schema',
        expected: 'schema/preset.schema.json to hold',
        hint: 'Compare the two.',
      }),
    ]);
  return { ok: true, value: studyOfFile(preset) };
}
