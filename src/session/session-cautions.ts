import { type Caution, worstFirst } from '../calc/caution.js';
import { changedKeys } from './changed-keys.js';
import { endedReadings } from './ended-readings.js';
import { resultNow, studySeries } from './results.js';
import type { State } from './state.js';

/** The cautions of a series as it stands in this session, worst first: after contrast nothing asks to repeat what came before. */
export function sessionCautions(state: State, id: string): readonly Caution[] {
  const { cautions: own, parameters } = resultNow(state, id);
  const ended = endedReadings(state, id);
  const cautions = ended.length === 0 ? own : worstFirst([...ended, ...own]);
  const series = studySeries(state, id);
  const given = state.session?.limits.contrastGiven === true;
  if (!given || series.purpose !== 'dynamic') return cautions;
  const kept = cautions.filter(({ code }) => code !== 'phases-must-match');
  if (changedKeys(series.parameters, parameters).length === 0) return kept;
  const text = 'contrast is given: a volume with changed values no longer matches the ones before it, and those cannot be acquired again';
  return worstFirst([{ code: 'phases-must-match', level: 'caution', text, numbers: {} }, ...kept]);
}
