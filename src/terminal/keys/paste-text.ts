/** No field of this program needs more; the rest of a longer paste is dropped, not read as keys. */
export const longestPasteBytes = 65_536;

/**
 * Pasted bytes as text: UTF-8, every line end as `\n`, other control characters left out.
 *
 * @example pasteText([...Buffer.from('a\r\nb\u0007')]) //=> 'a\nb'
 */
export function pasteText(bytes: readonly number[]): string {
  const text = new TextDecoder('utf-8').decode(Uint8Array.from(bytes), { stream: true });
  return text.replace(/\r\n?/g, '\n').replace(/(?![\n\t])\p{Control}/gu, '');
}
