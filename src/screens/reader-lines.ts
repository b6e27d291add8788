import { figureTable } from '../calc/figures.js';
import { carryChoices, carryRow, carryRows } from '../session/carry-rows.js';
import { rangeChart } from '../session/chart.js';
import { consequences } from '../session/consequences.js';
import { chosenScanner, sayChoice } from '../session/equipment.js';
import { plannedHere } from '../session/hands/budget-commands.js';
import { formRow, formRows } from '../session/hands/form-commands.js';
import { orderRow } from '../session/hands/order-commands.js';
import { fieldHere, fieldsHere } from '../session/hands/series-commands.js';
import { startRow } from '../session/hands/start-commands.js';
import { keptInWords } from '../session/keep-form.js';
import { nextStep } from '../session/next-step.js';
import { pictureSentences } from '../session/picture-sentences.js';
import { planInWords, plannedInWords, planRows } from '../session/plan-words.js';
import { residualsOf } from '../session/residuals.js';
import { resultNow, studySeries } from '../session/results.js';
import { sayField } from '../session/say-field.js';
import { sayFigure } from '../session/say-figure.js';
import { sayTime } from '../session/say-time.js';
import { scannerRow, scannerRows, scannerWords } from '../session/scanner-list.js';
import { fieldValue } from '../session/series-fields.js';
import { sessionCautions } from '../session/session-cautions.js';
import { startRows } from '../session/start-list.js';
import type { State } from '../session/state.js';
import { minimumSet, timeline } from '../session/timeline.js';
import { sayJudged, seriesVerdicts } from '../session/verdicts.js';
import { shownWays, wayHere } from '../session/ways.js';
import { otherMovesInWords, searchNotes, searchStatus, verdictWith, wayParagraphs, wayTitle, wayVerdict } from '../session/ways-words.js';
import { headlineLine, keyLine, noticeLine } from './common-lines.js';
import { frontPoint } from './front-screen.js';
import { headerItems } from './header-items.js';
import { idleWords } from './idle-words.js';
import { labelLine } from './label-line.js';
import { fill, type Line, line, lineText, span, windowOf, wrap } from './line.js';
import type { Look } from './look.js';
import { shelfItems } from './shelf-items.js';
import { helpScreen, typeTheseScreen, whyScreen } from './text-screen.js';
import { titleLine } from './title-line.js';

/** One thing to read aloud; `here` is where the hand is. */
interface Item {
  readonly words: string;
  readonly here?: boolean;
}

/** The same content as linear text: one thing a line, no columns, no drawings; the cursor stands on the line of the hand. */
export function readerLines(state: State, look: Look): Line[] {
  const { columns, rows } = state.size;
  const items = itemsOf(state, look);
  const lines: Line[] = [];
  let here = 0;
  for (const item of items) {
    if (item.here) here = lines.length;
    const said = item.here && !item.words.startsWith('Here') ? `Here: ${item.words}` : item.words;
    for (const [at, words] of wrap(said, columns - 1).entries())
      lines.push(item.here && at === 0 ? [{ text: words, style: 'bold', cursor: true }] : [span(words)]);
  }
  const label = labelLine(state, columns, look);
  const bodyRows = rows - 4 - label.length;
  return [
    headlineLine(state, look, columns),
    titleLine(state, look, columns),
    ...fill(windowOf(lines, here, bodyRows).items, bodyRows),
    ...label,
    noticeLine(state, look, columns, line(idleWords(state))),
    keyLine(state, look, columns),
  ];
}

function itemsOf(state: State, look: Look): readonly Item[] {
  const text = (lines: readonly Line[]): Item[] => lines.map((each) => ({ words: lineText(each) }));
  switch (state.place.screen) {
    case 'start':
      return startItems(state);
    case 'order':
      return orderItems(state);
    case 'series':
      return seriesItems(state);
    case 'chart':
      return chartItems(state);
    case 'presets':
    case 'revisions':
    case 'compare':
    case 'release':
    case 'records':
    case 'past-record':
    case 'report':
      return shelfItems(state);
    case 'headers':
    case 'header-values':
      return headerItems(state);
    case 'carry':
      return carryItems(state);
    case 'scanner':
      return scannerItems(state);
    case 'ways':
      return waysItems(state);
    case 'picture':
      return pictureSentences(state).map((words, at) => ({ words, here: at === 0 }));
    case 'front':
      return frontItems(state);
    case 'budget':
      return budgetItems(state);
    case 'why':
      return text(whyScreen(state, look, state.size.columns - 1, state.size.rows - 4));
    case 'type-these':
      return text(typeTheseScreen(state, look, state.size.columns - 1, state.size.rows - 4));
    case 'help':
      return text(helpScreen(state, look, state.size.columns - 1, state.size.rows - 4));
    default: {
      const here = formRow(state)?.field;
      const rows = formRows(state).map((row) => ({
        words:
          row.kind === 'heading'
            ? `${row.label}:`
            : row.kind === 'note' && row.shown === ''
              ? row.label.trim()
              : `${row.label.trim()}: ${row.shown === '-' ? 'blank' : row.shown.trim() || 'no'}`,
        here: row.field === here,
      }));
      return state.place.screen === 'readings' ? [...rows, ...offItems(state)] : rows;
    }
  }
}

function startItems(state: State): Item[] {
  const here = startRow(state)?.field;
  return [
    ...state.fileNotes.map((words) => ({ words })),
    { words: `Type to narrow: ${state.narrowing || 'nothing typed'}` },
    { words: `Scanner: ${sayChoice(chosenScanner(state))}` },
    ...startRows(state).map((row) => ({
      words:
        row.kind === 'draft'
          ? `Unfinished session: ${row.words}, ${row.changes} changed`
          : `${row.preset.study.fieldT} T, ${row.preset.study.region}: ${row.preset.study.title}, ${row.preset.study.status}`,
      here: row.field === here,
    })),
  ];
}

function carryItems(state: State): Item[] {
  const here = carryRow(state)?.field;
  if (state.carry?.trouble != null) return [{ words: state.carry.trouble, here: true }];
  const rows = carryRows(state);
  return [
    ...carryChoices(state).map(({ field, label, after }) => ({ words: `${label}: ${after}`, here: field === here })),
    ...(rows.length === 0 ? [{ words: 'Being worked out' }] : []),
    ...rows.map(({ field, kind, label, before, after, words }) => ({
      words:
        kind === 'heading'
          ? `${label}:`
          : kind === 'words'
            ? `${label}: ${words}`
            : `${label}: ${before === after ? `${before}, as in the preset` : `${before} becomes ${after}`}${words === '' ? '' : `: ${words}`}`,
      here: field === here,
    })),
  ];
}

function scannerItems(state: State): Item[] {
  const here = scannerRow(state).field;
  const { heading, facts, table, notes, coil, attention } = scannerWords(state);
  const [titles = [], ...rows] = table ?? [];
  return [
    ...scannerRows(state).map(({ field, name, where, coil, inUse }) => ({
      words: `${name}, ${where}, ${coil}${inUse ? ', in use' : ''}`,
      here: field === here,
    })),
    ...[heading, ...facts].map((words) => ({ words: words.replaceAll(' > ', ' becomes ') })),
    ...rows.map(([id = '', ...cells]) => ({
      words: `${id}: ${cells.map((cell, at) => `${titles[at + 1]} ${cell.replace(' > ', ' becomes ')}`).join(', ')}`,
    })),
    ...[...notes.slice(1), coil, attention].filter((words) => words !== '').map((words) => ({ words })),
  ];
}

function orderItems(state: State): Item[] {
  const order = timeline(state);
  const here = orderRow(state)?.id;
  return [
    ...order.rows.map((row) => {
      const { figures } = resultNow(state, row.series.id).evaluation;
      const judged = seriesVerdicts(state, row.series.id)[0];
      const words = [
        `${row.series.id}, ${studySeries(state, row.series.id).title}: ${row.series.state.replace('-', ' ')}`,
        `time ${sayTime(figures.scanTimeS ?? 0)}`,
        ...(figures.holdTimeS === null ? [] : [`${figures.holds} breath-holds of ${sayTime(figures.holdTimeS)}`]),
        ...(row.takesS > 0 ? [`running total ${sayTime(row.endsS)}`] : []),
        ...(row.beyond ? ["beyond the patient's time"] : []),
        ...(judged === undefined ? [] : [sayJudged(judged)]),
        ...(row.series.placeLocked ? ['keeps its place'] : []),
      ];
      return { words: words.join(', '), here: row.series.id === here };
    }),
    ...minimumSet(state).map(({ ids, complete }) => ({ words: `Minimum set: ${ids.join(' or ')}, ${complete ? 'complete' : 'not yet'}` })),
    { words: `Still to do ${sayTime(order.totalS)}${order.leftS === null ? '' : `, time left ${sayTime(Math.max(0, order.leftS))}`}` },
  ];
}

function seriesItems(state: State): Item[] {
  const { seriesId, pane, figure, caution } = state.place;
  const now = resultNow(state, seriesId);
  const planned = studySeries(state, seriesId).parameters;
  const cautions = sessionCautions(state, seriesId);
  const field = fieldHere(state);
  const next = nextStep(state, seriesId, field);
  const steps = [next.down, next.up].flatMap((step) =>
    step === null
      ? []
      : [
          {
            words: `Step to ${sayField(field, step.value)}: ${
              consequences(state, seriesId)
                .filter(({ key }) => sayFigure(key, step.result.evaluation.figures[key]) !== sayFigure(key, now.evaluation.figures[key]))
                .map(({ key }) => `${figureTable[key].label} ${sayFigure(key, step.result.evaluation.figures[key])}`)
                .join(', ') || 'nothing changes'
            }`,
          },
        ],
  );
  return [
    { words: `Here: ${field.label} ${sayField(field, fieldValue(field, now.parameters))}`, here: pane === 'main' },
    ...steps,
    ...next.sentences.map((words) => ({ words })),
    { words: 'Consequences against the preset:' },
    ...consequences(state, seriesId).map((row, at) => ({
      words: `${figureTable[row.key].label} ${row.value}${row.change === '' ? '' : `, ${row.change}`}${row.over ? ', OVER its limit' : ''}${row.fromReading ? ', from the scanner reading' : ''}`,
      here: pane === 'consequences' && (figure === row.key || (figure === null && at === 0)),
    })),
    ...offItems(state),
    { words: `Cautions: ${cautions.length === 0 ? 'none' : ''}` },
    ...cautions.map(({ level, text }, at) => ({
      words: `${level}: ${text}`,
      here: pane === 'cautions' && at === Math.min(caution, cautions.length - 1),
    })),
    { words: 'Parameters:' },
    ...fieldsHere(state).map((each) => {
      const [is, was] = [sayField(each, fieldValue(each, now.parameters)), sayField(each, fieldValue(each, planned))];
      return { words: `${each.label}: ${is}${is === was ? '' : `, preset ${was}`}` };
    }),
  ];
}

/** How far predictions have been off on this scanner. */
function offItems(state: State): Item[] {
  return residualsOf(state, state.place.seriesId).map((words) => ({ words: `Off so far here: ${words}` }));
}

function waysItems(state: State): Item[] {
  const { seriesId } = state.place;
  const here = wayHere(state);
  const moves = otherMovesInWords(state);
  return [
    { words: searchStatus(state).words, here: here === null },
    ...searchNotes(state).map((words) => ({ words })),
    ...shownWays(state).flatMap((listed, at): Item[] => {
      const isHere = here?.number === at + 1;
      const title = `Way ${at + 1}, ${wayTitle(state, listed)}: ${wayVerdict(state, listed).text}`;
      return [
        { words: title, here: isHere },
        ...(isHere ? wayParagraphs(listed, state.search?.problem ?? null).map(({ words }) => ({ words })) : []),
      ];
    }),
    ...(here !== null && here.number === null
      ? [
          { words: `The way looked at last: ${verdictWith(state, seriesId, here.listed.way.given).text}`, here: true },
          ...wayParagraphs(here.listed, null).map(({ words }) => ({ words })),
        ]
      : []),
    ...(moves === null ? [] : [{ words: moves }]),
    { words: `k keeps ${keptInWords(state).join(', ')}` },
  ];
}

function frontItems(state: State): Item[] {
  const point = frontPoint(state);
  if (point === null) return [{ words: 'No front is known' }];
  return [
    { words: `Point ${point.at + 1} of ${point.count}: ${point.words}, ${point.verdict.text}`, here: true },
    { words: `Change: ${point.changes}` },
    { words: `Against the preset: ${point.moved}` },
  ];
}

function budgetItems(state: State): Item[] {
  const here = plannedHere(state)?.series.id;
  return [
    ...planInWords(state).map(({ words }) => ({ words })),
    ...planRows(state).map(({ planned, totalS }) => ({
      words: `${planned.choice}: ${plannedInWords(planned)}${totalS === null ? '' : `, time ${sayTime(planned.timeS)}, running total ${sayTime(totalS)}`}`,
      here: planned.series.id === here,
    })),
  ];
}

function chartItems(state: State): Item[] {
  const chart = rangeChart(state);
  if (chart === null) return [{ words: 'No range of numbers here' }];
  const { points, cursor, now, field, figures } = chart;
  return points.map((point, at) => ({
    words: `${field.label} ${sayField(field, point.value)}${at === now ? ', as now' : ''}: ${figures.map((key) => `${figureTable[key].label} ${sayFigure(key, point.figures[key])}`).join(', ')}${point.over ? ', OVER' : ''}`,
    here: at === cursor,
  }));
}
