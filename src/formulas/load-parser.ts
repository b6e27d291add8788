import type { ParseExpression, ParsedNode } from './parsed-node.js';

/**
 * Loads the expression parser of mathjs, and only that: no functions, no constants, no units come along.
 *
 * @example const parse = await loadParser();
 */
export async function loadParser(): Promise<ParseExpression> {
  const { create, parseDependencies } = await import('mathjs');
  const { parse } = create(parseDependencies, {});
  if (parse === undefined) throw new Error('mathjs gave no parser');
  return (text) => parse(text) as unknown as ParsedNode;
}
