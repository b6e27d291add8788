import type { Key, NamedKey } from './key.js';

/** Final letters of `ESC [ ... letter` and `ESC O letter` (ECMA-48 cursor keys, as every terminal sends them). */
const letterKeys: Readonly<Record<string, NamedKey>> = {
  A: 'up',
  B: 'down',
  C: 'right',
  D: 'left',
  F: 'end',
  H: 'home',
  M: 'enter',
  Z: 'shift-tab',
};

/** Numbers of `ESC [ number ~` (the editing keypad). */
const numberedKeys: Readonly<Record<string, NamedKey>> = {
  1: 'home',
  2: 'insert',
  3: 'delete',
  4: 'end',
  5: 'page-up',
  6: 'page-down',
  7: 'home',
  8: 'end',
};

/** Keys that some terminals report by character code, with their modifiers. */
const codeKeys: Readonly<Record<number, NamedKey>> = { 8: 'backspace', 9: 'tab', 13: 'enter', 27: 'escape', 127: 'backspace' };

/** The modifier number is one more than a sum: shift 1, alt 2, ctrl 4. */
function withModifiers(name: NamedKey, modifier: number): Key {
  const bits = Math.max(0, modifier - 1);
  if (name === 'tab' && bits & 1) return { name: 'shift-tab' };
  return { name, ...(bits & 4 ? { ctrl: true as const } : {}), ...(bits & 1 ? { shift: true as const } : {}) };
}

function keyOfCode(code: number, modifier: number): Key | undefined {
  const name = codeKeys[code];
  if (name !== undefined) return withModifiers(name, modifier);
  if (!(code >= 32 && code <= 0x10ffff) || (code >= 0x7f && code < 0xa0) || (code >= 0xd800 && code < 0xf900)) return undefined;
  const text = String.fromCodePoint(code);
  return (Math.max(0, modifier - 1) & 4) === 0 ? { name: 'text', text } : { name: 'control', text: text.toLowerCase() };
}

/**
 * The key that a whole control sequence stands for, or nothing when it stands for none.
 *
 * @param introducer `[` or `O`, the byte after ESC.
 * @param parameters What stands between the introducer and the final letter.
 * @param final The final letter.
 * @example sequenceKey('[', '1;5', 'A') //=> { name: 'up', ctrl: true }
 */
export function sequenceKey(introducer: '[' | 'O', parameters: string, final: string): Key | undefined {
  if (parameters !== '' && !/^[\d;:]+$/.test(parameters)) return undefined;
  const fields = parameters.split(';');
  const [first = '', second = '', third = ''] = fields;
  const [modifierField = '', eventField = ''] = second.split(':');
  if (eventField === '3') return undefined;
  const modifier = Number(modifierField) || 1;
  if (introducer === '[' && final === '~') {
    if (first === '27') return keyOfCode(Number.parseInt(third, 10), modifier);
    const name = numberedKeys[first];
    return name === undefined ? undefined : withModifiers(name, modifier);
  }
  if (introducer === '[' && final === 'u') return keyOfCode(Number.parseInt(first, 10), modifier);
  const name = letterKeys[final];
  if (name === undefined || (final === 'M' && introducer === '[')) return undefined;
  if (name === 'shift-tab') return { name };
  return withModifiers(name, introducer === 'O' ? Number(first) || 1 : modifier);
}
