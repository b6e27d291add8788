import { pausesOf } from '../calc/time.js';
import type { PlannedSeries } from '../search/budget.js';
import { scannerNow } from './equipment.js';
import { planHere } from './hands/budget-commands.js';
import { resultNow } from './results.js';
import { sayTime } from './say-time.js';
import { sayVerdict } from './say-verdict.js';
import { changesInWords, tradesInWords } from './say-way.js';
import type { State } from './state.js';

/** One series of a plan with the running total, s; null where it is skipped. */
export interface PlanRow {
  readonly planned: PlannedSeries;
  /** Time of the series as it stands, rests between its breath-holds included, as in the plan, s. */
  readonly nowS: number;
  readonly totalS: number | null;
}

/** The plan that is looked at, line by line. Preparation counts for every series that is acquired. */
export function planRows(state: State): readonly PlanRow[] {
  const overheadS = state.plan?.answer?.overheadS ?? 0;
  const scanner = scannerNow(state);
  const preparationS = scanner === null ? 0 : pausesOf(scanner).preparationS;
  let totalS = 0;
  return planHere(state).map((planned) => {
    const { tableTimeS } = resultNow(state, planned.series.id).evaluation.figures;
    const nowS = Math.max(0, (tableTimeS ?? 0) - preparationS);
    if (planned.choice === 'skipped') return { planned, nowS, totalS: null };
    totalS += planned.timeS + overheadS;
    return { planned, nowS, totalS };
  });
}

/** What a series of a plan changes or gives up, in words. */
export function plannedInWords({ choice, changes, series, gives }: PlannedSeries): string {
  if (choice === 'skipped') return `${series.id} is given up: ${series.title}`;
  if (choice === 'as it is') return `${series.id} stays as it is: ${series.title}`;
  return `${series.id}: ${changesInWords({ changes })}. Gives up: ${tradesInWords(gives)}`;
}

/** What a plan comes to: total and verdict, what is given up, what of the minimum set is missing, the other plan. */
export function planInWords(state: State): readonly { readonly words: string; readonly level: 'plain' | 'attention' | 'trouble' }[] {
  const { plan } = state;
  if (plan === null) return [{ words: 'No plan yet', level: 'plain' }];
  if (plan.trouble !== null) return [{ words: plan.trouble, level: 'trouble' }];
  const { answer } = plan;
  if (answer === null) return [{ words: 'The plan is worked out; Esc leaves it', level: 'plain' }];
  const { verdict, missing, alternative } = answer;
  const ofOther = plan.other && alternative !== null;
  const totalS = ofOther ? alternative.totalS : answer.totalS;
  const rows = planHere(state);
  const skipped = rows.filter(({ choice }) => choice === 'skipped').map(({ series }) => series.id);
  const others = ofOther ? answer.plan : (alternative?.plan ?? null);
  return [
    {
      words: `Together ${sayTime(totalS)} of ${sayTime(verdict.limit)}: ${ofOther ? `${sayTime(Math.max(0, verdict.limit - totalS))} to spare` : sayVerdict(verdict)}`,
      level: verdict.word === 'OVER' ? 'trouble' : verdict.word === 'TOO CLOSE' ? 'attention' : 'plain',
    },
    ...(missing.length === 0
      ? []
      : [
          {
            words: `The minimum set does not fit: ${missing.map((item) => (typeof item === 'string' ? item : item.join(' or '))).join(', ')} left out`,
            level: 'trouble' as const,
          },
        ]),
    { words: skipped.length === 0 ? 'No series is given up' : `Given up: ${skipped.join(', ')}`, level: 'plain' },
    ...(others === null
      ? []
      : [
          {
            words: `Nearly as much is kept this way (n): ${
              others
                .filter(({ choice }) => choice !== 'as it is')
                .map((one) => `${one.series.id} ${one.choice === 'shortened' ? `shortened to ${sayTime(one.timeS)}` : one.choice}`)
                .join('; ') || 'everything as it is'
            }`,
            level: 'plain' as const,
          },
        ]),
  ];
}
