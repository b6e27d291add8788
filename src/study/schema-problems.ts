import type { SchemaError } from '../../build/validate-preset.js';
import { parameterKeys } from '../calc/parameters.js';
import { cleanText, shownValue } from './clean-text.js';
import type { Finding, JsonPath, LocatedFile, PlacedProblem } from './located-file.js';
import { nearestWord } from './nearest-word.js';
import { suggestParameter } from './suggest-key.js';

/** Steps of a JSON pointer (RFC 6901); digits become indices. */
function pointerPath(pointer: string): (string | number)[] {
  return pointer
    .split('/')
    .slice(1)
    .map((step) => (/^\d+$/.test(step) ? Number(step) : step.replace(/~1/g, '/').replace(/~0/g, '~')));
}

const listed = (items: readonly unknown[]) => (items.length > 12 ? `one of the ${items.length} known names` : items.map(String).join(', '));

/** What a schema of a single value asks for, in words. */
function expectedValue(schema: Record<string, unknown>): string {
  if (Array.isArray(schema.enum))
    return schema.enum.length > 1 && schema.enum.length <= 12 ? `one of ${listed(schema.enum)}` : listed(schema.enum);
  if (schema.const !== undefined) return shownValue(schema.const);
  const types = [schema.type].flat();
  if (types.includes('number') && types.length > 1) return 'numbers, words, true or false';
  const number = types.includes('integer') ? 'a whole number' : types.includes('number') ? 'a number' : null;
  if (number !== null) {
    const above = schema.exclusiveMinimum as number | undefined;
    const low = above ?? (schema.minimum as number | undefined);
    const high = schema.maximum as number | undefined;
    if (low === undefined) return number;
    if (high === undefined) return `${number} of ${above === undefined ? 'at least' : 'more than'} ${low}`;
    return `${number} from ${above === undefined ? '' : 'more than '}${low} to ${high}`;
  }
  const words: Readonly<Record<string, string>> = { string: 'a text', boolean: 'true or false', array: 'a list', object: 'an object' };
  return types.map((type) => words[String(type)] ?? String(type)).join(' or ');
}

/** What a kind of file says of its schema and of keys it does not know. */
interface Words {
  readonly schema: string;
  readonly hintFor?: (key: string) => string | null;
}

function unknownKey(key: string, known: readonly string[], { schema, hintFor }: Words): Finding {
  const near = known.includes('matrixRead') ? suggestParameter(key) : nearestWord(key, known);
  const elsewhere = near === null && parameterKeys.some((name) => name === key);
  return {
    code: 'unknown-key',
    given: `the key "${cleanText(key, 40)}" is not known here`,
    expected: near === null ? `one of ${known.length > 12 ? 'the keys that the schema lists' : known.join(', ')}` : `"${near}"`,
    hint:
      near !== null
        ? `Did you mean "${near}"?`
        : elsewhere
          ? 'It belongs inside "parameters".'
          : (hintFor?.(key) ?? `Take the key out, or look it up in ${schema}.`),
  };
}

function wrongWord(value: unknown, known: readonly unknown[], expected: string): Finding {
  const near = typeof value === 'string' ? nearestWord(value, known.map(String)) : null;
  return {
    code: 'unknown-word',
    given: `${shownValue(value)} was given`,
    expected,
    hint: near === null ? 'Use one of the known names, spelt as in the schema.' : `Did you mean "${near}"?`,
  };
}

function noSuchClass(error: SchemaError): Finding {
  const given = `${shownValue(error.data)} was given`;
  return {
    code: 'unknown-class',
    given,
    expected: `${String((error.schema as unknown[])[0])} in this family`,
    hint: 'Change the acquisition, or the family.',
  };
}

function outOfBounds(error: SchemaError): Finding {
  const expected = expectedValue(error.parentSchema);
  return { code: 'out-of-range', given: `${shownValue(error.data)} was given`, expected, hint: 'Write a number within the range.' };
}

function lengthFinding(error: SchemaError): Finding {
  const limit = error.params.limit as number;
  const of = Array.isArray(error.data) ? 'items' : 'characters';
  const count = Array.isArray(error.data) ? error.data.length : [...String(error.data)].length;
  const most = error.keyword.startsWith('max');
  return {
    code: 'wrong-length',
    given: `${count} ${of} were given`,
    expected: `${most ? 'at most' : 'at least'} ${limit}`,
    hint: most ? 'Make it shorter.' : 'Fill it in.',
  };
}

/** One finding for one complaint of the compiled schema; null for the umbrella complaints that others explain better. */
function findingOf(error: SchemaError, words: Words): Finding | null {
  switch (error.keyword) {
    case 'additionalProperties':
      return unknownKey(String(error.params.additionalProperty), Object.keys((error.parentSchema.properties ?? {}) as object), words);
    case 'required':
      return {
        code: 'missing-key',
        given: `the key "${String(error.params.missingProperty)}" is missing`,
        expected: 'it to be there',
        hint: `Add "${String(error.params.missingProperty)}".`,
      };
    case 'enum':
      if (error.instancePath.endsWith('/acquisition') && (error.schema as unknown[]).length === 1) return noSuchClass(error);
      return error.propertyName === undefined
        ? wrongWord(error.data, error.schema as unknown[], expectedValue(error.parentSchema))
        : unknownKey(error.propertyName, error.schema as string[], words);
    case 'const':
      return {
        code: 'unknown-word',
        given: `${shownValue(error.data)} was given`,
        expected: shownValue(error.schema),
        hint: 'Change it to that.',
      };
    case 'type':
      return {
        code: 'wrong-type',
        given: `${shownValue(error.data)} was given`,
        expected: expectedValue(error.parentSchema),
        hint: 'Change the value to that kind.',
      };
    case 'minimum':
    case 'maximum':
    case 'exclusiveMinimum':
      return outOfBounds(error);
    case 'pattern':
      return {
        code: 'wrong-form',
        given: `${shownValue(error.data)} was given`,
        expected: 'lower-case letters, digits, "." and "-", a letter or digit first',
        hint: 'Rename it.',
      };
    case 'minLength':
    case 'maxLength':
    case 'minItems':
    case 'maxItems':
      return lengthFinding(error);
    default:
      return null;
  }
}

/** Path of what a complaint is about: inside the value for keys that are unknown. */
function placeOf(error: SchemaError): { path: JsonPath; at: 'key' | 'value' } {
  const path = pointerPath(error.instancePath);
  if (error.keyword === 'additionalProperties') return { path: [...path, String(error.params.additionalProperty)], at: 'key' };
  if (error.keyword === 'enum' && error.propertyName !== undefined) return { path: [...path, error.propertyName], at: 'key' };
  return { path: error.keyword === 'required' ? [...path, String(error.params.missingProperty)] : path, at: 'value' };
}

/** What the compiled schema found, as problems with file, line and key. Alternatives (`oneOf`) are left to the checks that can name them. */
export function schemaProblems(errors: readonly SchemaError[], file: LocatedFile, words: Words): PlacedProblem[] {
  const problems: PlacedProblem[] = [];
  for (const error of errors) {
    if (error.schemaPath.includes('/oneOf/')) continue;
    const finding = findingOf(error, words);
    if (finding === null) continue;
    const { path, at } = placeOf(error);
    problems.push(file.problem(path, finding, at));
  }
  return problems;
}
