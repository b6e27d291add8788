import { type Command, edit, goBack, neighbour, only, pointAt, say } from '../change.js';
import { type Equipment, equipmentFor, sayChoice, sayEquipment } from '../equipment.js';
import { scannerRow, scannerRows } from '../scanner-list.js';
import type { Opened, Session } from '../session.js';
import type { State } from '../state.js';

export const moveInScanners =
  (by: number): Command =>
  (state) => {
    const here = scannerRow(state).field;
    return only(pointAt({ ...state, notice: null }, neighbour(scannerRows(state), ({ field }) => field === here, by)?.field ?? ''));
  };

/** Takes the scanner and coil under the hand: for the open session, else for the next one. */
export const takeScanner: Command = (state) => {
  const { choice, inUse } = scannerRow(state);
  const { opened, session } = state;
  if (opened === null || session === null) {
    return only(say(goBack({ ...state, scannerChoice: choice }), `Sessions are begun on: ${sayChoice(choice)}`));
  }
  if (inUse) return only(say(goBack(state), 'The scanner and coil stay as they are'));
  if (session.series.some(({ state: word }) => word !== 'to-do' && word !== 'not-done'))
    return only(say(state, 'A series was run already: a record has one scanner and one coil', 'trouble'));
  return only(goBackSaying(onEquipment(state, opened, equipmentFor(choice, opened.study, state.defaults))));
};

function goBackSaying(state: State): State {
  return { ...goBack(state), notice: state.notice };
}

/** The session on other equipment, as one step that can be undone. What was read on the former says nothing about this one. */
function onEquipment(state: State, opened: Opened, equipment: Equipment): State {
  const known = [opened, ...(opened.others ?? [])].findIndex((one) => isSame(one, equipment));
  const others = known === -1 ? [...(opened.others ?? []), equipment] : (opened.others ?? []);
  const at = known === -1 ? others.length : known;
  const readings = state.session?.series.some(({ before, after }) => before !== null || after !== null) === true;
  const words = `On ${sayEquipment(equipment)}${readings ? '; what was read on the other one is taken out' : ''}`;
  const change = (session: Session): Session => ({
    ...session,
    equipment: at,
    series: session.series.map((series) => ({ ...series, before: null, after: null })),
  });
  const next = edit(state, words, change);
  // A way that was looked at or taken was worked out on the other one.
  return { ...next, lastWay: null, taken: null, opened: others.length === 0 ? opened : { ...opened, others } };
}

function isSame(a: Equipment, b: Equipment): boolean {
  return a.scannerName === b.scannerName && a.coilName === b.coilName && JSON.stringify(a.scanner) === JSON.stringify(b.scanner);
}
