import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { classOf, fillDefaults, type GivenParameters, type Parameters } from '../calc/series.js';
import { requiredParameters } from './required-keys.js';
import type { MustKeep, Release, Study, StudySeries } from './study.js';

/** Equal values of parameters: numbers, words, flags, or small plain objects. */
function equalValues(a: unknown, b: unknown): boolean {
  return a === b || (typeof a === 'object' && typeof b === 'object' && JSON.stringify(a) === JSON.stringify(b));
}

/**
 * Parameters without those that a reader fills in again: what is required, and what differs from the defaults of table and class.
 * A train length that follows from the lines is left out as well. The order is that of the table.
 */
export function givenOf(series: Pick<StudySeries, 'family' | 'acquisition' | 'parameters'>): GivenParameters {
  const key = classOf(series);
  const required = requiredParameters(key);
  const all = series.parameters;
  const filled: Parameters = fillDefaults(key, { ...all, echoTrainLength: undefined } as unknown as GivenParameters);
  const plain = fillDefaults(key, {});
  const given: Record<string, unknown> = {};
  for (const name of parameterKeys) {
    const value = all[name];
    const otherwise = name === 'echoTrainLength' ? filled[name] : plain[name];
    if (value === undefined || (!required.includes(name) && equalValues(value, otherwise))) continue;
    given[name] = parameterRow(name).kind === 'object' ? objectInOrder(name, value) : value;
  }
  return given as GivenParameters;
}

/** Inner keys in one order, absent ones left out. */
function objectInOrder(name: ParameterKey, value: unknown): unknown {
  const order = name === 'pacing' ? ['kind', 'periodMs', 'windowMs', 'breathHold'] : ['bValuesSPerMm2', 'directions', 'averages'];
  const from = value as Record<string, unknown>;
  return Object.fromEntries(order.flatMap((key) => (from[key] === undefined ? [] : [[key, from[key]]])));
}

const mustKeepOrder = ['figure', 'parameter', 'rule', 'atMost', 'atLeast', 'between', 'when', 'source'] as const;

function mustKeepInOrder(mustKeep: MustKeep): object {
  return Object.fromEntries(mustKeepOrder.flatMap((key) => (mustKeep[key] === undefined ? [] : [[key, mustKeep[key]]])));
}

function releaseInOrder({ role, secondRole, day, reason }: Release): object {
  return { role, ...(secondRole === undefined ? {} : { secondRole }), day, reason };
}

/** Drops empty lists and objects. */
function unlessEmpty(key: string, value: object): object {
  return Object.keys(value).length === 0 ? {} : { [key]: value };
}

function seriesFile(series: StudySeries): object {
  return {
    id: series.id,
    title: series.title,
    plane: series.plane,
    ...(series.purpose === null ? {} : { purpose: series.purpose }),
    priority: series.priority,
    family: series.family,
    acquisition: series.acquisition,
    target: series.target,
    comparison: series.comparison,
    ...(series.contrastAgent ? { contrastAgent: true } : {}),
    ...(series.nullTissue === null ? {} : { nullTissue: series.nullTissue }),
    ...unlessEmpty('tissueOverrides', series.tissueOverrides),
    parameters: givenOf(series),
    ...unlessEmpty('ranges', series.ranges),
    ...unlessEmpty('mustKeep', series.mustKeep.map(mustKeepInOrder)),
    ...unlessEmpty('pairedWith', series.pairedWith),
    ...unlessEmpty('locked', series.locked),
    ...unlessEmpty('opened', series.opened),
  };
}

/** Longest value that stands on one line. */
const lineLength = 180;

/** JSON with two spaces; a list or object that holds no list or object of objects, and is short, stands on one line. */
function laidOut(value: unknown, indent: string, open: boolean): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const inner = Object.values(value);
  const flat =
    !open &&
    inner.every((item) => typeof item !== 'object' || item === null || (Array.isArray(item) && item.every((x) => typeof x !== 'object')));
  if (flat) {
    const line = Array.isArray(value)
      ? `[${inner.map((item) => JSON.stringify(item)).join(', ')}]`
      : `{ ${Object.entries(value)
          .map(([key, item]) => `${JSON.stringify(key)}: ${laidOut(item, '', false)}`)
          .join(', ')} }`;
    if (line.length <= lineLength || inner.length === 0) return inner.length === 0 ? (Array.isArray(value) ? '[]' : '{}') : line;
  }
  const deeper = `${indent}  `;
  const lines = Array.isArray(value)
    ? value.map((item) => laidOut(item, deeper, false))
    : Object.entries(value).map(([key, item]) => `${JSON.stringify(key)}: ${laidOut(item, deeper, key === 'parameters')}`);
  const [left, right] = Array.isArray(value) ? '[]' : '{}';
  return `${left}\n${deeper}${lines.join(`,\n${deeper}`)}\n${indent}${right}`;
}

/**
 * A study as the text of a preset file: keys in one order, only the parameters that a reader does not fill in by itself, two spaces.
 * `readPreset(writePreset(study))` gives the same study.
 *
 * @example writePreset(study).startsWith('{\n  "format": "holdfast preset"') //=> true
 */
export function writePreset(study: Study): string {
  const file = {
    format: study.format,
    version: study.version,
    id: study.id,
    title: study.title,
    region: study.region,
    fieldT: study.fieldT,
    status: study.status,
    revision: study.revision,
    ...(study.released === undefined ? {} : { released: releaseInOrder(study.released) }),
    notes: study.notes,
    minimumSet: study.minimumSet,
    series: study.series.map(seriesFile),
  };
  return `${laidOut(file, '', true)}\n`;
}
