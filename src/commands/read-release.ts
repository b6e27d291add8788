import { freeText, freeTextReminder, identifierHint } from '../study/record-text.js';
import type { Release } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { todayOf } from './today.js';

/** Who releases, and why: role and reason must be said, and a second role where the site wants one. Nothing is taken from the settings. */
export function readRelease(request: CommandRequest, needsSecondRole: boolean, io: CommandIo): Attempt<Release> {
  const role = freeText(request.value('role') ?? '');
  const secondRole = freeText(request.value('second-role') ?? '');
  const reason = freeText(request.value('reason') ?? '');
  if (role === '') return wrongUse('--role', 'Nobody releases this preset: --role is missing.', 'Write --role physicist.');
  if (reason === '')
    return wrongUse('--reason', 'The preset is released without a reason: --reason is missing.', 'Write --reason "short holds".');
  if (needsSecondRole && secondRole === '') {
    return wrongUse(
      '--second-role',
      'This site asks for a second role: --second-role is missing.',
      'Write --second-role "lead technologist".',
    );
  }
  if (secondRole !== '' && secondRole.toLowerCase() === role.toLowerCase()) {
    return wrongUse('--second-role', `The second role is the first one again: ${role}.`, 'Have somebody of another role agree.');
  }
  const hint = identifierHint(reason);
  if (hint !== null) return wrongUse('--reason', `${hint} Given was "${reason}".`, freeTextReminder);
  return { ok: true, value: { role, ...(secondRole === '' ? {} : { secondRole }), day: todayOf(io), reason } };
}
