import { crc32 as zlibCrc32 } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { crc32 } from '../../src/study/crc32.js';

const bytesOf = (text: string) => new TextEncoder().encode(text);

describe('crc32', () => {
  it('gives CBF43926 for "123456789", the published check value of CRC-32/ISO-HDLC', () => {
    expect(crc32(bytesOf('123456789'))).toBe(0xcbf43926);
  });

  it('gives 414FA339 for "The quick brown fox jumps over the lazy dog", an often published example', () => {
    expect(crc32(bytesOf('The quick brown fox jumps over the lazy dog'))).toBe(0x414fa339);
  });

  it.runIf(zlibCrc32)('agrees with zlib on any bytes', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 100 }), (bytes) => crc32(bytes) === zlibCrc32(bytes)));
  });
});
