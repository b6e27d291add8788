import { figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import type { RecordedSeries } from '../study/record.js';
import { changedFigures, changedParameters, parameterWords } from '../study/record-changes.js';
import { reasonCodes, reasonWords, recordReasons } from '../study/record-reasons.js';
import { initialsText } from '../study/record-text.js';
import { outcomeWords, qualityWords, recommendationWords } from '../study/record-words.js';
import { scaleFigures } from './consequences.js';
import { type Equipment, equipmentNow, sayEquipment } from './equipment.js';
import { choiceRow, type FormRow, textRow } from './form-row.js';
import { readingRows } from './readings-form.js';
import { outcomeOf, recordedSeries } from './record-of-session.js';
import { sayFigure } from './say-figure.js';
import type { Session, SessionSeries } from './session.js';
import { eachSeries } from './set-field.js';
import type { State } from './state.js';
import { wrapText } from './wrap-text.js';

/** Columns of a rule that is crossed, on the smallest screen. */
const ruleColumns = 46;

const outcomes = { ...outcomeWords, 'left-out': 'left out of the record' } as const;

/** The record, line by line: planned and used, what was crossed, how it went, what should become of the preset. */
export function recordForm(state: State): readonly FormRow[] {
  const { session } = state;
  if (session === null) return [];
  const equipment = equipmentNow(state);
  return [
    ...(equipment === null ? [] : [scannerRow(equipment)]),
    textRow('role', 'role', session.role, 'Who worked here: technologist, physicist. No name.', (before, role) => ({ ...before, role })),
    textRow(
      'initials',
      'initials',
      session.initials,
      'If the site wants them; four letters.',
      (before, text) => ({ ...before, initials: initialsText(text) }),
      12,
    ),
    choiceRow(
      { field: 'recommendation', label: 'the preset', help: 'What should become of the preset.' },
      session.recommendation,
      recommendationWords,
      (before, recommendation) => ({ ...before, recommendation }),
    ),
    ...session.series.flatMap((series) => seriesRows(state, series)),
  ];
}

/** What the session was done on, as the record names it. */
function scannerRow(equipment: Equipment): FormRow {
  return {
    field: 'scanner',
    label: 'scanner',
    shown: sayEquipment(equipment),
    help: '',
    kind: 'note',
  };
}

function seriesRows(state: State, series: SessionSeries): FormRow[] {
  const { id } = series;
  const change = (session: Session, values: Partial<SessionSeries>) =>
    eachSeries(session, new Set([id]), (before) => ({ ...before, ...values }));
  const outcome = outcomeOf(series);
  const outcomeRow = choiceRow(
    { field: `${id} outcome`, label: id, help: 'How this series went; left and right change it.' },
    outcome,
    outcomes,
    (session, next) => change(session, { outcome: next }),
  );
  if (outcome === 'left-out') return [outcomeRow];
  const recorded = recordedSeries(state, id);
  const changed = changedParameters(recorded).length > 0;
  return [
    outcomeRow,
    ...comparisonRows(id, recorded),
    ...recorded.crossed.flatMap(({ rule, role }, at): FormRow[] => [
      {
        field: `${id} crossed ${at}`,
        label: '  crossed',
        shown: role === null ? 'accepted by nobody' : `accepted by ${role}`,
        help: 'Right: the role above accepts that this must-keep is crossed. Left: nobody does.',
        kind: 'flag',
        ...(role === null ? { attention: true as const } : {}),
        turn: (session, direction) => {
          const { [rule]: _gone, ...accepted } = series.accepted;
          return change(session, { accepted: direction > 0 ? { ...accepted, [rule]: session.role || 'no role given' } : accepted });
        },
      },
      // What is accepted stands under it in full, numbers and source.
      ...wrapText(rule, ruleColumns).map(
        (words, line): FormRow => ({ field: `${id} crossed ${at} ${line}`, label: `    ${words}`, shown: '', help: '', kind: 'note' }),
      ),
    ]),
    ...(changed || series.reason !== '' || outcome === 'given-up' || outcome === 'repeated'
      ? [
          textRow(
            `${id} reason`,
            '  reason',
            series.reason,
            'Of this series alone; the reasons of the session stand at the right.',
            (session, reason) => change(session, { reason }),
          ),
        ]
      : []),
    choiceRow(
      { field: `${id} quality`, label: '  quality as seen', help: 'As seen at the console, by role; no diagnosis.' },
      series.quality,
      qualityWords,
      (session, quality) => change(session, { quality }),
    ),
    ...readingRows(state, 'before', id, series.before)
      .slice(0, 3)
      .map((row) => ({ ...row, field: `${id} ${row.field}`, label: `  before, ${row.label}` })),
    ...readingRows(state, 'after', id, series.after).map((row) => ({
      ...row,
      field: `${id} ${row.field}`,
      label: `  after, ${row.label}`,
    })),
  ];
}

/** Planned and used side by side, only what changed. */
function comparisonRows(id: string, recorded: RecordedSeries): FormRow[] {
  const { planned, used } = recorded;
  const row = (field: string, label: string, from: string, to: string): FormRow => ({
    field: `${id} ${field}`,
    label: `  ${label}`,
    shown: `${from.padStart(10)} to ${to}`,
    help: 'Planned, then used.',
    kind: 'info',
  });
  return [
    ...changedParameters(recorded).map((key) =>
      row(key, parameterRow(key).label, parameterWords(key, planned.parameters[key]), parameterWords(key, used.parameters[key])),
    ),
    ...changedFigures(recorded)
      .filter((key) => scaleFigures.includes(key))
      .map((key) =>
        row(key, figureTable[key].label, sayFigure(key, planned.figures[key] ?? null), sayFigure(key, used.figures[key] ?? null)),
      ),
  ];
}

/** The reasons that can be ticked: words of the table first, then what else was typed. */
export function reasonRows(state: State): readonly FormRow[] {
  const chosen = state.session?.reasons ?? [];
  const own = chosen.filter((reason) => !Object.hasOwn(recordReasons, reason));
  return [...reasonCodes, ...own].map((code) => ({
    field: `reason ${code}`,
    label: reasonWords(code),
    shown: chosen.includes(code) ? 'yes' : '',
    help: 'Space ticks a reason; several may apply.',
    kind: 'flag',
    turn: (session, direction) => {
      const has = session.reasons.includes(code);
      if (has === direction > 0) return session;
      return { ...session, reasons: has ? session.reasons.filter((reason) => reason !== code) : [...session.reasons, code] };
    },
  }));
}
