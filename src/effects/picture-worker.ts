import { parentPort } from 'node:worker_threads';
import { replyToPictureAsk } from './answer-picture.js';
import type { PictureAsk } from './picture-protocol.js';

/** The worker of pictures: one ask after the other. */
parentPort?.on('message', (ask: PictureAsk) => {
  const reply = replyToPictureAsk(ask);
  // The picture now is handed over, not copied; the preset's is kept here for the next ask.
  parentPort?.postMessage(reply, reply.drawn.ok ? [reply.drawn.value.pair.now.values.buffer as ArrayBuffer] : []);
});
