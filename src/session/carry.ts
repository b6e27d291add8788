import { plainScanner, type Scanner } from '../calc/scanner.js';
import { type CarryAim, carryFields, type SeriesCarry } from '../search/carry.js';
import { type CarryProblem, canCarry, type StudyCarry } from '../search/carry-study.js';
import type { Rules } from '../study/must-keep.js';
import { scannerOf } from '../study/scanner-file.js';
import type { Study } from '../study/study.js';
import { type Change, only } from './change.js';
import { choiceOf, chosenScanner, type ScannerChoice, sayChoice } from './equipment.js';
import type { Effect } from './message.js';
import { fieldStrengths } from './start-list.js';
import type { State } from './state.js';

/** Where a preset is carried to: a field in tesla, or a scanner with one of its coils. */
export type CarryTarget = { readonly fieldT: number } | { readonly choice: ScannerChoice };

/** A preset that is carried, and what is looked at of it. */
export interface CarryView {
  /** As its file has it. */
  readonly filed: Study;
  /** As it is judged: with what the site keeps. */
  readonly study: Study;
  /** Its rules; null while they are read. */
  readonly rules: Rules | null;
  readonly target: CarryTarget;
  readonly aim: CarryAim;
  readonly seriesId: string;
  /** What comes out for this target and this aim; null while it is worked out. */
  readonly carried: StudyCarry | null;
  /** Why nothing comes out. */
  readonly trouble: string | null;
}

/** What is held equal, in words. */
export const aimWords: Readonly<Record<CarryAim, string>> = {
  contrast: 'contrast ratio',
  snr: 'SNR',
  shift: 'chemical shift',
  time: 'time',
};

/** A target in words: `3 T`, or the scanner, its coil and its field. */
export function sayTarget(target: CarryTarget): string {
  return 'fieldT' in target ? `${target.fieldT} T` : sayChoice(target.choice);
}

/** The targets that left and right go through: the fields of the presets, then the scanners, within the fields that the sources reach. */
export function carryTargets(state: State): readonly CarryTarget[] {
  const fields = fieldStrengths(state).filter(canCarry);
  const scanners = state.scanners.filter(({ fieldT }) => canCarry(fieldT));
  return [...fields.map((fieldT) => ({ fieldT })), ...scanners.map((file) => ({ choice: choiceOf(file, null) }))];
}

/** Where a study is carried at first: the chosen scanner where that has another field, else the next field above, else below. */
export function firstTarget(state: State, study: Study): CarryTarget {
  const chosen = chosenScanner(state);
  const { file } = chosen;
  if (file !== null && canCarry(file.fieldT) && Math.abs(file.fieldT - study.fieldT) > 0.05 * study.fieldT) return { choice: chosen };
  const others = fieldStrengths(state).filter((fieldT) => canCarry(fieldT) && fieldT !== study.fieldT);
  return { fieldT: others.find((fieldT) => fieldT > study.fieldT) ?? others.at(-1) ?? (study.fieldT < 2 ? carryFields.max : 1.5) };
}

function scannerAt(target: CarryTarget, study: Study): Scanner {
  if ('fieldT' in target) return plainScanner(target.fieldT);
  const { file, coil } = target.choice;
  return file === null ? plainScanner(study.fieldT) : scannerOf(file, coil, study.region);
}

/** Asks for what the screen shows and does not have yet. One worker does one thing: what is on its way gives way. */
export function keepCarrying(state: State): Change {
  const { carry, place, open } = state;
  if (carry === null || place.screen !== 'carry' || open.carry !== undefined) return only(state);
  const { study, rules, target, aim, carried, trouble } = carry;
  if (rules === null || carried !== null || trouble !== null) return only(state);
  const ask = state.asks + 1;
  const { search, plan, ...others } = open;
  const problem: CarryProblem = {
    carry: study,
    circumstances: { from: plainScanner(study.fieldT), to: scannerAt(target, study), aim, rules },
  };
  const next: State = {
    ...state,
    asks: ask,
    open: { ...others, carry: ask },
    search: search === undefined ? state.search : null,
    plan: plan === undefined ? state.plan : null,
  };
  return [next, [{ kind: 'carry', ask, problem } satisfies Effect]];
}

/** The carry screen with another target, aim or study: what was worked out before counts no more. */
export function withCarry(state: State, carry: CarryView): State {
  const { carry: _before, ...open } = state.open;
  return { ...state, open, carry: { ...carry, carried: null, trouble: null } };
}

/** The series that is looked at; null while nothing is worked out. */
export function seriesCarry({ carry }: State): SeriesCarry | null {
  const series = carry?.carried?.series ?? [];
  return series.find((one) => one.series.id === carry?.seriesId) ?? series[0] ?? null;
}

/** The first line of the carry screen, and of what is opened from it. */
export function carryHeadline({ carry }: State): string {
  if (carry === null) return 'Nothing is carried';
  const { study, target, aim, carried, trouble } = carry;
  const what = `${study.id}, ${study.fieldT} T to ${sayTarget(target)}, equal ${aimWords[aim]}`;
  if (trouble !== null) return `NOT CARRIED: ${what}`;
  if (carried === null) return `BEING WORKED OUT: ${what}`;
  const incomplete = carried.series.filter(({ gaps }) => gaps.length > 0).length;
  return incomplete === 0 ? `PROPOSAL: ${what}` : `PROPOSAL, ${incomplete} of ${carried.series.length} series not in full: ${what}`;
}

/** True on the carry screen, and where *why* or help were opened from it. */
export function isCarrying({ place, carry }: State): boolean {
  return carry !== null && (place.screen === 'carry' || (['why', 'help'].includes(place.screen) && place.back.at(-1) === 'carry'));
}
