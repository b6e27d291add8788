import { cleanText, shownValue } from '../study/clean-text.js';
import { type OwnChange, takeOver } from '../study/preset-diff-take-over.js';
import type { Study } from '../study/study.js';
import { type Attempt, refuse } from './attempt.js';
import { exitCodes } from './exit-codes.js';

/** Own changes on top of somebody else's revision, with a line for each; refused where both changed the same value. */
export function ownChangesOnTop(
  base: Attempt<{ readonly study: Study }> | null,
  mine: Study,
  theirs: Study,
): Attempt<{ readonly study: Study; readonly words: readonly string[] }> {
  if (base === null) {
    const message = `It is not known which revision of ${mine.id} your changes start from.`;
    return refuse(exitCodes.wrongUse, { code: 'wrong-use', path: '--based-on', message, hint: 'Write --based-on with its number.' });
  }
  if (!base.ok) return base;
  const { study, taken, conflicts } = takeOver(base.value.study, mine, theirs);
  if (conflicts.length > 0) {
    const problems = conflicts.map((change) => ({
      code: 'changed-by-both',
      path: `${change.series ?? ''}.${change.key}`,
      message: `${nameOf(change)} was changed by both: yours ${shownValue(change.mine)}, theirs ${shownValue(change.theirs)}.`,
      hint: 'Decide together, set the value in your preset and start from their revision.',
    }));
    return { ok: false, exit: exitCodes.failed, problems };
  }
  const words = taken.map((change) => `taken over: ${nameOf(change)} ${shownValue(change.theirs)} to ${shownValue(change.mine)}`);
  return { ok: true, value: { study, words } };
}

function nameOf({ series, key }: OwnChange): string {
  return cleanText(series === null ? key : `${series} ${key}`, 120);
}
