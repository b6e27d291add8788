import { type Change, goBack, only, pointAt, say } from './change.js';
import { releaseText } from './difference-page.js';
import { readRevisions } from './hands/preset-commands.js';
import type { Answer } from './message.js';
import type { Reading, Shelf } from './shelf.js';
import type { ShelfAsk } from './shelf-messages.js';
import type { State } from './state.js';

/** An answer to something that the screens of presets and records asked. */
export function takeShelfAnswer(state: State, kind: ShelfAsk, answer: Answer, failed: string | null): Change {
  const { shelf } = state;
  const trouble = failed ?? 'It could not be read';
  switch (kind) {
    case 'revisions': {
      if (shelf.revisions === null) return only(state);
      if (answer.kind !== 'revisions')
        return only(say(withShelf(state, { revisions: { ...shelf.revisions, presets: [] } }), trouble, 'trouble'));
      const { presets, notes } = answer;
      return only(withShelf(state, { revisions: { ...shelf.revisions, presets, notes } }));
    }
    case 'checks': {
      if (shelf.release === null) return only(state);
      if (answer.kind !== 'checked') return only(say(withShelf(state, { release: { ...shelf.release, trouble } }), trouble, 'trouble'));
      const { findings, newest } = answer;
      // Where the site has none of this id there is nothing that it could have been made from.
      const basedOn = shelf.release.basedOn ?? (newest === null ? 0 : null);
      return only(withShelf(state, { release: { ...shelf.release, findings, newest, basedOn } }));
    }
    case 'release':
      return takeRelease(state, answer, failed);
    case 'list': {
      const read = answer.kind === 'record-list' ? answer.list : null;
      return only(withShelf(state, { list: told(shelf.list, read, trouble) }));
    }
    case 'one-record':
      return only(withShelf(state, { record: told(shelf.record, answer.kind === 'one-record' ? answer.record : null, trouble) }));
    case 'report':
      return only(withShelf(state, { report: told(shelf.report, answer.kind === 'record-report' ? answer.report : null, trouble) }));
  }
}

function takeRelease(state: State, answer: Answer, failed: string | null): Change {
  const { release } = state.shelf;
  if (release === null) return only(state);
  if (answer.kind === 'taken') {
    const { theirs, base } = answer;
    const next = withShelf(state, { release: { ...release, taken: { theirs, base }, newest: theirs } });
    return only(say(next, 'Nothing was written: d shows what differs, t takes your changes over', 'trouble'));
  }
  if (answer.kind === 'checked')
    return only(
      say(
        withShelf(state, { release: { ...release, findings: answer.findings, newest: answer.newest } }),
        'Nothing was written',
        'trouble',
      ),
    );
  if (answer.kind !== 'released') return only(say(state, failed ?? 'The revision was not written', 'trouble'));
  const { study } = answer;
  const there = state.place.screen === 'release' ? goBack(state) : state;
  const [read, effects] = readRevisions(withShelf(there, { release: null, marked: null }), study.id);
  const at = read.place.screen === 'revisions' ? pointAt(read, `site ${study.id}@${study.revision}`) : read;
  return [say(at, releaseText(study)), effects];
}

function told<T>(reading: Reading<T> | null, read: T | null, trouble: string): Reading<T> | null {
  return reading === null ? null : { ...reading, share: null, read, trouble: read === null ? trouble : null };
}

function withShelf(state: State, changes: Partial<Shelf>): State {
  return { ...state, shelf: { ...state.shelf, ...changes } };
}

/** How far a reading of records is; of an older one nothing counts. */
export function withReadingShare(state: State, ask: number, share: number): State {
  const { open, shelf } = state;
  const at = <T>(reading: Reading<T> | null) => (reading !== null && reading.ask === ask ? { ...reading, share } : reading);
  if (open.list !== ask && open['one-record'] !== ask && open.report !== ask) return state;
  return withShelf(state, { list: at(shelf.list), record: at(shelf.record), report: at(shelf.report) });
}
