/** A JSON value that remembers where in the text it stands. Offsets count UTF-16 units from the start. */
export type JsonNode =
  | { readonly kind: 'object'; readonly offset: number; readonly entries: readonly JsonEntry[] }
  | { readonly kind: 'array'; readonly offset: number; readonly items: readonly JsonNode[] }
  | { readonly kind: 'plain'; readonly offset: number; readonly value: string | number | boolean | null };

export interface JsonEntry {
  readonly key: string;
  readonly keyOffset: number;
  readonly value: JsonNode;
}

/** Why a text is no JSON: where, what stands there, what was expected. */
export interface JsonFault {
  readonly code: 'not-json' | 'too-deep' | 'not-finite';
  readonly offset: number;
  readonly given: string;
  readonly expected: string;
}

export type JsonReading = { readonly ok: true; readonly root: JsonNode } | { readonly ok: false; readonly fault: JsonFault };

class Stop extends Error {
  constructor(readonly fault: JsonFault) {
    super('not JSON');
  }
}

const numberForm = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const wordForm = /[+-]?[\p{L}\p{N}_.+-]+/uy;
const words: Readonly<Record<string, boolean | null>> = { true: true, false: false, null: null };
const escapes = /\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/y;

/**
 * Reads strict JSON (RFC 8259: no comments, no trailing commas) and keeps positions. Nesting is counted from 1 at the outermost
 * value; deeper than `deepest` is refused before it is read. Equal keys all stay in `entries`, so that a caller can find them.
 * A byte order mark at the start is skipped.
 *
 * @example readJson('{"a": [1]}', 20) //=> { ok: true, root: { kind: 'object', ... } }
 */
export function readJson(text: string, deepest: number): JsonReading {
  let at = text.startsWith('\uFEFF') ? 1 : 0;

  function stop(code: JsonFault['code'], offset: number, given: string, expected: string): never {
    throw new Stop({ code, offset, given, expected });
  }
  function here(): string {
    if (at >= text.length) return 'the end of the file';
    wordForm.lastIndex = at;
    const word = wordForm.exec(text)?.[0];
    return `"${word === undefined ? String.fromCodePoint(text.codePointAt(at) as number) : word.slice(0, 40)}"`;
  }
  function skipBlanks(): void {
    while (at < text.length && (text[at] === ' ' || text[at] === '\n' || text[at] === '\r' || text[at] === '\t')) at += 1;
  }
  function readString(expected: string): string {
    if (text[at] !== '"') stop('not-json', at, here(), expected);
    const start = at;
    at += 1;
    for (;;) {
      const unit = text.charCodeAt(at);
      if (at >= text.length || unit === 10 || unit === 13)
        stop('not-json', start, 'a text without an end', 'a closing quote on the same line');
      if (unit < 32) stop('not-json', at, 'a control character inside a text', 'plain characters');
      if (unit === 34) break;
      if (unit === 92) {
        escapes.lastIndex = at;
        const escaped = escapes.exec(text)?.[0];
        if (escaped === undefined) stop('not-json', at, `"${text.slice(at, at + 2)}"`, 'a backslash only before " \\ / b f n r t or uXXXX');
        else at += escaped.length;
      } else at += 1;
    }
    at += 1;
    return JSON.parse(text.slice(start, at)) as string;
  }
  function readPlain(): JsonNode {
    const offset = at;
    if (text[at] === '"') return { kind: 'plain', offset, value: readString('a text') };
    numberForm.lastIndex = at;
    wordForm.lastIndex = at;
    const word = wordForm.exec(text)?.[0];
    const number = numberForm.exec(text)?.[0];
    if (word !== undefined && word === number) {
      const value = Number(number);
      if (!Number.isFinite(value)) stop('not-finite', offset, number.slice(0, 40), 'a number within the range of the key');
      at += number.length;
      return { kind: 'plain', offset, value };
    }
    if (word !== undefined && Object.hasOwn(words, word)) {
      at += word.length;
      return { kind: 'plain', offset, value: words[word] as boolean | null };
    }
    if (word !== undefined && /^[+-]?(nan|inf|infinity)$/i.test(word)) stop('not-finite', offset, word, 'a number');
    return stop('not-json', offset, here(), 'a value: a number, a text in double quotes, true, false, a list or an object');
  }
  function readArray(depth: number): JsonNode {
    const offset = at;
    const items: JsonNode[] = [];
    at += 1;
    skipBlanks();
    if (text[at] === ']') at += 1;
    else {
      for (;;) {
        items.push(readValue(depth + 1));
        skipBlanks();
        if (text[at] === ']') break;
        if (text[at] !== ',') stop('not-json', at, here(), '"," or "]" after an item of a list');
        at += 1;
      }
      at += 1;
    }
    return { kind: 'array', offset, items };
  }
  function readObject(depth: number): JsonNode {
    const offset = at;
    const entries: JsonEntry[] = [];
    at += 1;
    skipBlanks();
    if (text[at] === '}') at += 1;
    else {
      for (;;) {
        skipBlanks();
        const keyOffset = at;
        const key = readString('a key in double quotes');
        skipBlanks();
        if (text[at] !== ':') stop('not-json', at, here(), '":" after a key');
        at += 1;
        entries.push({ key, keyOffset, value: readValue(depth + 1) });
        skipBlanks();
        if (text[at] === '}') break;
        if (text[at] !== ',') stop('not-json', at, here(), '"," or "}" after a value');
        at += 1;
      }
      at += 1;
    }
    return { kind: 'object', offset, entries };
  }
  function readValue(depth: number): JsonNode {
    skipBlanks();
    if (text[at] !== '{' && text[at] !== '[') return readPlain();
    if (depth > deepest) stop('too-deep', at, `nesting of more than ${deepest} levels`, `at most ${deepest} levels`);
    return text[at] === '{' ? readObject(depth) : readArray(depth);
  }

  try {
    const root = readValue(1);
    skipBlanks();
    if (at < text.length) stop('not-json', at, here(), 'nothing after the outermost value');
    return { ok: true, root };
  } catch (error) {
    if (error instanceof Stop) return { ok: false, fault: error.fault };
    throw error;
  }
}

/** The plain value of a node. Of equal keys the last one counts, as in JSON.parse; objects have no prototype. */
export function jsonValue(node: JsonNode): unknown {
  if (node.kind === 'plain') return node.value;
  if (node.kind === 'array') return node.items.map(jsonValue);
  const value = Object.create(null) as Record<string, unknown>;
  for (const entry of node.entries) value[entry.key] = jsonValue(entry.value);
  return value;
}
