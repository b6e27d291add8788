import type { Answer, Effect } from '../session/message.js';
import type { InterfaceWorld } from './interface-world.js';

/** Carries a preset to another field or scanner, beside the program. */
export function carryPreset(
  { searches }: Pick<InterfaceWorld, 'searches'>,
  { problem }: Extract<Effect, { kind: 'carry' }>,
): Promise<Answer> {
  return new Promise((resolve) => {
    searches.carry(problem, {
      carried: (carried) => resolve({ kind: 'carried', carried }),
      failed: (message) =>
        resolve({
          kind: 'failed',
          problems: [{ code: 'carry-failed', path: '', message: `It could not be worked out: ${message}.`, hint: 'Try another target.' }],
        }),
    });
  });
}
