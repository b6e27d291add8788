import type { Opened, Session } from './session.js';
import type { Place, Step } from './state.js';

/** Layout of a draft; a draft of another layout is not gone on with. */
export const draftLayout = 1;

/** What is saved as the session goes: enough to go on with everything as it was. */
export interface Draft {
  readonly layout: typeof draftLayout;
  readonly opened: Opened;
  readonly session: Session;
  /** The last steps, so that undo works after a crash too. */
  readonly past: readonly Step[];
  readonly place: Place;
  /** A practice hold that was running. */
  readonly practiceSinceMs: number | null;
}

/** Steps of undo that a draft keeps. */
export const draftSteps = 40;

/** The draft in a file's content, or null when it is none of ours: every part that the screens rely on must be there. */
export function draftOf(value: unknown): Draft | null {
  const draft = Object(value) as Partial<Draft>;
  if (draft.layout !== draftLayout) return null;
  const { opened, session, past, place } = draft;
  if (!isObject(opened) || !isObject(session) || !Array.isArray(past) || !isObject(place)) return null;
  if (!Array.isArray(opened.study?.series) || !isObject(opened.scanner) || typeof opened.study.id !== 'string') return null;
  if (!isObject(session.limits) || !Array.isArray(session.series) || !Array.isArray(session.reasons)) return null;
  const known = new Set(opened.study.series.map(({ id }) => id));
  const fits = session.series.every((series) => isObject(series) && known.has(series.id) && isObject(series.set));
  return fits && typeof place.screen === 'string' ? (value as Draft) : null;
}

function isObject<T>(value: T | undefined | null): value is T & object {
  return typeof value === 'object' && value !== null;
}
