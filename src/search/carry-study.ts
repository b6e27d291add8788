import { type ParameterKey, parameterKeys } from '../calc/parameters.js';
import type { Scanner } from '../calc/scanner.js';
import type { Parameters } from '../calc/series.js';
import type { Range, Study, StudySeries } from '../study/study.js';
import { type CarryAim, type CarryGap, carryFields, type SeriesCarry } from './carry.js';
import { type CarryCircumstances, carrySeries } from './carry-series.js';
import { digits } from './carry-words.js';

/** A study at another field: a proposal, series by series, and what holds for all of it. */
export interface StudyCarry {
  readonly study: Study;
  readonly from: Scanner;
  readonly to: Scanner;
  readonly aim: CarryAim;
  readonly series: readonly SeriesCarry[];
  readonly gaps: readonly CarryGap[];
}

/** Everything that a study is carried with: plain data, so that it can be handed to a worker. */
export interface CarryProblem {
  /** The study, as it is judged. */
  readonly carry: Study;
  readonly circumstances: CarryCircumstances;
}

/** True for a field that a study may be carried from or to. */
export function canCarry(fieldT: number): boolean {
  return fieldT >= carryFields.min - 1e-9 && fieldT <= carryFields.max + 1e-9;
}

/** Carries every series of a study, in the order of the file. `canCarry` must hold for both fields. */
export function carryStudy(study: Study, circumstances: CarryCircumstances): StudyCarry {
  const { from, to, aim } = circumstances;
  const series = study.series.map((one) => carrySeries(one, circumstances));
  const gaps: CarryGap[] = [
    { what: 'scanner readings', why: 'times, B1+rms and SAR read on one scanner say nothing about another: read them anew' },
    { what: 'release', why: 'what comes out is a draft: a person reviews and releases it' },
  ];
  return { study, from, to, aim, series, gaps };
}

/** A range that still holds the carried value, or null. */
function rangeHolds(range: Range, value: unknown): boolean {
  if (!('step' in range)) return (range as readonly unknown[]).includes(value);
  return typeof value === 'number' && value >= range.min - 1e-9 && value <= range.max + 1e-9;
}

function draftSeries({ parameters }: SeriesCarry, filed: StudySeries): StudySeries {
  const ranges = Object.fromEntries(
    Object.entries(filed.ranges).filter(([key, range]) => {
      const changed = parameters[key as ParameterKey] !== filed.parameters[key as ParameterKey];
      return !changed || rangeHolds(range, parameters[key as ParameterKey]);
    }),
  );
  return { ...filed, parameters: cleaned(parameters), ranges };
}

/** Numbers of a preset file: no more than six digits after the point. */
function cleaned(parameters: Parameters): Parameters {
  const entries = parameterKeys.map((key) => {
    const value = parameters[key];
    return [key, typeof value === 'number' ? Number(value.toFixed(6)) : value] as const;
  });
  return { ...parameters, ...Object.fromEntries(entries) };
}

/** The id with its field replaced (`liver-3t` to `liver-1.5t`), or followed by the new one. */
function carriedId(id: string, fieldT: number): string {
  const field = `${digits(fieldT, 3)}t`;
  const bare = id.replace(/-\d+(\.\d+)?t$/, '');
  return bare === '' || `${bare}-${field}` === id ? `${id}-carried` : `${bare}-${field}`;
}

/** The title with its field replaced where it names one. */
function carriedTitle(title: string, fromT: number, toT: number): string {
  const [old, now] = [`${digits(fromT, 3)} T`, `${digits(toT, 3)} T`];
  return title.includes(old) ? title.replace(old, now) : `${title}, ${now}`;
}

/**
 * The carried study as a draft preset. Must-keeps are those of the preset's own file; ranges that no longer hold a carried value are left out.
 *
 * @param filed The study as its file has it, without the rules of a site.
 */
export function carriedDraft({ series, from, to, aim }: StudyCarry, filed: Study): Study {
  const where = `${filed.id} revision ${filed.revision}, ${digits(from.fieldT, 3)} T, to ${digits(to.fieldT, 3)} T`;
  const notes = `proposal, review before use: carried from ${where}, equal ${aim === 'snr' ? 'SNR' : aim}. ${filed.notes}`.trim();
  // Who released the preset said nothing about its proposal.
  const { released: _, ...plain } = filed;
  return {
    ...plain,
    id: carriedId(filed.id, to.fieldT),
    title: carriedTitle(filed.title, from.fieldT, to.fieldT),
    fieldT: to.fieldT,
    status: 'draft',
    revision: 1,
    notes: notes.slice(0, 4000),
    series: filed.series.map((one, i) => draftSeries(series[i] as SeriesCarry, one)),
  };
}
