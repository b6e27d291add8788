import { releaseText } from '../session/difference-page.js';
import { releaseRow, releaseRows, releaseWord } from '../session/release-form.js';
import type { State } from '../session/state.js';
import { findingLine } from '../study/finding-line.js';
import { fitText } from '../terminal/text-width.js';
import { blank, fill, type Line, line, span, wrap } from './line.js';
import type { Look } from './look.js';

/** Releasing a revision: what the checks found, who was first, and the lines that are typed. */
export function releaseScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const here = releaseRow(state)?.field;
  const { glyphs } = look;
  const form = releaseRows(state).map((row): Line => {
    const isHere = row.field === here;
    const typed = isHere && state.entry !== null ? `${state.entry.text}_` : row.shown === '' ? '-' : row.shown;
    const label = `${isHere ? glyphs.pointer : ' '} ${row.label.padEnd(20)}`;
    const value = fitText(typed, Math.max(4, columns - label.length - 1), glyphs.ellipsis);
    return [
      span(label, isHere ? 'inverse' : 'plain'),
      isHere && state.entry === null
        ? { text: value, style: 'inverse', cursor: true }
        : span(value, isHere ? 'inverse' : typed === '-' ? 'quiet' : 'plain'),
    ];
  });
  const about = releaseWords(state).flatMap(({ words, style }) => wrap(words, columns).map((each) => line(each, style)));
  const room = rows - form.length - 1;
  const shown =
    about.length <= room
      ? about
      : [...about.slice(0, room - 1), line(`and ${about.length - room + 1} more lines: presets check says them all`, 'quiet')];
  return fill([...form, blank, ...shown], rows);
}

/** What stands under the form, in words. */
export function releaseWords({
  shelf,
}: State): readonly { readonly words: string; readonly style: 'plain' | 'trouble' | 'attention' | 'quiet' }[] {
  const { release } = shelf;
  if (release === null) return [{ words: 'Nothing is being released.', style: 'plain' }];
  const { taken, findings, newest, notes } = release;
  return [
    ...(taken === null
      ? []
      : [
          { words: `Somebody was first: ${releaseText(taken.theirs)}. Nothing was written.`, style: 'trouble' as const },
          { words: 'd shows what differs, t takes your changes over on top of theirs.', style: 'plain' as const },
        ]),
    ...notes.map((words) => ({ words, style: words.startsWith('changed by both') ? ('trouble' as const) : ('plain' as const) })),
    ...(findings ?? []).map((finding) => ({
      words: findingLine(finding),
      style: finding.level === 'failure' ? ('trouble' as const) : ('attention' as const),
    })),
    ...(taken === null
      ? [
          {
            words: newest === null ? 'The site has no revision of this preset yet.' : `The site has ${releaseText(newest)}.`,
            style: 'plain' as const,
          },
        ]
      : []),
    {
      words: `Everyone who reads the site's folder gets the next revision once the word ${releaseWord} is typed in full. A released revision is never changed.`,
      style: 'quiet',
    },
  ];
}
