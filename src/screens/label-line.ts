import { labelSentence } from '../session/patient-form.js';
import type { ScreenName, State } from '../session/state.js';
import { type Line, line } from './line.js';
import type { Look } from './look.js';
import { wholeItems } from './whole-items.js';

/** Screens on which something is judged or chosen under a cap. This patient's own says it itself. */
const underCaps: ReadonlySet<ScreenName> = new Set([
  'order',
  'series',
  'why',
  'type-these',
  'chart',
  'picture',
  'ways',
  'front',
  'keep',
  'budget',
  'readings',
  'record',
]);

/** The label's other conditions, as long as an RF cap is used: a cap alone is not the label. */
export function labelLine(state: State, columns: number, { glyphs }: Look): Line[] {
  const limits = state.session?.limits;
  if (limits === undefined || (limits.b1rmsCapUt === null && limits.sarCapWkg === null)) return [];
  if (!underCaps.has(state.place.screen)) return [];
  const { labelConditions } = limits;
  const words =
    labelConditions.length === 0
      ? labelSentence(limits)
      : wholeItems('Label: ', labelConditions, '. Not typed: unknown.', { columns, key: 'p', ellipsis: glyphs.ellipsis });
  return [line(words, 'attention')];
}
