import type { ParsedNode, ParseExpression } from './parsed-node.js';

/** Number of an expression, in the unit of the parameter; or why there is none. */
export type ExpressionReading =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly given: string; readonly expected: string };

/** The parameter an expression is typed for: its own name stands for its present value. */
export interface ExpressionSubject {
  readonly name: string;
  /** Unit that it is kept in; blank for a plain number. */
  readonly unit: string;
  readonly value: number | null;
}

/** What is measured, counted in powers: 380 mm / 1.9 mm is a plain number again. */
interface Amount {
  readonly number: number;
  readonly of: Readonly<Partial<Record<Dimension, number>>>;
  /** A share: `10%` of what stands before it. */
  readonly percent?: true;
}

type Dimension = 'length' | 'time' | 'angle' | 'frequency' | 'share';

/** Units in the one that is counted with: mm, ms, deg, Hz, percent. */
const units: Readonly<Record<string, readonly [Dimension, number]>> = {
  mm: ['length', 1],
  cm: ['length', 10],
  m: ['length', 1000],
  um: ['length', 0.001],
  ms: ['time', 1],
  s: ['time', 1000],
  us: ['time', 0.001],
  min: ['time', 60_000],
  deg: ['angle', 1],
  rad: ['angle', 180 / Math.PI],
  Hz: ['frequency', 1],
  kHz: ['frequency', 1000],
  percent: ['share', 1],
};

/** What the units of the parameters measure, and how many of the counted unit one is. */
const keptUnits: Readonly<Record<string, readonly [Dimension, number]>> = {
  mm: ['length', 1],
  ms: ['time', 1],
  s: ['time', 1000],
  deg: ['angle', 1],
  'Hz/px': ['frequency', 1],
  '%': ['share', 1],
};

const longest = 160;
const deepest = 30;
const allowed = 'numbers, + - * / ^, parentheses, percent, known units and the name of the parameter';

class NotAllowed extends Error {}

/**
 * Reads an arithmetic entry such as `38 cm`, `1.2 mm * 256`, `+10%` or `/2`. The parser that is handed in makes a tree; every node must
 * be on the allow-list, and our own code works it out: nothing else of the parser's library is reachable. An entry that begins with an
 * operator goes on from the present value. Never throws.
 *
 * @example readExpression('/2', { name: 'averages', unit: '', value: 4 }, parse) //=> { ok: true, value: 2 }
 */
export function readExpression(text: string, subject: ExpressionSubject, parse: ParseExpression): ExpressionReading {
  const refused = (given: string, expected = allowed): ExpressionReading => ({ ok: false, given, expected });
  const shown = `"${text.slice(0, 40)}"`;
  if (text.length > longest || text.trim() === '') return refused(`${shown} was given`);
  if (!/^[A-Za-z0-9_.()+\-*/^%\s/\u00b5\u03bc]*$/.test(text)) return refused(`${shown} holds a sign that is not allowed`);
  const goesOn = /^\s*[-+*/^]/.test(text);
  if (goesOn && subject.value === null) return refused(`${shown} goes on from a value, and none is set`, 'a value of its own');
  const typed = text.replace(/[\u00b5\u03bc]/g, 'u').replace(/Hz\s*\/\s*px/g, 'Hz');
  try {
    const amount = amountOf(parse(goesOn ? `(${subject.name}) ${typed}` : typed), subject, 1);
    return inKeptUnit(amount, subject, shown);
  } catch (error) {
    return refused(error instanceof NotAllowed ? `${shown}: ${error.message}` : `${shown} cannot be read`);
  }
}

function inKeptUnit(amount: Amount, subject: ExpressionSubject, shown: string): ExpressionReading {
  const kept = keptUnits[subject.unit];
  const powers = Object.entries(amount.of).filter(([, power]) => power !== 0);
  const expected = subject.unit === '' ? 'a plain number' : `a number, alone or measuring the same as ${subject.unit}`;
  const fits = powers.length === 0 || (powers.length === 1 && kept !== undefined && powers[0]?.[0] === kept[0] && powers[0][1] === 1);
  const isShare = amount.percent === true && subject.unit !== '%';
  if (!fits || isShare || !Number.isFinite(amount.number))
    return { ok: false, given: `${shown} gives no ${subject.unit === '' ? 'plain number' : subject.unit}`, expected };
  const value = powers.length === 0 ? amount.number : amount.number / (kept?.[1] ?? 1);
  return { ok: true, value: Number(value.toPrecision(12)) };
}

const argsOf = (node: ParsedNode): readonly ParsedNode[] => (Array.isArray(node.args) ? (node.args as ParsedNode[]) : []);

function amountOf(node: ParsedNode, subject: ExpressionSubject, depth: number): Amount {
  if (depth > deepest) throw new NotAllowed('it is nested too deep');
  const inner = (child: ParsedNode | undefined) => {
    if (child === undefined) throw new NotAllowed('something is missing');
    return amountOf(child, subject, depth + 1);
  };
  if (node.type === 'ParenthesisNode') return inner(node.content as ParsedNode);
  if (node.type === 'ConstantNode' && typeof node.value === 'number') return { number: node.value, of: {} };
  if (node.type === 'SymbolNode') return symbolOf(String(node.name), subject);
  // The parser reads pacing.periodMs as a property: only the parameter's own name is one.
  if (node.type === 'AccessorNode' && nameOfAccessor(node) === subject.name) return symbolOf(subject.name, subject);
  if (node.type !== 'OperatorNode') throw new NotAllowed('this is not allowed here');
  const [left, right] = argsOf(node);
  // The parser writes ten percent as a division by a hundred that is marked.
  if (node.isPercentage === true) return { number: inner(left).number, of: {}, percent: true };
  switch (String(node.fn)) {
    case 'add':
      return sum(inner(left), inner(shareOf(left, right)), 1);
    case 'subtract':
      return sum(inner(left), inner(shareOf(left, right)), -1);
    case 'multiply':
      return product(inner(left), inner(right), 1);
    case 'divide':
      return product(inner(left), inner(right), -1);
    case 'pow':
      return power(inner(left), inner(right));
    case 'unaryMinus': {
      const amount = inner(left);
      return { ...amount, number: -amount.number };
    }
    case 'unaryPlus':
      return inner(left);
    default:
      throw new NotAllowed(`the operator ${String(node.op)} is not allowed`);
  }
}

/** `a + 10%` is parsed as `a + a * 10%`: gives back the percentage that was typed. */
function shareOf(left: ParsedNode | undefined, right: ParsedNode | undefined): ParsedNode | undefined {
  if (right?.type !== 'OperatorNode' || String(right.fn) !== 'multiply') return right;
  const [of, share] = argsOf(right);
  return of === left && share?.isPercentage === true ? share : right;
}

function nameOfAccessor(node: ParsedNode): string {
  try {
    return (node as unknown as { toString(): string }).toString();
  } catch {
    return '';
  }
}

function symbolOf(name: string, subject: ExpressionSubject): Amount {
  if (name === subject.name) {
    if (subject.value === null) throw new NotAllowed(`${name} has no value`);
    const kept = keptUnits[subject.unit];
    return kept === undefined ? { number: subject.value, of: {} } : { number: subject.value * kept[1], of: { [kept[0]]: 1 } };
  }
  const unit = Object.hasOwn(units, name) ? units[name] : undefined;
  if (unit === undefined) throw new NotAllowed(`the name ${name.slice(0, 20)} is not known`);
  return { number: unit[1], of: { [unit[0]]: 1 } };
}

const isPlain = ({ of }: Amount) => Object.values(of).every((power) => power === 0);

/** Adds; a percentage is a share of what it is added to, a plain number is taken in the unit beside it. */
function sum(a: Amount, b: Amount, sign: 1 | -1): Amount {
  if (b.percent === true && a.percent !== true) {
    // Beside a percentage itself, ten percent are ten more of a hundred.
    const isShare = a.of.share === 1;
    return { number: isShare ? a.number + sign * b.number : a.number * (1 + (sign * b.number) / 100), of: a.of };
  }
  const [x, y] = [a, b];
  const alike = isPlain(x) || isPlain(y) || dimensions(x) === dimensions(y);
  if (!alike) throw new NotAllowed('two different kinds of number are added');
  const unitOf = isPlain(x) ? y : x;
  return {
    number: x.number + sign * y.number,
    of: unitOf.of,
    ...(a.percent === true && b.percent === true ? { percent: true as const } : {}),
  };
}

function product(a: Amount, b: Amount, way: 1 | -1): Amount {
  const factor = (amount: Amount) => (amount.percent === true ? amount.number / 100 : amount.number);
  const of: Partial<Record<Dimension, number>> = { ...a.of };
  for (const [dimension, power] of Object.entries(b.of) as [Dimension, number][]) of[dimension] = (of[dimension] ?? 0) + way * power;
  return { number: way === 1 ? factor(a) * factor(b) : factor(a) / factor(b), of };
}

function power(a: Amount, b: Amount): Amount {
  if (!isPlain(a) || !isPlain(b)) throw new NotAllowed('powers are for plain numbers');
  return { number: a.number ** b.number, of: {} };
}

function dimensions({ of }: Amount): string {
  const kinds: readonly Dimension[] = ['length', 'time', 'angle', 'frequency', 'share'];
  return kinds.map((kind) => of[kind] ?? 0).join(' ');
}
