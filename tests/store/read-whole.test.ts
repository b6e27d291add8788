import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Disk } from '../../src/store/disk.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { readWhole } from '../../src/store/read-whole.js';
import { temporaryFolder } from './temporary-folder.js';

/** A disk that says every file has one size, as it looks when a file grows or shrinks while it is read. */
function saying(sizeBytes: number): Disk {
  return {
    ...nodeDisk,
    facts: async (path) => ({ ...(await nodeDisk.facts(path)), sizeBytes }),
    open: async (...args) => {
      const file = await nodeDisk.open(...args);
      return { ...file, facts: async () => ({ ...(await file.facts()), sizeBytes }) };
    },
  };
}

describe('readWhole', () => {
  it.each([0, 1, 5, 10, 50])('reads all of ten bytes when their number was given as %i', async (size) => {
    const path = join(temporaryFolder(), 'x');
    writeFileSync(path, '0123456789');
    expect(await readWhole(saying(size), path, 'the file', 100)).toMatchObject({ ok: true, value: { text: '0123456789' } });
  });

  it('refuses a file that grows beyond its bound while it is read', async () => {
    const path = join(temporaryFolder(), 'x');
    for (const [length, ok] of [
      [100, true],
      [101, false],
      [5000, false],
    ] as const) {
      writeFileSync(path, 'x'.repeat(length));
      expect((await readWhole(saying(3), path, 'the file', 100)).ok).toBe(ok);
    }
  });
});
