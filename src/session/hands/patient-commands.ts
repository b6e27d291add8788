import { type Command, edit, only, say } from '../change.js';
import { withLimits } from '../patient-form.js';

/** Starts a practice hold, or stops it and fills in the seconds. */
export const practice: Command = (state) => {
  const since = state.practiceSinceMs;
  if (since === null) return only(say({ ...state, practiceSinceMs: state.nowMs }, 'Practice hold runs: s when the breath is let go'));
  const heldS = Math.floor((state.nowMs - since) / 100) / 10;
  const stopped = { ...state, practiceSinceMs: null };
  if (heldS < 1) return only(say(stopped, 'Less than a second: not taken', 'trouble'));
  return only(
    edit(stopped, `breath-hold ${heldS.toFixed(1)} s from the practice hold`, (session) =>
      withLimits(session, { holdS: Math.min(120, heldS) }),
    ),
  );
};
