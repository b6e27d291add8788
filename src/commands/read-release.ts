import { releaseSaid } from '../study/release-said.js';
import type { Release } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { todayOf } from './today.js';

const optionOf = { role: '--role', secondRole: '--second-role', reason: '--reason' } as const;

/** Who releases, and why: role and reason must be said, and a second role where the site wants one. Nothing is taken from the settings. */
export function readRelease(request: CommandRequest, needsSecondRole: boolean, io: CommandIo): Attempt<Release> {
  const given = (option: string) => request.value(option) ?? '';
  const said = releaseSaid({ role: given('role'), secondRole: given('second-role'), reason: given('reason') }, needsSecondRole);
  if (said.ok) return { ok: true, value: { ...said.value, day: todayOf(io) } };
  const { of, message, hint } = said.fault;
  const option = optionOf[of];
  const isMissing = given(option.slice(2)).trim() === '';
  return wrongUse(option, isMissing ? `${message} ${option} is missing.` : message, hint);
}
