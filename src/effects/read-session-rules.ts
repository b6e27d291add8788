import type { Answer, Effect } from '../session/message.js';
import { readRules } from '../study/read-rules.js';
import type { InterfaceWorld } from './interface-world.js';

/** Reads the rules of the must-keeps of a session. */
export async function readSessionRules(world: InterfaceWorld, { mustKeeps }: Extract<Effect, { kind: 'read-rules' }>): Promise<Answer> {
  return { kind: 'rules', rules: readRules(mustKeeps, await world.parser()) };
}
