import { type ClassKey, classKeyOf, classKeys } from '../calc/classes.js';
import { fillDefaults, type GivenParameters } from '../calc/series.js';
import { classOfHeaders } from '../headers/class-of-headers.js';
import type { CollectedSeries } from '../headers/collected-series.js';
import { valuesOfHeaders } from '../headers/read-series.js';
import { cleanText } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { readSetValues } from '../study/set-values.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandRequest } from './command-request.js';
import { exitCodes } from './exit-codes.js';

/** What a person typed for one series. */
export interface TypedForSeries {
  readonly id: string;
  readonly key: ClassKey | null;
  readonly values: GivenParameters;
}

/** Reads `--set [SERIES:]KEY=VALUE` and `--class [SERIES:]CLASS` for the series that were read; `SERIES:` may be left out where there is one. */
export function readTyped(request: CommandRequest, series: readonly CollectedSeries[]): Attempt<readonly TypedForSeries[]> {
  const ids = series.map((_, i) => `s${i + 1}`);
  const classes = new Map<string, ClassKey>();
  const entries = new Map<string, string[]>();
  for (const text of request.values('class')) {
    const split = splitEntry('--class', text, ids);
    if (!split.ok) return split;
    const [family = '', acquisition = ''] = split.value.rest.split('/');
    const key = classKeyOf(family, acquisition);
    if (key === null) {
      const near = nearestWord(split.value.rest, classKeys);
      const shown = cleanText(split.value.rest, 60);
      const hint = near === null ? `Known: ${classKeys.join(', ')}.` : `Did you mean ${near}?`;
      return wrongUse('--class', `--class takes a class such as fast-spin-echo/2D; "${shown}" was given.`, hint);
    }
    classes.set(split.value.id, key);
  }
  for (const text of request.values('set')) {
    const split = splitEntry('--set', text, ids);
    if (!split.ok) return split;
    entries.set(split.value.id, [...(entries.get(split.value.id) ?? []), split.value.rest]);
  }
  const typed: TypedForSeries[] = [];
  for (const [i, one] of series.entries()) {
    const id = ids[i] as string;
    const key = classes.get(id) ?? null;
    const values = readValues(entries.get(id) ?? [], one, key);
    if (!values.ok) return values;
    typed.push({ id, key, values: values.value });
  }
  return { ok: true, value: typed };
}

function readValues(entries: readonly string[], one: CollectedSeries, typedKey: ClassKey | null): Attempt<GivenParameters> {
  if (entries.length === 0) return { ok: true, value: {} };
  const key = typedKey ?? classOfHeaders(one).key ?? 'spin-echo/2D';
  const known = valuesOfHeaders(one, key).flatMap(({ key: name, value }) => (value === undefined ? [] : [[name, value] as const]));
  const read = readSetValues(entries, { parameters: fillDefaults(key, Object.fromEntries(known) as GivenParameters) });
  return read.ok ? read : { ok: false, exit: exitCodes.wrongUse, problems: read.problems };
}

/** `s2:averages=2` as series and rest. */
function splitEntry(option: string, text: string, ids: readonly string[]): Attempt<{ readonly id: string; readonly rest: string }> {
  const [, prefix, rest = ''] = /^(?:([A-Za-z0-9]+):)?(.*)$/s.exec(text) ?? [];
  if (prefix === undefined) {
    if (ids.length === 1) return { ok: true, value: { id: ids[0] as string, rest } };
    return wrongUse(option, `${option} needs SERIES: ${ids.length} series were read.`, `Write ${option} ${ids[0]}:${cleanText(text, 60)}.`);
  }
  if (ids.includes(prefix)) return { ok: true, value: { id: prefix, rest } };
  return wrongUse(
    option,
    `${option} names series "${cleanText(prefix, 20)}"; none of that name was read.`,
    `There are: ${ids.slice(0, 20).join(', ')}.`,
  );
}
