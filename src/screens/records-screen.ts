import { recordRow, recordRows } from '../session/record-rows.js';
import type { RecordRow } from '../session/shelf.js';
import type { State } from '../session/state.js';
import { reasonWords } from '../study/record-reasons.js';
import { fitText } from '../terminal/text-width.js';
import { blank, fill, type Line, line, span, windowOf } from './line.js';
import type { Look } from './look.js';
import { shareBar } from './share-bar.js';

/** The records, newest first: find by typing, Enter shows one. */
export function recordsScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const list = recordRows(state);
  const here = recordRow(state);
  const reading = state.shelf.list;
  const typed: Line = [span('Type to find: '), span(state.shelf.typed, 'bold'), { text: ' ', style: 'inverse', cursor: true }];
  const head: Line[] = [
    typed,
    line('Period, preset, region, role, reason: liver 2026-01..2026-03 pain', 'quiet'),
    blank,
    line(`  ${'day'.padEnd(12)}${'preset'.padEnd(20)}${'rev'.padStart(3)}  ${'rewritten'.padEnd(11)}${'role'.padEnd(14)}reasons`, 'quiet'),
  ];
  const notes = (reading?.read?.notes ?? []).slice(0, 2).map((words) => line(fitText(words, columns, look.glyphs.ellipsis), 'trouble'));
  const shown = windowOf(list, Math.max(0, here === undefined ? 0 : list.indexOf(here)), rows - head.length - notes.length);
  const body = shown.items.map((row): Line => {
    const isHere = row === here;
    const text = fitText(`${isHere ? look.glyphs.pointer : ' '} ${recordWords(row, look)}`, columns, look.glyphs.ellipsis);
    return [isHere ? { text, style: 'inverse' } : span(text)];
  });
  if (reading !== null && reading.read === null)
    body.push(...shareBar(reading.share, look, columns), line(reading.trouble ?? '  Esc stops the reading and shows what was read'));
  else if (list.length === 0) body.push(line('  No record matches; Backspace takes a letter back'));
  return [...fill([...head, ...body], rows - notes.length), ...notes];
}

function recordWords({ day, preset, revision, rewritten, series, role, reasons }: RecordRow, { glyphs }: Look): string {
  const count = `${rewritten} of ${series}`;
  return `${(day ?? '-').padEnd(12)}${fitText(preset, 20, glyphs.ellipsis)}${String(revision).padStart(3)}  ${count.padEnd(11)}${fitText(role, 13, glyphs.ellipsis)} ${reasons.map(reasonWords).join(', ')}`;
}
