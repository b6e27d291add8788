import { parentPort } from 'node:worker_threads';
import { replyToAsk } from './answer-search.js';
import type { SearchAsk } from './search-protocol.js';

/** The worker: one ask after the other, replies as they come. */
parentPort?.on('message', (ask: SearchAsk) => {
  replyToAsk(ask, (reply) => parentPort?.postMessage(reply));
});
