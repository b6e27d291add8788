import { originWords, presetRow, presetRows, releasedWords, revisionRow, revisionRows } from '../session/preset-rows.js';
import { recordRow, recordRows } from '../session/record-rows.js';
import { releaseRow, releaseRows } from '../session/release-form.js';
import { shelfText, textFrom } from '../session/shelf-text.js';
import type { State } from '../session/state.js';
import { reasonWords } from '../study/record-reasons.js';
import { releaseWords } from './release-screen.js';

/** One thing to read aloud; `here` is where the hand is. */
export interface ShelfItem {
  readonly words: string;
  readonly here?: boolean;
}

/** The screens of presets and records, one thing a line. */
export function shelfItems(state: State): readonly ShelfItem[] {
  switch (state.place.screen) {
    case 'presets': {
      const here = presetRow(state)?.field;
      return [
        { words: `Type to find: ${state.shelf.narrowing || 'nothing typed'}` },
        ...presetRows(state).map(({ field, study, origin }) => ({
          words:
            origin === 'session'
              ? `The open session on ${study.id}, ${study.title}`
              : `${study.region}, ${study.fieldT} T: ${study.id}, ${study.title}, revision ${study.revision}, ${study.status}, ${originWords[origin]}`,
          here: field === here,
        })),
      ];
    }
    case 'revisions': {
      const here = revisionRow(state)?.field;
      const { revisions, marked } = state.shelf;
      return [
        ...(revisions?.notes ?? []).map((words) => ({ words })),
        ...revisionRows(state).map(({ field, study, origin }) => ({
          words: `${origin === 'session' ? 'The open session, made from revision' : 'Revision'} ${study.revision}, ${study.status}, ${originWords[origin]}, ${study.released === undefined ? 'released by nobody' : `released ${releasedWords(study)}`}${marked === study ? ', marked' : ''}`,
          here: field === here,
        })),
      ];
    }
    case 'release': {
      const here = releaseRow(state)?.field;
      return [
        ...releaseRows(state).map(({ field, label, shown }) => ({
          words: `${label}: ${shown === '' ? 'blank' : shown}`,
          here: field === here,
        })),
        ...releaseWords(state).map(({ words }) => ({ words })),
      ];
    }
    case 'records': {
      const here = recordRow(state);
      const { list, typed } = state.shelf;
      return [
        { words: `Type to find: ${typed || 'nothing typed'}` },
        ...(list?.read?.notes ?? []).map((words) => ({ words })),
        ...recordRows(state).map((row) => ({
          words: `${row.day ?? 'day left out'}, ${row.preset} revision ${row.revision}, ${row.rewritten} of ${row.series} series rewritten, role ${row.role || 'not given'}${row.reasons.length === 0 ? '' : `, reasons ${row.reasons.map(reasonWords).join(', ')}`}`,
          here: row === here,
        })),
      ];
    }
    default:
      return textItems(state);
  }
}

/** A text, a line each; the hand is on the line that was scrolled to. */
function textItems(state: State): readonly ShelfItem[] {
  const lines = shelfText(state, true);
  if (lines.length === 0) return [{ words: 'Nothing to read yet; Escape goes back.' }];
  const at = Math.min(textFrom(state), lines.length - 1);
  return lines.map(({ text }, line) => ({ words: text, here: line === at }));
}
