import { crc32 } from './crc32.js';

const encoder = new TextEncoder();
const sumKey = ',"sum"';
const sumTail = /^,"sum"\s*:\s*"([0-9a-f]{8})"\s*\}\s*$/;

/**
 * Puts a `sum` as the last key of a JSON object written on one line: CRC-32 of the UTF-8 bytes before `,"sum"`,
 * as eight lower-case hexadecimal digits. The text must be a JSON object with at least one key.
 *
 * @example withSum('{"a":1}') //=> '{"a":1,"sum":"a702fc6e"}'
 */
export function withSum(json: string): string {
  const body = json.slice(0, -1);
  return `${body}${sumKey}:"${hexadecimal(crc32(encoder.encode(body)))}"}`;
}

/** CRC-32 (IEEE 802.3) of bytes: our own, or a faster one that gives the same. */
export type Checksum = (bytes: Uint8Array) => number;

/** What the sum of a line says. */
export type SumVerdict = 'right' | 'missing' | 'different';

/**
 * Checks the sum of a line.
 *
 * @param bytes The line's bytes as they stand in the file, for readers that have them at hand.
 */
export function sumVerdict(line: string, bytes: Uint8Array = encoder.encode(line), checksum: Checksum = crc32): SumVerdict {
  const at = line.lastIndexOf(sumKey);
  const tail = at < 0 ? '' : line.slice(at);
  const given = sumTail.exec(tail)?.[1];
  if (given === undefined) return 'missing';
  // The tail is plain ASCII, so it has as many bytes as characters.
  const body = bytes.subarray(0, bytes.length - tail.length);
  return hexadecimal(checksum(body)) === given ? 'right' : 'different';
}

function hexadecimal(sum: number): string {
  return sum.toString(16).padStart(8, '0');
}
