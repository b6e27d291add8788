import { sumVerdict, withSum } from '../study/line-sum.js';

/** A session with all its series and undo steps has some hundred kilobytes; what is larger is no draft. */
export const maximumDraftBytes = 8_000_000;

const draftVersion = 1;

/** A session as the text of its draft file, with a sum over it. */
export function draftText(session: unknown, tool: string): string {
  return `${withSum(JSON.stringify({ format: 'holdfast draft', version: draftVersion, tool, session }))}\n`;
}

/** What a draft file holds: a session, damage, or something a later version wrote. */
export type DraftContent =
  | { readonly kind: 'session'; readonly session: unknown }
  | { readonly kind: 'damaged' }
  | { readonly kind: 'later version' };

/** Reads the text of a draft file; whether the session in it makes sense is for the session to say. */
export function readDraftText(text: string): DraftContent {
  if (sumVerdict(text) !== 'right') return { kind: 'damaged' };
  try {
    const value = JSON.parse(text) as { format?: unknown; version?: unknown; session?: unknown };
    if (value.format !== 'holdfast draft' || typeof value.version !== 'number' || !Object.hasOwn(value, 'session'))
      return { kind: 'damaged' };
    return value.version > draftVersion ? { kind: 'later version' } : { kind: 'session', session: value.session };
  } catch {
    return { kind: 'damaged' };
  }
}
