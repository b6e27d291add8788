import type { RecordedLimits } from '../study/record.js';
import { freeText } from '../study/record-text.js';
import { choiceRow, type FormRow, type NumberRow, numberRow, textRow } from './form-row.js';
import { sayClock, sayNumber } from './say-number.js';
import { sayTime } from './say-time.js';
import type { Session } from './session.js';
import type { State } from './state.js';

type NumberLimit = { [K in keyof RecordedLimits]: RecordedLimits[K] extends number | null ? K : never }[keyof RecordedLimits];

/** What this patient or implant allows, line by line. All of it may stay blank. */
export function patientForm(state: State): readonly FormRow[] {
  const { session } = state;
  if (session === null) return [];
  const { limits } = session;
  const number = (
    key: NumberLimit,
    row: Omit<NumberRow, 'field' | 'value' | 'keep' | 'shown'> & { readonly say?: (value: number) => string },
  ): FormRow => {
    const value = limits[key];
    const say = row.say ?? ((given: number) => `${sayNumber(given)}${row.unit === '' ? '' : ` ${row.unit}`}`);
    return numberRow({
      ...row,
      field: key,
      value,
      shown: value === null ? '-' : say(value),
      keep: (before, next) => keepNumber(state, before, key, next),
    });
  };
  return [
    heading('breath', 'Breath'),
    number('holdS', {
      label: 'breath-hold',
      unit: 's',
      min: 1,
      max: 120,
      step: 1,
      first: 15,
      help: 'Longest hold. s starts and stops a practice hold, which fills it in.',
    }),
    practiceRow(state),
    number('holdsAvailable', {
      label: 'how many holds',
      unit: '',
      min: 1,
      max: 99,
      step: 1,
      first: 5,
      whole: true,
      help: 'Holds in a row before this patient needs a pause.',
    }),
    choiceRow(
      { field: 'holdState', label: 'held in', help: 'State of breath in which this patient holds.' },
      limits.holdState,
      { inspiration: 'inspiration', expiration: 'expiration' },
      (before, holdState) => withLimits(before, { holdState }),
    ),
    heading('time', 'Time'),
    number('minutesLeft', {
      label: 'time left',
      unit: '',
      also: /\s*min(utes)?\s*$/i,
      min: 1,
      max: 600,
      step: 1,
      first: 30,
      help: 'Minutes this patient can stay. They run from the first series that is started.',
      say: (value) => `${sayNumber(value)} min`,
    }),
    number('longestSeriesS', {
      label: 'no series longer than',
      unit: 's',
      min: 5,
      max: 3600,
      step: 10,
      first: 120,
      help: 'Pain or unrest: longest single series. 2 min and 2:00 are understood.',
      say: sayTime,
    }),
    heading('rf', 'Implant label, RF'),
    number('b1rmsCapUt', {
      label: 'B1+rms at most',
      unit: 'uT',
      min: 0.1,
      max: 20,
      step: 0.1,
      first: 2,
      help: 'Cap of the label. Judged from the number the scanner displays, never without.',
    }),
    textRow('b1rmsReadFrom', '  read where', limits.b1rmsReadFrom, 'Card, letter or label where the cap was read.', (before, text) =>
      withLimits(before, { b1rmsReadFrom: blankIsNull(text) }),
    ),
    number('sarCapWkg', {
      label: 'SAR at most',
      unit: 'W/kg',
      min: 0.01,
      max: 20,
      step: 0.1,
      first: 2,
      help: 'Cap of the label or the site. Judged from the number the scanner displays.',
    }),
    textRow('sarReadFrom', '  read where', limits.sarReadFrom, 'Card, letter or label where the cap was read.', (before, text) =>
      withLimits(before, { sarReadFrom: blankIsNull(text) }),
    ),
    ...conditionRows(limits.labelConditions),
    heading('body', 'Body, widest at this level, arms included'),
    number('leftRightMm', {
      label: 'left to right',
      unit: 'mm',
      min: 50,
      max: 900,
      step: 10,
      first: 380,
      help: 'For wrap along left-right. Arms included.',
    }),
    number('frontBackMm', {
      label: 'front to back',
      unit: 'mm',
      min: 50,
      max: 900,
      step: 10,
      first: 240,
      help: 'For wrap along front-back.',
    }),
    heading('contrast', 'Contrast'),
    contrastRow(state, session),
  ];
}

/** What is said of the label's other conditions. */
export function labelSentence(limits: RecordedLimits): string {
  return `The label has other conditions. Typed here: ${limits.labelConditions.length}. Not typed: unknown.`;
}

function heading(field: string, label: string): FormRow {
  return { field: `heading ${field}`, label, shown: '', help: '', kind: 'heading' };
}

export function withLimits(session: Session, limits: Partial<RecordedLimits>): Session {
  return { ...session, limits: { ...session.limits, ...limits } };
}

/** Minutes that are typed anew run from now on, once the session has begun. */
function keepNumber(state: State, session: Session, key: NumberLimit, value: number | null): Session {
  const kept = withLimits(session, { [key]: value });
  return key === 'minutesLeft' && session.clockFromMs !== null ? { ...kept, clockFromMs: state.nowMs } : kept;
}

function blankIsNull(text: string): string | null {
  return text === '' ? null : text;
}

function practiceRow(state: State): FormRow {
  const since = state.practiceSinceMs;
  const shown = since === null ? 's starts it' : `${((state.nowMs - since) / 1000).toFixed(1)} s, s stops it`;
  return {
    field: 'practice',
    label: 'practice hold',
    shown,
    help: 'Ask for the breath, press s; press s again when it is let go.',
    kind: 'note',
  };
}

function conditionRows(conditions: readonly string[]): FormRow[] {
  const keep = (at: number) => (session: Session, text: string) => {
    const next = [...session.limits.labelConditions];
    if (text === '') next.splice(at, 1);
    else next[at] = freeText(text);
    return withLimits(session, { labelConditions: next });
  };
  const help = 'As the label has it, word for word. Left blank it goes away.';
  return [...conditions, ''].map((text, at) =>
    textRow(`condition ${at}`, at < conditions.length ? `condition ${at + 1}` : 'another condition', text, help, keep(at)),
  );
}

function contrastRow(state: State, session: Session): FormRow {
  const since = session.contrastAtMs;
  const shown = since === null ? 'not given' : `given ${sayClock((state.nowMs - since) / 1000)} ago`;
  return {
    field: 'contrast',
    label: 'contrast',
    shown,
    help: 'g says so from every screen and starts the clock.',
    kind: 'flag',
    turn: (before, direction) => withContrast(before, direction > 0 ? state.nowMs : null),
  };
}

/** Contrast given at a time, or not given. */
export function withContrast(session: Session, atMs: number | null): Session {
  if ((session.contrastAtMs === null) === (atMs === null)) return session;
  return { ...withLimits(session, { contrastGiven: atMs !== null }), contrastAtMs: atMs };
}
