import { parseSync } from 'oxc-parser';

/** One change of one place in one file. */
export interface Mutant {
  readonly file: string;
  readonly line: number;
  readonly start: number;
  readonly end: number;
  readonly was: string;
  readonly becomes: string;
  readonly kind: 'number' | 'flag' | 'sign' | 'operator' | 'comparison';
  /** The line with the place marked, blanks trimmed: finds the place again when lines move. */
  readonly marked: string;
}

interface Node {
  readonly type: string;
  readonly start: number;
  readonly end: number;
  readonly [key: string]: unknown;
}

const operators: Readonly<Record<string, readonly string[]>> = {
  '+': ['-'],
  '-': ['+'],
  '*': ['/'],
  '/': ['*'],
  '%': ['*'],
  '**': ['*'],
  '&&': ['||'],
  '||': ['&&'],
  '??': ['&&'],
  '+=': ['-='],
  '-=': ['+='],
  '*=': ['/='],
  '/=': ['*='],
};

const comparisons: Readonly<Record<string, readonly string[]>> = {
  '<': ['<=', '>='],
  '<=': ['<', '>'],
  '>': ['>=', '<='],
  '>=': ['>', '<'],
  '===': ['!=='],
  '!==': ['==='],
};

/** A number becomes another one that a slip of the hand or of the head could have put there. */
export function otherNumbers(value: number): readonly string[] {
  if (value === 0) return ['1'];
  // A guard against rounding: only a much wider one is another rule.
  if (Math.abs(value) <= 1e-6) return [String(value * 1e7)];
  if (value === 1) return ['2', '0', '(-1)'];
  if (Number.isInteger(value)) return [String(value + 1), String(value - 1), `(-${value})`];
  return [String(Number((value * 1.1).toPrecision(6))), String(Number((value * 0.9).toPrecision(6))), `(-${value})`];
}

/** All changes of a file: every number, true and false, sign, operator and comparison; types and texts are left alone. */
export function mutantsOf(file: string, source: string): readonly (readonly Mutant[])[] {
  const parsed = parseSync(file, source);
  if (parsed.errors.length > 0) throw new Error(`${file}: ${parsed.errors[0]?.message}`);
  const places: Mutant[][] = [];
  const add = (start: number, end: number, kind: Mutant['kind'], changes: readonly string[]) => {
    const lineStart = source.lastIndexOf('\n', start - 1) + 1;
    const lineEnd = source.indexOf('\n', end);
    const was = source.slice(start, end);
    const place = {
      file,
      line: source.slice(0, start).split('\n').length,
      start,
      end,
      was,
      kind,
      marked: `${source.slice(lineStart, start)}[[${was}]]${source.slice(end, lineEnd === -1 ? undefined : lineEnd)}`.trim(),
    };
    const mutants = changes.map((becomes) => ({ ...place, becomes })).filter((mutant) => parses(file, mutated(source, mutant)));
    if (mutants.length > 0) places.push(mutants);
  };
  visit(parsed.program as unknown as Node, source, add);
  return places.sort((a, b) => (a[0] as Mutant).start - (b[0] as Mutant).start);
}

/** The source with one change made. */
export function mutated(source: string, { start, end, becomes }: Mutant): string {
  return source.slice(0, start) + becomes + source.slice(end);
}

function parses(file: string, source: string): boolean {
  return parseSync(file, source).errors.length === 0;
}

type Add = (start: number, end: number, kind: Mutant['kind'], changes: readonly string[]) => void;

/** Where the operator stands between two operands: comments may stand there too. */
function operatorBetween(source: string, left: Node, right: Node, operator: string): number {
  const between = source.slice(left.end, right.start).replace(/\/\*[\s\S]*?\*\/|\/\/[^\n]*/g, (comment) => ' '.repeat(comment.length));
  return left.end + between.indexOf(operator);
}

function visit(node: Node, source: string, add: Add): void {
  // Types say nothing at run time; what they wrap does.
  if (node.type.startsWith('TS') && !['TSAsExpression', 'TSSatisfiesExpression', 'TSNonNullExpression'].includes(node.type)) return;
  if (node.type === 'ImportDeclaration') return;
  if (node.type === 'Literal' && typeof node['value'] === 'number') add(node.start, node.end, 'number', otherNumbers(node['value']));
  if (node.type === 'Literal' && typeof node['value'] === 'boolean') add(node.start, node.end, 'flag', [String(!node['value'])]);
  if (node.type === 'UnaryExpression' && node['operator'] === '-') add(node.start, node.start + 1, 'sign', ['+']);
  if (node.type === 'UnaryExpression' && node['operator'] === '!') add(node.start, node.start + 1, 'operator', ['']);
  if (['BinaryExpression', 'LogicalExpression', 'AssignmentExpression'].includes(node.type)) {
    const operator = node['operator'] as string;
    const start = operatorBetween(source, node['left'] as Node, node['right'] as Node, operator);
    const changes = operators[operator];
    if (changes !== undefined) add(start, start + operator.length, operator === '+' || operator === '-' ? 'sign' : 'operator', changes);
    const compared = comparisons[operator];
    if (compared !== undefined) add(start, start + operator.length, 'comparison', compared);
  }
  if (node.type === 'MemberExpression' && ['Math.min', 'Math.max'].includes(source.slice(node.start, node.end))) {
    add(node.start, node.end, 'operator', [source.slice(node.start, node.end) === 'Math.min' ? 'Math.max' : 'Math.min']);
  }
  for (const [key, value] of Object.entries(node)) {
    // A plain key names; it counts for nothing.
    if (key === 'typeAnnotation' || key === 'typeArguments' || (key === 'key' && node['computed'] !== true)) continue;
    for (const inner of Array.isArray(value) ? value : [value]) {
      if (typeof inner === 'object' && inner !== null && typeof (inner as Node).type === 'string') visit(inner as Node, source, add);
    }
  }
}
