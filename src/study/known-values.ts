import type { RecordedValues } from './record.js';

/** Planned values that are remembered; a site has some dozens. */
const mostKnown = 128;
const linesPassedOver = 5000;
/** Longer lines are parsed whole, characters: a text that is remembered keeps its line in memory. */
const longestLine = 100_000;

/** Values that a parser remembers: who checked them once need not do so again. */
const remembered = new WeakSet<object>();

/** Whether values may be met again as the same object. */
export function isRemembered(values: object): boolean {
  return remembered.has(values);
}

/** A JSON parser that remembers planned values by their text: those of one series of one preset stand in every record of it. */
export class KnownValues {
  /** By the length of the text: to compare a few of one length costs a fraction of looking one up by all its characters. */
  private readonly known = new Map<number, { readonly text: string; readonly values: RecordedValues }[]>();
  private count = 0;
  /** Plans that were known since the memory was last emptied, and lines that are parsed whole because too few were. */
  private hits = 0;
  private passedOver = 0;

  /**
   * Parses the line of a record. Planned values that came before are the same object again, and so are used values equal to them:
   * whoever reads them changes nothing. Throws as `JSON.parse` does.
   */
  parse(line: string): unknown {
    if (this.passedOver > 0) {
      this.passedOver -= 1;
      return JSON.parse(line);
    }
    try {
      const record = this.parsePieces(line);
      if (record !== undefined) return record;
    } catch {
      // Pieces that are no JSON by themselves say nothing of the line.
    }
    return JSON.parse(line);
  }

  private forget(): void {
    // Where plans hardly ever come again, to look for them costs more than it saves: it is tried again some thousand lines later.
    if (this.hits < 4 * mostKnown) this.passedOver = linesPassedOver;
    this.known.clear();
    this.count = 0;
    this.hits = 0;
  }

  /** Undefined where the line is not laid out as a record is. */
  private parsePieces(line: string): unknown {
    // The signs that stand for values must not come in the line, in whatever spelling.
    if (line.length > longestLine || line.includes('\\') || line.includes('~')) return undefined;
    const values: unknown[] = [];
    let rest = '';
    let from = 0;
    for (;;) {
      // A quote right after a comma opens a key: nothing inside a text looks like that unless it is escaped.
      const planned = line.indexOf(plannedKey, from);
      if (planned < 0) break;
      const start = planned + plannedKey.length;
      const end = line.indexOf(usedKey, start);
      const usedEnd = end < 0 ? -1 : line.indexOf(crossedKey, end);
      if (usedEnd < 0) return undefined;
      const [plannedText, usedText] = [line.slice(start, end), line.slice(end + usedKey.length, usedEnd)];
      rest += `${line.slice(from, start)}"~${values.length}"${usedKey}"~${values.length + 1}"`;
      const before = this.valuesOf(plannedText);
      values.push(before, usedText === plannedText ? before : JSON.parse(usedText));
      from = usedEnd;
    }
    const record: unknown = JSON.parse(rest + line.slice(from));
    return putBack(record, values) ? record : undefined;
  }

  private valuesOf(text: string): RecordedValues {
    const alike = this.known.get(text.length);
    const before = alike?.find((one) => one.text === text);
    if (before !== undefined) {
      this.hits += 1;
      return before.values;
    }
    const values = JSON.parse(text) as RecordedValues;
    if (this.count >= mostKnown) this.forget();
    this.count += 1;
    const list = this.known.get(text.length) ?? [];
    list.push({ text, values });
    remembered.add(values);
    this.known.set(text.length, list);
    return values;
  }
}

const plannedKey = ',"planned":';
const usedKey = ',"used":';
const crossedKey = ',"crossed":';

/** Puts values in the place of the signs that stand for them; false where these are not the planned and used ones of its series. */
function putBack(record: unknown, values: readonly unknown[]): boolean {
  const { series } = Object(record) as { series?: unknown };
  if (!Array.isArray(series) || values.length !== 2 * series.length) return false;
  for (let i = 0; i < series.length; i += 1) {
    const one = Object(series[i]) as { planned?: unknown; used?: unknown };
    if (one.planned !== `~${2 * i}` || one.used !== `~${2 * i + 1}`) return false;
    one.planned = values[2 * i];
    one.used = values[2 * i + 1];
  }
  return true;
}
