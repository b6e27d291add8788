import { createHmac, randomBytes } from 'node:crypto';

/**
 * A function that turns a UID into what groups images: a keyed hash. The key is new each time and is never written, so that nobody can
 * tell from a hash which UID it was, nor compare two readings.
 */
export function seriesHash(): (uid: string) => string {
  const key = randomBytes(32);
  let last = { uid: '', hash: '' };
  return (uid) => {
    // Images of one series mostly follow each other.
    if (uid !== last.uid || last.hash === '') last = { uid, hash: createHmac('sha256', key).update(uid).digest('hex').slice(0, 24) };
    return last.hash;
  };
}
