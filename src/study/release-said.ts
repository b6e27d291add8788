import { freeText, freeTextReminder, identifierHint } from './record-text.js';
import type { Release } from './study.js';

/** What was said of a release: all of it typed, nothing taken from settings. */
export interface ReleaseSaid {
  readonly role: string;
  readonly secondRole: string;
  readonly reason: string;
}

/** What is missing or wrong in it. */
export interface ReleaseFault {
  readonly of: keyof ReleaseSaid;
  readonly message: string;
  readonly hint: string;
}

/** What was said as a preset holds it, texts cleaned; or the first thing that stands against it. */
export function releaseSaid(
  said: ReleaseSaid,
  needsSecondRole: boolean,
): { readonly ok: true; readonly value: Omit<Release, 'day'> } | { readonly ok: false; readonly fault: ReleaseFault } {
  const [role, secondRole, reason] = [freeText(said.role), freeText(said.secondRole), freeText(said.reason)];
  const fault = (of: keyof ReleaseSaid, message: string, hint: string) => ({ ok: false, fault: { of, message, hint } }) as const;
  if (role === '') return fault('role', 'Nobody releases this preset.', 'Name the role that releases it: physicist.');
  if (reason === '') return fault('reason', 'The preset is released without a reason.', 'Say why: short holds.');
  if (needsSecondRole && secondRole === '')
    return fault('secondRole', 'This site asks for a second role.', 'Name the role that agrees: lead technologist.');
  if (secondRole !== '' && secondRole.toLowerCase() === role.toLowerCase())
    return fault('secondRole', `The second role is the first one again: ${role}.`, 'Have somebody of another role agree.');
  const hint = identifierHint(reason);
  if (hint !== null) return fault('reason', `${hint} Given was "${reason}".`, freeTextReminder);
  return { ok: true, value: { role, ...(secondRole === '' ? {} : { secondRole }), reason } };
}
