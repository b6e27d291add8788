import { figureKeys } from '../calc/figures.js';
import { parameterKeys } from '../calc/parameters.js';
import { withSum } from './line-sum.js';
import type {
  ComparedReading,
  ComparedReadings,
  ReadingConditions,
  RecordedLimits,
  RecordedReading,
  RecordedSeries,
  RecordedValues,
  SessionRecord,
} from './record.js';
import { freeText, initialsText } from './record-text.js';

/** Rules come from presets, not from a keyboard: long ones are kept, endless ones are not. */
const maximumRuleLength = 400;

/**
 * One record as its line in the file, without line ends: keys in the order of the format, texts cleaned and cut,
 * numbers that are none written as null, `sum` last.
 */
export function recordLine(record: SessionRecord): string {
  return withSum(JSON.stringify(tidyRecord(record)));
}

/** The record as the file will give it back: texts cleaned and cut, keys in order, nothing that JSON cannot say. */
export function tidyRecord(record: SessionRecord): SessionRecord {
  return {
    format: record.format,
    version: record.version,
    id: freeText(record.id),
    tool: freeText(record.tool),
    model: freeText(record.model),
    day: record.day,
    preset: { id: freeText(record.preset.id), revision: finite(record.preset.revision) ?? 0, hash: freeText(record.preset.hash) },
    region: freeText(record.region),
    fieldT: finite(record.fieldT) ?? 0,
    scanner: freeText(record.scanner),
    coil: cleanOrNull(record.coil),
    role: freeText(record.role),
    initials: record.initials === null ? null : initialsText(record.initials),
    reasons: record.reasons.map((reason) => freeText(reason)),
    limits: tidyLimits(record.limits),
    series: record.series.map(tidySeries),
    recommendation: record.recommendation,
  };
}

function tidyLimits(limits: RecordedLimits): RecordedLimits {
  return {
    holdS: finite(limits.holdS),
    holdsAvailable: finite(limits.holdsAvailable),
    holdState: limits.holdState,
    minutesLeft: finite(limits.minutesLeft),
    longestSeriesS: finite(limits.longestSeriesS),
    b1rmsCapUt: finite(limits.b1rmsCapUt),
    b1rmsReadFrom: cleanOrNull(limits.b1rmsReadFrom),
    sarCapWkg: finite(limits.sarCapWkg),
    sarReadFrom: cleanOrNull(limits.sarReadFrom),
    labelConditions: limits.labelConditions.map((condition) => freeText(condition)),
    frontBackMm: finite(limits.frontBackMm),
    leftRightMm: finite(limits.leftRightMm),
    contrastGiven: limits.contrastGiven,
  };
}

function tidySeries(series: RecordedSeries): RecordedSeries {
  return {
    id: freeText(series.id),
    ...(series.class === undefined ? {} : { class: freeText(series.class) }),
    outcome: series.outcome,
    reason: freeText(series.reason),
    quality: series.quality,
    planned: tidyValues(series.planned),
    used: tidyValues(series.used),
    crossed: series.crossed.map(({ rule, role }) => ({ rule: freeText(rule, maximumRuleLength), role: cleanOrNull(role) })),
    readings: {
      before: tidyReading(series.readings.before),
      after: tidyReading(series.readings.after),
      ...(series.readings.compared === undefined ? {} : { compared: tidyCompared(series.readings.compared) }),
    },
  };
}

function tidyValues(values: RecordedValues): RecordedValues {
  return {
    parameters: inOrder(values.parameters, parameterKeys, sayable) as RecordedValues['parameters'],
    figures: inOrder(values.figures, figureKeys, (value) =>
      typeof value === 'number' ? finite(value) : value,
    ) as RecordedValues['figures'],
  };
}

/** Known keys in table order, then what a later program may have added; what is absent stays away. */
function inOrder(
  given: Readonly<Record<string, unknown>>,
  order: readonly string[],
  tidy: (value: unknown) => unknown,
): Record<string, unknown> {
  const keys = [...order.filter((key) => Object.hasOwn(given, key)), ...Object.keys(given).filter((key) => !order.includes(key))];
  const tidied: Record<string, unknown> = {};
  for (const key of keys) {
    const value = tidy(given[key]);
    if (value !== undefined) tidied[key] = value;
  }
  return tidied;
}

/** A parameter's value as JSON can say it; undefined, and so absent, where it cannot. */
function sayable(value: unknown): unknown {
  if (typeof value === 'number') return finite(value) ?? undefined;
  if (typeof value === 'string') return freeText(value);
  if (Array.isArray(value)) {
    const items = value.map(sayable);
    return items.includes(undefined) ? undefined : items;
  }
  if (typeof value !== 'object' || value === null) return value;
  const given = Object.entries(value).filter(([, inner]) => inner !== undefined);
  const tidied = inOrder(Object.fromEntries(given), [], sayable);
  return Object.keys(tidied).length < given.length ? undefined : tidied;
}

function tidyReading(reading: RecordedReading | null): RecordedReading | null {
  if (reading === null) return null;
  const { conditions, timeS, b1rmsUt, sarWkg, operatingMode, changedByScanner, notModelled } = reading;
  return {
    ...numberGiven('timeS', timeS),
    ...numberGiven('b1rmsUt', b1rmsUt),
    ...numberGiven('sarWkg', sarWkg),
    ...(operatingMode === undefined ? {} : { operatingMode: freeText(operatingMode) }),
    ...(changedByScanner === undefined ? {} : { changedByScanner: freeText(changedByScanner) }),
    ...(notModelled === undefined ? {} : { notModelled: notModelled.map((text) => freeText(text)) }),
    ...(conditions === undefined ? {} : { conditions: tidyConditions(conditions) }),
  };
}

function tidyConditions({ coil, fieldT, frontBackMm, leftRightMm }: ReadingConditions): ReadingConditions {
  return { coil: cleanOrNull(coil), fieldT: finite(fieldT) ?? 0, frontBackMm: finite(frontBackMm), leftRightMm: finite(leftRightMm) };
}

function tidyCompared({ before, after }: ComparedReadings): ComparedReadings {
  return {
    before: { ...comparedGiven('timeS', before.timeS), ...comparedGiven('b1rmsUt', before.b1rmsUt) },
    after: {
      ...comparedGiven('timeS', after.timeS),
      ...comparedGiven('b1rmsUt', after.b1rmsUt),
      ...comparedGiven('sarWkg', after.sarWkg),
    },
  };
}

/** The key with what was compared, or nothing where one of its numbers is none. */
function comparedGiven<K extends string>(key: K, compared: ComparedReading | undefined): { [key in K]?: ComparedReading } {
  if (compared === undefined) return {};
  const [predicted, read, ratio] = [finite(compared.predicted), finite(compared.read), finite(compared.ratio)];
  return predicted === null || read === null || ratio === null
    ? {}
    : ({ [key]: { predicted, read, ratio } } as { [key in K]: ComparedReading });
}

/** The key with its number, or nothing where no number was given. */
function numberGiven<K extends string>(key: K, value: number | undefined): { [key in K]?: number } {
  const number = finite(value ?? null);
  return number === null ? {} : ({ [key]: number } as { [key in K]: number });
}

/** JSON has neither NaN nor infinities nor a negative zero. */
function finite(value: number | null): number | null {
  return value === null || !Number.isFinite(value) ? null : value + 0;
}

function cleanOrNull(text: string | null): string | null {
  return text === null ? null : freeText(text);
}
