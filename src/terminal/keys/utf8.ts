/** Length of the UTF-8 character that begins with this byte, or 0 when none can. */
export function utf8Length(first: number): 0 | 1 | 2 | 3 | 4 {
  if (first < 0x80) return 1;
  if (first >= 0xc2 && first <= 0xdf) return 2;
  if (first >= 0xe0 && first <= 0xef) return 3;
  if (first >= 0xf0 && first <= 0xf4) return 4;
  return 0;
}

/**
 * The character of a whole UTF-8 sequence, or nothing when it is malformed, a surrogate or a control character.
 *
 * @example utf8Character([0xc2, 0xb5]) //=> '\u00b5'
 */
export function utf8Character(bytes: readonly number[]): string | undefined {
  try {
    const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(Uint8Array.from(bytes));
    const code = text.codePointAt(0) ?? 0;
    return code < 0x20 || (code >= 0x7f && code < 0xa0) ? undefined : text;
  } catch {
    return undefined;
  }
}
