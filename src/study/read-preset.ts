import { validate } from '../../build/validate-preset.js';
import type { Outcome } from '../calc/problem.js';
import type { ParseExpression } from '../formulas/parsed-node.js';
import { presetLimits } from './limits.js';
import { presetProblems } from './preset-checks.js';
import type { PresetFile } from './preset-file.js';
import { type FileKind, placedRefusal, readSchemaFile, unexplained } from './read-schema-file.js';
import type { Study } from './study.js';
import { studyOfFile } from './study-of-file.js';

const presetKind: FileKind = {
  thing: 'preset',
  bytes: presetLimits.bytes,
  nesting: presetLimits.nesting,
  validate,
  schema: 'schema/preset.schema.json',
  about: 'A preset is one study',
};

/**
 * Reads the text of a preset file: size, text, strict JSON, duplicate keys, structure against the compiled schema, then what
 * structure cannot tell. Every problem names file, line, key, what was given, what was expected and what to do. Never throws for
 * anything a file says. Rules are checked where a parser is handed in (`loadParser` in formulas); without one they are taken as
 * they are, and count as not checked until they are read.
 *
 * @example readPreset('{', 'liver.json').ok //=> false
 */
export function readPreset(text: string, fileName: string, parse?: ParseExpression): Outcome<Study> {
  const read = readSchemaFile(text, fileName, presetKind);
  if (!read.ok) return read;
  const preset = read.value as PresetFile;
  const deeper = presetProblems(preset, read.file, parse);
  if (read.problems.length + deeper.length > 0) return placedRefusal([...read.problems, ...deeper]);
  if (!read.valid) return placedRefusal([unexplained(read.file, presetKind.schema)]);
  return { ok: true, value: studyOfFile(preset) };
}
