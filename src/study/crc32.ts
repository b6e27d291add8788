/** Bit-reversed generator polynomial of CRC-32 (IEEE 802.3, clause 3.2.9): 0x04C11DB7 read from the other end. */
const reversedPolynomial = 0xedb88320;

/** Bytes taken in one turn of the loop; a table for each. */
const bytesAtOnce = 8;

const tables: readonly Uint32Array[] = buildTables();

/** Table 0 is the checksum of one byte; table k that of the byte followed by k zero bytes. */
function buildTables(): Uint32Array[] {
  const ofOneByte = new Uint32Array(256).map((_, byte) => {
    let rest = byte;
    for (let bit = 0; bit < 8; bit += 1) rest = rest & 1 ? (rest >>> 1) ^ reversedPolynomial : rest >>> 1;
    return rest;
  });
  const built = [ofOneByte];
  while (built.length < bytesAtOnce) built.push(built.at(-1)!.map((rest) => (rest >>> 8) ^ ofOneByte[rest & 0xff]!));
  return built;
}

/**
 * CRC-32 of bytes as IEEE 802.3 has it (also called CRC-32/ISO-HDLC): an unsigned 32-bit number.
 *
 * @example crc32(new TextEncoder().encode('123456789')).toString(16) //=> 'cbf43926'
 */
export function crc32(bytes: Uint8Array): number {
  const [t0, t1, t2, t3, t4, t5, t6, t7] = tables as [
    Uint32Array,
    Uint32Array,
    Uint32Array,
    Uint32Array,
    Uint32Array,
    Uint32Array,
    Uint32Array,
    Uint32Array,
  ];
  const whole = bytes.length - (bytes.length % bytesAtOnce);
  let rest = -1;
  let at = 0;
  // Every index below is within its table or the array: the masks and the loop bounds see to it.
  for (; at < whole; at += bytesAtOnce) {
    const first = rest ^ (bytes[at]! | (bytes[at + 1]! << 8) | (bytes[at + 2]! << 16) | (bytes[at + 3]! << 24));
    rest =
      t7[first & 0xff]! ^
      t6[(first >>> 8) & 0xff]! ^
      t5[(first >>> 16) & 0xff]! ^
      t4[first >>> 24]! ^
      t3[bytes[at + 4]!]! ^
      t2[bytes[at + 5]!]! ^
      t1[bytes[at + 6]!]! ^
      t0[bytes[at + 7]!]!;
  }
  for (; at < bytes.length; at += 1) rest = (rest >>> 8) ^ t0[(rest ^ bytes[at]!) & 0xff]!;
  return ~rest >>> 0;
}
