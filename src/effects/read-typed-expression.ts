import { readExpression } from '../formulas/read-expression.js';
import type { Answer, Effect } from '../session/message.js';
import type { InterfaceWorld } from './interface-world.js';

/** Works a typed expression out. */
export async function readTypedExpression(
  world: InterfaceWorld,
  { text, own }: Extract<Effect, { kind: 'read-expression' }>,
): Promise<Answer> {
  const reading = readExpression(text, own, await world.parser());
  if (reading.ok) return { kind: 'value', value: reading.value };
  return {
    kind: 'failed',
    problems: [{ code: 'expression', path: own.name, message: `${reading.given}; expected ${reading.expected}.`, hint: '' }],
  };
}
