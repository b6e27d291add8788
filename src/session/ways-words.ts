import type { GivenParameters } from '../calc/series.js';
import { otherMoves } from '../search/other-moves.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { Change } from '../search/way.js';
import { changedKeys } from './changed-keys.js';
import { consequences } from './consequences.js';
import { resultNow, sessionSeries, studySeries } from './results.js';
import { bindingInWords, bindingsInWords, changesInWords, exactInWords, kindWords, tradesInWords } from './say-way.js';
import { pairedSeries } from './set-field.js';
import type { State } from './state.js';
import { missingReadings, sayJudgedAlone, seriesVerdicts } from './verdicts.js';
import { firstWays, type ListedWay, listedWays, stateWith } from './ways.js';

/** What stands over the list: how far the search is, or what it found and whether that is proven. */
export function searchStatus(state: State): { readonly words: string; readonly level: 'plain' | 'attention' | 'trouble' } {
  const { search, allWays, place } = state;
  if (search === null || search.seriesId !== place.seriesId) return { words: 'No search yet', level: 'plain' };
  if (search.trouble !== null) return { words: search.trouble, level: 'trouble' };
  const { answer } = search;
  if (answer === null) {
    const share = search.share === null ? '' : ` ${Math.round(search.share * 100)} %`;
    return { words: `Searching${share}; Esc ends it with what it has`, level: 'plain' };
  }
  const { ways, proven } = answer.result;
  const doubt = proven ? '' : '. NOT PROVEN: stopped, a better one may exist';
  const known = answer.nothing === null ? null : bindingsInWords(answer.nothing);
  if (ways.length === 0)
    return proven
      ? { words: known === null ? 'Nothing fits.' : `Nothing fits. ${known}`, level: 'trouble' }
      : { words: 'Stopped before anything was found. NOT PROVEN: a way may exist', level: 'attention' };
  const count = listedWays(answer).length;
  const few = count > firstWays && !allWays ? `, the first ${firstWays}; m shows all` : '';
  return {
    words: `${count} way${count > 1 ? 's' : ''}${few}${doubt === '' ? '. Proven: none is better' : doubt}`,
    level: proven ? 'plain' : 'attention',
  };
}

/** What limits the search, where that needs saying: caps without a reading, no limit at all, contrast given. */
export function searchNotes(state: State): readonly string[] {
  const { place, search } = state;
  const { seriesId } = place;
  const series = studySeries(state, seriesId);
  const pairs = pairedSeries(state, seriesId).map(({ id }) => id);
  const limits = search?.seriesId === seriesId ? search.problem.limits : null;
  const unread = missingReadings(state, sessionSeries(state, seriesId));
  return [
    ...unread.map((cap) => `${cap} is not searched for: type the scanner's number (d)`),
    // A cap that waits for its reading is limit enough to speak of.
    ...(limits !== null && Object.keys(limits).length === 0 && unread.length === 0
      ? ['No limit binds this series: everything within what is kept fits']
      : []),
    ...(state.session?.contrastAtMs !== null && series.purpose === 'dynamic'
      ? ['Contrast is given: the volumes before it cannot be acquired again, so this series stays as it is']
      : []),
    ...(pairs.length > 0 ? [`What changes here changes in ${pairs.join(', ')} too`] : []),
  ];
}

/** What else the trade does, as words. */
export function otherMovesInWords(state: State): string | null {
  const { search } = state;
  if (search?.answer == null || search.seriesId !== state.place.seriesId) return null;
  const moves = otherMoves(search.problem);
  if (moves.length === 0) return null;
  return `${search.answer.result.ways.length === 0 ? 'What else is done' : 'Before rewriting'}: ${moves.join('; ')}.`;
}

/** The questions that a way answers best; where nothing fits, what it would need. */
export function wayTitle(state: State, { kinds, binding, way }: ListedWay): string {
  if (kinds.length > 0) return kinds.map((kind) => kindWords[kind]).join(', ');
  if (binding === null || state.search === null) return way.verdict === 'OVER' ? 'nearest' : 'looked at last';
  return bindingInWords(binding, state.search.problem).replace(/^What binds: (.*)\.$/, '$1');
}

/** The verdict of a series with some values set, in words. */
export function verdictWith(state: State, id: string, set: GivenParameters): { readonly word: string | null; readonly text: string } {
  const judged = seriesVerdicts(stateWith(state, id, set), id)[0];
  return judged === undefined ? { word: null, text: 'no limit' } : { word: judged.verdict.word, text: sayJudgedAlone(judged) };
}

/** The verdict of a way of the list; one that needs more than what is kept says so. */
export function wayVerdict(state: State, { way, binding }: ListedWay): { readonly word: string | null; readonly text: string } {
  const verdict = verdictWith(state, state.place.seriesId, way.given);
  if (binding === null || verdict.word === 'OVER') return verdict;
  const crosses = binding.binders.some(({ kind }) => kind === 'must keep') ? 'crosses a must-keep' : 'beyond what is kept';
  return { word: 'TOO CLOSE', text: `${verdict.word ?? 'FITS'}, ${crosses}` };
}

/** Everything that there is to say about a way, a paragraph each. */
export function wayParagraphs(
  { way, binding }: ListedWay,
  problem: SearchProblem | null,
): readonly { readonly words: string; readonly level: 'plain' | 'caution' | 'error' }[] {
  const plain = (words: string) => ({ words, level: 'plain' as const });
  return [
    ...(binding === null || problem === null ? [] : [plain(bindingInWords(binding, problem))]),
    plain(`Change: ${changesInWords(way)}`),
    plain(`Gives up: ${tradesInWords(way.gives)}`),
    plain(`Gains: ${tradesInWords(way.gains)}`),
    ...exactInWords(way).map(plain),
    ...way.cautions.flatMap(({ level, text }) => (level === 'note' ? [] : [{ words: `${level}: ${text}`, level }])),
    ...way.cautions.filter(({ code }) => code === 'timing-carried').map(({ text }) => plain(`follows: ${text}`)),
  ];
}

/** The changes that some set values are, against the preset. */
export function setInWords(state: State, id: string, set: GivenParameters): string {
  const planned = studySeries(state, id).parameters;
  const { parameters } = resultNow(stateWith(state, id, set), id);
  // A split that follows is named like one that was set.
  const keys = changedKeys(planned, parameters).filter((key) => set[key] !== undefined || key === 'rounds');
  const changes = Object.fromEntries(keys.map((key): [string, Change] => [key, { from: planned[key] ?? null, to: parameters[key] }]));
  return changesInWords({ changes });
}

/** What some set values do to the figures, against the preset, in one line. */
export function movedInWords(state: State, id: string, set: GivenParameters): string {
  const moved = consequences(stateWith(state, id, set), id).filter(({ change }) => change !== '' && change !== '0 %');
  return moved.length === 0 ? 'nothing moves' : moved.map(({ label, change }) => `${label} ${change}`).join(', ');
}
