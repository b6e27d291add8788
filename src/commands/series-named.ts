import { cleanText } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import type { Study, StudySeries } from '../study/study.js';
import { type Attempt, refuse } from './attempt.js';
import { exitCodes } from './exit-codes.js';

/** The series of a study with this id; without one the nearest id, or all there are, exit code 66. */
export function seriesNamed(study: Study, wanted: string): Attempt<StudySeries> {
  const found = study.series.find(({ id }) => id === wanted);
  if (found !== undefined) return { ok: true, value: found };
  const ids = study.series.map(({ id }) => id);
  const near = nearestWord(wanted, ids);
  return refuse(exitCodes.noInput, {
    code: 'series-not-there',
    path: wanted,
    message: `There is no series "${cleanText(wanted, 60)}" in preset ${study.id}.`,
    hint: near === null ? `Its series: ${ids.join(', ')}.` : `Did you mean ${near}?`,
  });
}
