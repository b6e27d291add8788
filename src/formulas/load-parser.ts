import type { ParsedNode, ParseExpression } from './parsed-node.js';

/**
 * Loads the expression parser of mathjs, and only that: no functions, no constants, no units come along.
 *
 * @example const parse = await loadParser();
 */
export async function loadParser(): Promise<ParseExpression> {
  const { create, parseDependencies } = await import('mathjs');
  const math = parseDependencies === undefined ? null : create(parseDependencies, {});
  if (math === null) throw new Error('mathjs gave no parser');
  return (text) => math.parse(text) as unknown as ParsedNode;
}
