import type { Answer, Key } from './key.js';
import { type KeyState, noKeys } from './key-state.js';
import type { KeyTiming } from './key-timing.js';
import { longestPasteBytes, pasteText } from './paste-text.js';
import { sequenceKey } from './sequence-key.js';
import { utf8Character, utf8Length } from './utf8.js';

/** What a read, or the passing of time, has brought. */
export interface KeyReading {
  readonly state: KeyState;
  readonly keys: readonly Key[];
  readonly answers: readonly Answer[];
}

interface Out {
  readonly keys: Key[];
  readonly answers: Answer[];
}

const esc = 0x1b;
const bracket = 0x5b;
const letterO = 0x4f;
const pasteEnd = '\u001b[201~';
const longestSequenceBytes = 256;
/** `ESC` with one of these begins a string that ends with `ESC \` or BEL (ECMA-48 5.6): DCS, SOS, OSC, PM, APC. */
const stringIntroducers: readonly number[] = [0x50, 0x58, 0x5d, 0x5e, 0x5f];

const keyLetters = /[A-DFHIMO-SZ]/;

const isFinal = (byte: number) => byte >= 0x40 && byte <= 0x7e;
const isParameter = (byte: number) => byte >= 0x20 && byte <= 0x3f;

/** One byte that belongs to no sequence. */
function groundByte(byte: number, nowMs: number, out: Out): KeyState {
  if (byte === esc) return { mode: 'escape', bytes: [], sinceMs: nowMs, late: false };
  if (byte >= 0x80) return utf8Length(byte) === 0 ? noKeys : { mode: 'ground', bytes: [byte], escapedAtMs: null };
  if (byte === 0x0d || byte === 0x0a) out.keys.push({ name: 'enter' });
  else if (byte === 0x09) out.keys.push({ name: 'tab' });
  else if (byte === 0x7f || byte === 0x08) out.keys.push({ name: 'backspace' });
  else if (byte >= 0x20) out.keys.push({ name: 'text', text: String.fromCharCode(byte) });
  // Control codes are the letter with the upper bits off; 0 is Ctrl and the space bar.
  else out.keys.push({ name: 'control', text: byte === 0 ? ' ' : String.fromCharCode(byte + 0x40).toLowerCase() });
  return noKeys;
}

function ground(state: KeyState & { mode: 'ground' }, byte: number, nowMs: number, timing: KeyTiming, out: Out): KeyState {
  const first = state.bytes[0];
  if (first !== undefined) {
    if ((byte & 0xc0) !== 0x80) return groundByte(byte, nowMs, out);
    const bytes = [...state.bytes, byte];
    if (bytes.length < utf8Length(first)) return { mode: 'ground', bytes, escapedAtMs: null };
    const text = utf8Character(bytes);
    if (text !== undefined) out.keys.push({ name: 'text', text });
    return noKeys;
  }
  const lateTail = state.escapedAtMs !== null && nowMs - state.escapedAtMs <= timing.tailMs;
  if (lateTail && (byte === bracket || byte === letterO)) return { mode: 'escape', bytes: [byte], sinceMs: nowMs, late: true };
  return groundByte(byte, nowMs, out);
}

/** A whole sequence has been read: what it means. Late ones are no keys any more, since Escape was given out for them. */
function finish(bytes: readonly number[], final: number, late: boolean, nowMs: number, out: Out): KeyState {
  const introducer = bytes[0] === letterO ? 'O' : '[';
  const parameters = String.fromCharCode(...bytes.slice(1));
  const letter = String.fromCharCode(final);
  if (introducer === '[' && letter === '~' && parameters === '200') return { mode: 'paste', bytes: [], tail: '', sinceMs: nowMs };
  if (introducer === '[' && letter === 'n' && (parameters === '0' || parameters === '3')) out.answers.push({ kind: 'status' });
  if (introducer === '[' && letter === 'M' && parameters === '') return { mode: 'skip', count: 3, sinceMs: nowMs };
  const key = late ? undefined : sequenceKey(introducer, parameters, letter);
  if (key !== undefined) out.keys.push(key);
  return noKeys;
}

function afterEscape(state: KeyState & { mode: 'escape' }, byte: number, nowMs: number, out: Out): KeyState {
  const { bytes, late } = state;
  const introducer = bytes[0];
  if (introducer === undefined) {
    if (byte === bracket || byte === letterO) return { ...state, bytes: [byte], sinceMs: nowMs };
    if (stringIntroducers.includes(byte)) return { mode: 'string', introducer: byte, length: 0, last: byte, sinceMs: nowMs };
    // ESC and Backspace in one is how terminals send Alt with Backspace: nobody means to go back by it.
    if (byte === 0x7f || byte === 0x08) return groundByte(byte, nowMs, out);
    // Anything else was Escape and then another key, typed faster than the line could carry them apart.
    out.keys.push({ name: 'escape' });
    return groundByte(byte, nowMs, out);
  }
  const linuxConsoleKey = bytes.length === 2 && bytes[1] === bracket;
  if (linuxConsoleKey && isFinal(byte)) return noKeys;
  if (bytes.length === 1 && introducer === bracket && byte === bracket && !late)
    return { ...state, bytes: [...bytes, byte], sinceMs: nowMs };
  // After a bare `O`, and after a bare `[` that came late, only a letter that keys use ends a sequence: the rest was typed.
  const bare = bytes.length === 1 && (introducer === letterO || late);
  if (isFinal(byte) && (!bare || keyLetters.test(String.fromCharCode(byte)))) return finish(bytes, byte, late, nowMs, out);
  const parameter = introducer === bracket ? isParameter(byte) : byte >= 0x30 && byte <= 0x39;
  if (parameter) return bytes.length > longestSequenceBytes ? noKeys : { ...state, bytes: [...bytes, byte], sinceMs: nowMs };
  giveUp(state, out);
  return groundByte(byte, nowMs, out);
}

/** A sequence that broke off: a lone `O` was typed, so it stays text; broken control sequences mean nothing. */
function giveUp(state: KeyState & { mode: 'escape' }, out: Out): void {
  const [introducer, ...rest] = state.bytes;
  if (introducer === undefined) {
    out.keys.push({ name: 'escape' });
  } else if (rest.length === 0 && (introducer === letterO || state.late)) {
    if (!state.late) out.keys.push({ name: 'escape' });
    out.keys.push({ name: 'text', text: String.fromCharCode(introducer) });
  }
}

function inString(state: KeyState & { mode: 'string' }, byte: number, nowMs: number, out: Out): KeyState {
  const ended = byte === 0x07 || byte === 0x9c || (state.last === esc && byte === 0x5c);
  if (ended) return noKeys;
  // Ctrl-C must always work, and an ESC that does not end the string begins something new.
  if (byte === 0x03 || byte === 0x18) return groundByte(byte, nowMs, out);
  if (state.last === esc) return afterEscape({ mode: 'escape', bytes: [], sinceMs: nowMs, late: false }, byte, nowMs, out);
  return { ...state, length: state.length + 1, last: byte, sinceMs: nowMs };
}

/** Takes bytes of a paste up to its end mark; tells the state after them and how many were taken. */
function inPaste(state: KeyState & { mode: 'paste' }, bytes: Uint8Array, from: number, nowMs: number, out: Out): [KeyState, number] {
  const kept = [...state.bytes];
  let tail = state.tail;
  for (let index = from; index < bytes.length; index++) {
    const byte = bytes[index] ?? 0;
    tail = (tail + String.fromCharCode(byte)).slice(-pasteEnd.length);
    if (kept.length < longestPasteBytes + pasteEnd.length) kept.push(byte);
    if (tail !== pasteEnd) continue;
    const length = kept.length < longestPasteBytes + pasteEnd.length ? kept.length - pasteEnd.length : longestPasteBytes;
    out.keys.push({ name: 'paste', text: pasteText(kept.slice(0, length)) });
    return [noKeys, index + 1];
  }
  return [{ mode: 'paste', bytes: kept, tail, sinceMs: nowMs }, bytes.length];
}

/**
 * Reads bytes from the terminal: one key at a time, however the bytes were cut into reads.
 *
 * Pure. Time passes only by `expireKeys`: two parts of a sequence are one key if nothing expired between them.
 *
 * @param nowMs Any steady clock in ms, the same one for every call.
 * @example readKeys(noKeys, new TextEncoder().encode('jj\u001b[A'), 0, keyTiming({})).keys.length //=> 3
 */
export function readKeys(state: KeyState, bytes: Uint8Array, nowMs: number, timing: KeyTiming): KeyReading {
  const out: Out = { keys: [], answers: [] };
  let current = state;
  let index = 0;
  while (index < bytes.length) {
    if (current.mode === 'paste') {
      [current, index] = inPaste(current, bytes, index, nowMs, out);
      continue;
    }
    const byte = bytes[index++] ?? 0;
    if (current.mode === 'ground') current = ground(current, byte, nowMs, timing, out);
    else if (current.mode === 'escape') current = afterEscape(current, byte, nowMs, out);
    else if (current.mode === 'string') current = inString(current, byte, nowMs, out);
    else current = current.count > 1 ? { mode: 'skip', count: current.count - 1, sinceMs: nowMs } : noKeys;
  }
  return { state: current, ...out };
}

/**
 * When `expireKeys` is to be called if no byte comes before, in ms of the same clock, or null when nothing waits.
 */
export function keyDeadlineMs(state: KeyState, timing: KeyTiming): number | null {
  if (state.mode === 'ground') return null;
  if (state.mode === 'paste') return state.sinceMs + timing.pasteIdleMs;
  if (state.mode === 'string') return state.sinceMs + (state.length === 0 ? timing.escapeMs : timing.sequenceMs);
  if (state.mode === 'skip') return state.sinceMs + timing.sequenceMs;
  const typed = state.bytes.length === 0 || (state.bytes.length === 1 && (state.bytes[0] === letterO || state.late));
  return state.sinceMs + (typed ? timing.escapeMs : timing.sequenceMs);
}

/** Time has passed without a byte: a lone ESC becomes Escape, what broke off is given up. */
export function expireKeys(state: KeyState, nowMs: number, timing: KeyTiming): KeyReading {
  const deadlineMs = keyDeadlineMs(state, timing);
  if (deadlineMs === null || nowMs < deadlineMs) return { state, keys: [], answers: [] };
  const out: Out = { keys: [], answers: [] };
  if (state.mode === 'paste') out.keys.push({ name: 'paste', text: pasteText(state.bytes.slice(0, longestPasteBytes)) });
  if (state.mode === 'string' && state.length === 0) {
    out.keys.push({ name: 'escape' }, { name: 'text', text: String.fromCharCode(state.introducer) });
  }
  if (state.mode === 'escape') giveUp(state, out);
  const loneEscape = state.mode === 'escape' && !state.late && state.bytes.length === 0;
  return { state: loneEscape ? { mode: 'ground', bytes: [], escapedAtMs: nowMs } : noKeys, ...out };
}
