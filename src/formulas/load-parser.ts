import type { ParsedNode, ParseExpression } from './parsed-node.js';

/**
 * Loads the expression parser of mathjs, and only that: no functions, no constants, no units come along.
 *
 * @example const parse = await loadParser();
 */
export async function loadParser(): Promise<ParseExpression> {
  const { parse } = await import('./expression-parser.js');
  return (text) => parse(text) as unknown as ParsedNode;
}
