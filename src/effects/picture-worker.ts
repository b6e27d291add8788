import { parentPort } from 'node:worker_threads';
import { replyToPictureAsk } from './answer-picture.js';
import type { PictureAsk } from './picture-protocol.js';

/** The worker of pictures: one ask after the other. */
parentPort?.on('message', (ask: PictureAsk) => {
  parentPort?.postMessage(replyToPictureAsk(ask));
});
