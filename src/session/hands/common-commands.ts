import { type Command, edit, goBack, only, open, say } from '../change.js';
import { withContrast } from '../patient-form.js';
import type { ScreenName, State } from '../state.js';

/** Opens a screen. */
export const show =
  (screen: ScreenName): Command =>
  (state) =>
    only(open(state, screen));

/** Goes back one screen. */
export const back: Command = (state) =>
  only(state.place.back.length === 0 ? say(state, 'This is the first screen; q leaves, and the session is kept') : goBack(state));

/** Takes the last step back. */
export const undo: Command = (state) => {
  const step = state.past.at(-1);
  if (step === undefined || state.session === null) return only(say(state, 'Nothing to undo'));
  const future = [...state.future, { session: state.session, words: step.words }];
  return only(say({ ...state, session: kept(step.session, state), past: state.past.slice(0, -1), future }, `Undone: ${step.words}`));
};

/** Does again what was undone. */
export const redo: Command = (state) => {
  const step = state.future.at(-1);
  if (step === undefined || state.session === null) return only(say(state, 'Nothing to redo'));
  const past = [...state.past, { session: state.session, words: step.words }];
  return only(say({ ...state, session: kept(step.session, state), past, future: state.future.slice(0, -1) }, `Done again: ${step.words}`));
};

/** What was saved differs from what is now shown. */
function kept(session: NonNullable<State['session']>, state: State): NonNullable<State['session']> {
  return session === state.session ? session : { ...session, saved: false };
}

/** Contrast is given now: one key from every screen. */
export const contrastGiven: Command = (state) => {
  if (state.session === null) return only(state);
  if (state.session?.contrastAtMs != null)
    return only(say(state, 'Contrast was given already; this patient (p) can take it back', 'trouble'));
  return only(edit(state, 'Contrast given: nothing may ask to repeat what came before', (session) => withContrast(session, state.nowMs)));
};

/** Leaves; the session is kept and offered at the next start. */
export const quit: Command = (state) => [state, [{ kind: 'quit' }]];
