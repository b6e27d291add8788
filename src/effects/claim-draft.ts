import type { Answer, Effect } from '../session/message.js';
import type { InterfaceWorld } from './interface-world.js';

/** Takes over a session that was left; of several programs only one gets it. */
export async function claimDraft(world: InterfaceWorld, { id }: Extract<Effect, { kind: 'claim-draft' }>): Promise<Answer> {
  const claimed = await world.drafts.claim(id);
  return claimed.ok ? { kind: 'draft', session: claimed.value } : { kind: 'failed', problems: claimed.problems };
}
