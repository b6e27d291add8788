import { formRow } from '../session/hands/form-commands.js';
import { headerHint } from '../session/header-rows.js';
import { presetRow } from '../session/preset-rows.js';
import { releaseRow } from '../session/release-form.js';
import type { State } from '../session/state.js';
import { parameterHint } from './parameter-pane.js';

/** What the line of messages says when there is no message. */
export function idleWords(state: State): string {
  const { screen, pane } = state.place;
  if (screen === 'series')
    return pane === 'main'
      ? parameterHint(state)
      : pane === 'consequences'
        ? 'w explains the figure under the hand'
        : 'w explains the caution under the hand';
  if (screen === 'patient' || screen === 'readings' || screen === 'record' || screen === 'keep') return formRow(state)?.help ?? '';
  if (screen === 'ways' || screen === 'front') return 'It proposes, people decide: Enter takes what the hand is on, u takes it back';
  if (screen === 'picture') return 'An illustration of the model: an invented object, never an image of a patient';
  if (screen === 'budget') return 'Enter takes the whole plan as one step, u takes it back';
  if (screen === 'carry') return 'A proposal: s saves it as a draft, a person reviews and releases it';
  if (screen === 'scanner') return 'Enter takes it: every figure, way and budget is then worked out on it';
  if (screen === 'release') return releaseRow(state)?.help ?? '';
  if (screen === 'revisions') return 'A released revision is never changed: d begins a draft of it';
  if (screen === 'report') return 'Small counts are said to be small; a suggestion is a variant to review';
  if (screen === 'headers') return 'Read from headers, which say what a scanner wrote; a person reviews every value';
  if (screen === 'header-values') return headerHint(state);
  if (screen === 'presets') return presetRow(state)?.study.title ?? '';
  return screen === 'start' ? 'Presets are starting values; review before use. / reads headers of a folder' : '';
}
