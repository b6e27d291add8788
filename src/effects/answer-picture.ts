import { drawPictures, keepPreset } from '../picture/picture-problem.js';
import type { PictureAsk, PictureReply } from './picture-protocol.js';

const keep = keepPreset();

/** Draws what is asked: the one path that worker and program share. A fault of our own comes back as a problem. */
export function replyToPictureAsk({ number, problem, object }: PictureAsk): PictureReply {
  try {
    return { number, drawn: drawPictures(problem, object, keep) };
  } catch (error) {
    const message = `It could not be drawn: ${error instanceof Error ? error.message : String(error)}.`;
    return { number, drawn: { ok: false, problems: [{ code: 'picture-failed', path: '', message, hint: 'Read the figures.' }] } };
  }
}
