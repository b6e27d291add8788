import type { TextPage } from '../session/text-page.js';
import { tableWidth } from '../session/text-table.js';

/** How plain text is laid out: for eyes or for a screen reader, in all characters or ASCII alone, with or without colour. */
export interface Page extends TextPage {
  /** Replaces what is no ASCII where only ASCII may be shown. */
  readonly plain: (text: string) => string;
}

/** The page that a command line asks for. */
export function pageOf(
  request: { readonly has: (option: string) => boolean; readonly value: (option: string) => string | undefined },
  io: { readonly emphasis: (choice: string | undefined) => Page['emphasis'] },
): Page {
  return {
    reader: request.has('reader'),
    width: request.has('reader') ? Number.POSITIVE_INFINITY : tableWidth,
    plain: request.has('ascii') ? asciiOnly : (text) => text,
    emphasis: io.emphasis(request.value('color')),
  };
}

/**
 * Text in ASCII alone: accents dropped, the signs of our units in words, everything else a question mark.
 *
 * @example asciiOnly('µm, São') //=> 'um, Sao'
 */
export function asciiOnly(text: string): string {
  return text
    .replace(/[\u00b5\u03bc]/g, 'u')
    .replace(/\u00d7/g, 'x')
    .replace(/[\u2013\u2014\u2212]/g, '-')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replace(/[^\n\x20-\x7e]/gu, '?');
}
