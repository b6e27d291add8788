import { carryHeadline, isCarrying } from '../session/carry.js';
import { entryKeys, keyMap } from '../session/key-map.js';
import { holdClock, runningSeries } from '../session/running.js';
import { sayClock } from '../session/say-number.js';
import { sayTime } from '../session/say-time.js';
import { isShelfScreen, shelfHeadline } from '../session/shelf-headline.js';
import type { ScreenName, State } from '../session/state.js';
import { type Headline, seriesHeadline, sessionHeadline } from '../session/verdicts.js';
import { fitText, textWidth } from '../terminal/text-width.js';
import { fitLine, type Line, lineWidth, type Span, type Style, span, wrap } from './line.js';
import type { Look } from './look.js';

const headlineStyle: Readonly<Record<string, Style>> = { OVER: 'trouble', 'TOO CLOSE': 'attention', FITS: 'bold' };

const ofSeries: readonly ScreenName[] = ['series', 'why', 'type-these', 'chart', 'picture', 'ways', 'front', 'keep', 'readings'];

/** The verdict of the present screen: of the series that is looked at, else of the session. */
export function headlineOf(state: State): Headline {
  const { screen, seriesId } = state.place;
  // While a session is open its verdict stays in sight, but not where something is released.
  if (isShelfScreen(screen) && (state.session === null || screen === 'release')) return { word: null, text: shelfHeadline(state) };
  if (isCarrying(state)) return { word: null, text: carryHeadline(state) };
  if (screen === 'scanner' && state.session === null) return { word: null, text: 'Choose a scanner and a coil' };
  return ofSeries.includes(screen) && state.session !== null ? seriesHeadline(state, seriesId) : sessionHeadline(state);
}

/** The first line: the verdict in words. */
export function headlineLine(state: State, look: Look, columns: number): Line {
  const { word, text } = headlineOf(state);
  const verdict: Line =
    word === null
      ? [span(text, 'bold')]
      : [span(word, headlineStyle[word] ?? 'bold'), span(text.startsWith(word) ? text.slice(word.length) : `  ${text}`, 'bold')];
  return fitLine(verdict, columns, look.glyphs.ellipsis);
}

/** A line with something at its right end. */
export function withRight(left: Line, right: string, columns: number, look: Look, style: Style = 'bold'): Line {
  if (right === '') return fitLine(left, columns, look.glyphs.ellipsis);
  const room = columns - textWidth(right) - 1;
  return [...fitLine(left, room, look.glyphs.ellipsis), span(' '), span(right, style)];
}

/** The clocks that run: the present breath-hold, the contrast, the patient's time. */
export function clockWords(state: State): string {
  const running = runningSeries(state);
  const clock = running === null ? null : holdClock(state, running);
  const words: string[] = [];
  if (running !== null && clock !== null) {
    const which = clock.hold === null ? '' : ` hold ${clock.hold}/${clock.holds}`;
    words.push(`${running.id}${which} ${clock.counting ? sayTime(clock.leftS) : clock.leftS === 0 ? 'over' : 'waits'}`);
  }
  if (state.session?.contrastAtMs != null) words.push(`contrast ${sayClock((state.nowMs - state.session.contrastAtMs) / 1000)}`);
  return words.join('  ');
}

/** What was just said; or what is being typed. */
export function noticeLine(state: State, look: Look, columns: number, idle: Line): Line {
  const { entry, notice } = state;
  if (entry !== null) {
    const problem = notice === null ? [] : [span(`  ${notice.words}`, notice.level === 'trouble' ? 'trouble' : 'quiet')];
    return fitLine(
      [
        span(entry.ask === null ? 'type: ' : 'reading: '),
        span(endOf(entry.text, columns - 12, look)),
        { text: ' ', style: 'plain', cursor: true },
        ...problem,
      ],
      columns,
      look.glyphs.ellipsis,
    );
  }
  if (notice !== null)
    return fitLine([span(notice.words, notice.level === 'trouble' ? 'trouble' : 'plain')], columns, look.glyphs.ellipsis);
  return fitLine(idle, columns, look.glyphs.ellipsis);
}

/** The end of a long text, where the hand is. */
function endOf(text: string, columns: number, { glyphs }: Look): string {
  if (textWidth(text) <= columns) return text;
  const backward = fitText([...text].reverse().join(''), columns, glyphs.ellipsis);
  return [...backward].reverse().join('');
}

/** What was said and has no room on its line, whole; nothing where it has. While something is typed there is little room. */
export function longNotice({ entry, notice }: State, columns: number): Line[] {
  if (notice === null || (entry === null && textWidth(notice.words) <= columns)) return [];
  return wrap(notice.words, columns).map((words) => [span(words, notice.level === 'trouble' ? 'trouble' : 'bold')]);
}

/** What must not be pushed out of the bottom line by the others; equals keep the order of the map. */
function rank(brief: string): number {
  if (brief === 'help') return 0;
  if (
    [
      'step',
      'type',
      'open',
      'start',
      'done',
      'change',
      'practice',
      'cut short',
      'save',
      'reasons',
      'take',
      'fit',
      'budget',
      'more',
      'compare',
      'revisions',
      'show',
      'report',
      'review',
      'pick',
    ].includes(brief)
  )
    return 1;
  if (brief === 'undo') return 2;
  if (brief === 'patient') return 3;
  // Seldom wanted in a hurry: where the line is wide enough.
  if (['on scanner', 'to field'].includes(brief)) return 6;
  return ['redo', 'order', 'end', 'quit', 'back'].includes(brief) ? 5 : 4;
}

/** The keys that work here and now, from the key map; what does not fit is under help. */
export function keyLine(state: State, look: Look, columns: number): Line {
  const rows =
    state.entry === null
      ? keyMap[state.place.screen].filter(({ brief, when }) => brief !== '' && (when === undefined || when(state)))
      : entryKeys;
  const parts: Span[] = [];
  const shown = [...rows].sort((a, b) => rank(a.brief) - rank(b.brief));
  for (const { shown: keys, brief } of shown) {
    const next = [...parts, span(parts.length === 0 ? keys : `  ${keys}`, 'bold'), span(` ${brief}`, 'quiet')];
    if (lineWidth(next) > columns) break;
    parts.splice(0, parts.length, ...next);
  }
  return fitLine(parts, columns, look.glyphs.ellipsis);
}
