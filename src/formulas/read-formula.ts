import type { Problem } from '../calc/problem.js';
import { toFormula } from './convert-node.js';
import { deepestFormula, type Formula } from './formula.js';
import type { ParsedNode, ParseExpression } from './parsed-node.js';
import { NotAllowed } from './refusal.js';

/** A problem of a formula, with its parts for messages that add file and line. */
export interface FormulaProblem extends Problem {
  readonly given: string;
  readonly expected: string;
  /** The part that is refused, as text; empty where it is the whole. */
  readonly part: string;
}

export type FormulaReading =
  | { readonly ok: true; readonly value: Formula }
  | { readonly ok: false; readonly problems: readonly FormulaProblem[] };

/** Characters of a formula: 10 kB and more is refused before it is parsed. */
const longestFormula = 9999;
const allowedCharacter = /[A-Za-z0-9_.,()<>=!+\-*/^ \t]/;
const shown = (text: string) => (text.length > 60 ? `${text.slice(0, 57)}...` : text).replace(/[^\x20-\x7e]/g, '?');

function refused(code: string, given: string, expected: string, hint: string, part = ''): FormulaReading {
  return { ok: false, problems: [{ code, path: '', message: `${given}; expected ${expected}.`, hint, given, expected, part }] };
}

/** What can be refused without parsing: length, foreign characters, parentheses too deep for a recursive parser. */
function refusalBeforeParsing(text: string): FormulaReading | null {
  if (text.length > longestFormula)
    return refused(
      'formula-length',
      `a formula of ${text.length} characters was given`,
      `at most ${longestFormula}`,
      'Split it into several rules.',
    );
  if (text.trim() === '')
    return refused('formula-empty', 'an empty formula was given', 'a comparison', 'Write for example voxelSliceMm <= 5.');
  let depth = 0;
  for (let i = 0; i < text.length; i += 1) {
    const character = text[i] as string;
    if (!allowedCharacter.test(character)) {
      const what = /[[\]{}"'`;:?%&|~#@\\=]/.test(character) ? character : shown(character);
      return refused(
        'formula-character',
        `"${what}" at character ${i + 1} of the formula is not allowed`,
        'letters, digits, blanks and < > = ! + - * / ^ ( ) . ,',
        'Take it out.',
      );
    }
    depth += character === '(' ? 1 : character === ')' ? -1 : 0;
    if (depth > deepestFormula)
      return refused(
        'formula-depth',
        `the formula is nested more than ${deepestFormula} deep`,
        `at most ${deepestFormula} levels`,
        'Split it into several rules.',
      );
  }
  return null;
}

/**
 * Reads a rule such as `voxelVolumeMm3 <= 4 and chemicalShiftPx < 1` into our own tree. The text is parsed by the parser handed in,
 * then every node must be on the allow-list: names of parameters and figures, numbers, the six comparisons (chains too), and, or, not,
 * `+ - * / ^`, unary minus, parentheses, min, max, abs, sqrt. Anything else is refused with the part that is not allowed. Never throws.
 *
 * @example readFormula('x.constructor', parse).ok //=> false
 */
export function readFormula(text: string, parse: ParseExpression): FormulaReading {
  const early = refusalBeforeParsing(text);
  if (early !== null) return early;
  let node: ParsedNode;
  try {
    node = parse(text);
  } catch (error) {
    if (error instanceof RangeError)
      return refused('formula-depth', 'the formula is nested too deep', `at most ${deepestFormula} levels`, 'Split it into several rules.');
    const place = (error as { char?: unknown }).char;
    const where = typeof place === 'number' ? ` at character ${place}` : '';
    return refused(
      'formula-syntax',
      `the formula cannot be read${where}: "${shown(text)}"`,
      'a comparison such as voxelSliceMm <= 5',
      'Check operators and parentheses.',
    );
  }
  try {
    return { ok: true, value: toFormula(node, 1) };
  } catch (error) {
    if (error instanceof RangeError)
      return refused('formula-depth', 'the formula is nested too deep', `at most ${deepestFormula} levels`, 'Split it into several rules.');
    if (!(error instanceof NotAllowed)) throw error;
    const { code, part, because, expected, hint } = error.refusal;
    const at = part === '' ? -1 : text.indexOf(part);
    const place = at === -1 ? '' : ` at character ${at + 1}`;
    return refused(code, part === '' ? because : `${because} in "${shown(part)}"${place}`, expected, hint, part);
  }
}
