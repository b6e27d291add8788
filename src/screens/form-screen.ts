import type { FormRow } from '../session/form-row.js';
import { formRow, formRows } from '../session/hands/form-commands.js';
import { labelSentence } from '../session/patient-form.js';
import { reasonRows, recordForm } from '../session/record-form.js';
import { residualsOf } from '../session/residuals.js';
import type { State } from '../session/state.js';
import { freeTextReminder } from '../study/record-text.js';
import { fitText } from '../terminal/text-width.js';
import { beside, blank, fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';

/** What this patient or implant allows. */
export function patientScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const limits = state.session?.limits;
  const note =
    limits === undefined || (limits.b1rmsCapUt === null && limits.sarCapWkg === null && limits.labelConditions.length === 0)
      ? []
      : [line(labelSentence(limits), 'attention')];
  return [...formPane(state, formRows(state), formRow(state), look, columns, rows - note.length), ...note];
}

/** What the scanner displayed. */
export function readingsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const note = [
    blank,
    line('The first scales every later figure of this series: time, B1+rms, SAR.'),
    line('It holds for the same coil and the same patient; every series needs its own.', 'attention'),
    line("Read the scanner's value again before starting: figures here are trends."),
    ...residualsOf(state, state.place.seriesId).map((words) => line(`Off so far here: ${words}`, 'quiet')),
  ];
  return [...formPane(state, formRows(state), formRow(state), look, columns, rows - note.length), ...note];
}

/** How much of each figure every way keeps. */
export function keepScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const note = [blank, line('Wider than usual is a decision: what was widened stands with the session.', 'quiet')];
  return [...formPane(state, formRows(state), formRow(state), look, columns, rows - note.length), ...note];
}

/** Planned and used, reasons, what should become of the preset. */
export function recordScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const inMain = state.place.pane === 'main';
  const here = formRow(state);
  const rightColumns = 27;
  const leftColumns = columns - rightColumns - 1;
  const chosen = state.session?.reasons.length ?? 0;
  const left = [
    line(inMain ? 'Record: planned to used' : 'Record: planned to used (Tab)', inMain ? 'bold' : 'quiet'),
    ...formPane(state, recordForm(state), inMain ? here : undefined, look, leftColumns, rows - 2),
    line(fitText(`Text: ${freeTextReminder}`, leftColumns, look.glyphs.ellipsis), 'quiet'),
  ];
  const right = [
    line(`Reasons: ${chosen === 0 ? 'NONE GIVEN' : chosen}${inMain ? ' (Tab)' : ''}`, inMain ? 'quiet' : 'bold'),
    ...reasonPane(state, inMain ? undefined : here, look, rightColumns, rows - 1),
  ];
  return beside(left, right, leftColumns, look.glyphs.verticalRule, look.glyphs.ellipsis);
}

function reasonPane(state: State, here: FormRow | undefined, { glyphs }: Look, columns: number, rows: number): Line[] {
  const all = reasonRows(state);
  const shown = windowOf(
    all,
    Math.max(
      0,
      all.findIndex(({ field }) => field === here?.field),
    ),
    rows,
  );
  return shown.items.map(({ field, label, shown: ticked }) => {
    const isHere = field === here?.field;
    const text = fitText(`${isHere ? glyphs.pointer : ' '}${ticked === 'yes' ? glyphs.tick : ' '} ${label}`, columns, glyphs.ellipsis);
    return [isHere ? { text, style: 'inverse', cursor: true } : span(text, ticked === 'yes' ? 'bold' : 'plain')];
  });
}

/** Lines of a form: label, value, one of them under the hand. */
function formPane(
  state: State,
  all: readonly FormRow[],
  here: FormRow | undefined,
  { glyphs }: Look,
  columns: number,
  rows: number,
): Line[] {
  const at = Math.max(
    0,
    all.findIndex(({ field }) => field === here?.field),
  );
  const shown = windowOf(all, at, rows);
  // Wide screens have room for whole labels; narrow ones keep it for the values.
  const widest = Math.max(26, Math.floor(0.45 * columns));
  const labelColumns = Math.min(widest, Math.max(...all.map(({ label }) => label.length), 10) + 1);
  const lines = shown.items.map((row): Line => {
    if (row.kind === 'heading' || (row.kind === 'note' && row.shown === '')) return line(row.label, 'quiet');
    const isHere = row === here || row.field === here?.field;
    const typed = isHere && state.entry !== null ? `${state.entry.text}_` : row.shown;
    const style = isHere ? 'inverse' : row.attention ? 'attention' : row.shown === '-' ? 'quiet' : 'plain';
    const text = fitText(typed, Math.max(4, columns - labelColumns - 3), glyphs.ellipsis);
    return [
      span(`${isHere ? glyphs.pointer : ' '} ${fitText(row.label, labelColumns, glyphs.ellipsis)} `, isHere ? 'inverse' : 'plain'),
      // While something is typed the cursor stands where it is typed.
      isHere && state.entry === null ? { text, style, cursor: true } : span(text, style),
    ];
  });
  return fill(lines, rows);
}
