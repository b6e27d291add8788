import { mkdirSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { deflateRawSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { readFileHeaders } from '../../../src/store/dicom/read-file-headers.js';
import { readHeaders } from '../../../src/store/dicom/read-headers.js';
import { seriesHash } from '../../../src/store/dicom/series-hash.js';
import type { Disk } from '../../../src/store/disk.js';
import { nodeDisk } from '../../../src/store/node-disk.js';
import { type Attribute, dicomObject, mrImage } from '../../headers/dicom-object.js';
import { temporaryFolder } from '../temporary-folder.js';

const megabyte = 1024 * 1024;
const image: readonly Attribute[] = [
  { tag: '0008,0016', vr: 'UI', value: mrImage },
  { tag: '0008,0060', vr: 'CS', value: 'MR' },
  { tag: '0018,0080', vr: 'DS', value: '500' },
  { tag: '0020,000e', vr: 'UI', value: '1.2.3' },
];
const filler = (bytes: number, tag = '0019,1001'): Attribute => ({ tag, vr: 'OB', value: Array.from({ length: bytes }, () => 7) });

/** A disk that counts the bytes that are read, and the highest place. */
function countingDisk(): { readonly disk: Disk; readonly bytes: () => number; readonly end: () => number } {
  let bytes = 0;
  let end = 0;
  const disk: Disk = {
    ...nodeDisk,
    open: async (path, how) => {
      const file = await nodeDisk.open(path, how);
      return {
        ...file,
        read: async (into, position) => {
          const count = await file.read(into, position);
          bytes += count;
          end = Math.max(end, position + count);
          return count;
        },
      };
    },
  };
  return { disk, bytes: () => bytes, end: () => end };
}

async function read(path: string, disk: Disk = nodeDisk) {
  const result = await readFileHeaders(disk, path, Buffer.alloc(64 * 1024), (uid) => uid);
  return result.kind === 'headers' ? { ...result, headers: [...result.headers] } : result;
}

function written(bytes: Buffer): string {
  const path = join(temporaryFolder(), 'object');
  writeFileSync(path, bytes);
  return path;
}

describe('what is read of an object', () => {
  it('is the first 64 kB where the header ends in them, whatever the pixels are', async () => {
    const { disk, end } = countingDisk();
    const result = await read(written(dicomObject([...image, filler(3 * megabyte, '7fe0,0010')])), disk);
    expect(result).toMatchObject({ kind: 'headers', headers: [{ attributes: { RepetitionTime: [500] } }], problem: null });
    expect(end()).toBe(64 * 1024);
  });

  it('is more where the header goes on', async () => {
    const late: Attribute = { tag: '0020,0011', vr: 'IS', value: '12' };
    const result = await read(written(dicomObject([...image, filler(2 * megabyte), late, filler(megabyte, '7fe0,0010')])));
    expect(result).toMatchObject({ kind: 'headers', headers: [{ attributes: { SeriesNumber: [12] } }], problem: null });
  });

  it('is never more than 8 MB', async () => {
    const { disk, end } = countingDisk();
    const result = await read(written(dicomObject([...image, filler(9 * megabyte)])), disk);
    expect(result).toMatchObject({ kind: 'problem', problem: { code: 'header-too-long' } });
    expect(end()).toBeLessThanOrEqual(8 * megabyte);
  });

  it('is never inflated past 64 MB', async () => {
    const object = dicomObject(image, { syntax: 'deflated' });
    const bomb = deflateRawSync(Buffer.alloc(120 * megabyte), { level: 9 });
    const start = object.indexOf(Buffer.from('1.2.3.4\0', 'latin1')) + 8;
    expect(bomb.length).toBeLessThan(megabyte);
    const result = await read(written(Buffer.concat([object.subarray(0, start), bomb])));
    expect(result).toMatchObject({ kind: 'problem', problem: { code: 'inflates-too-far' } });
  });

  it('stops before a table of offsets with a representation the parser does not know', async () => {
    const path = written(dicomObject([...image, { tag: '7fe0,0001', vr: 'OV', value: '12345678' }, filler(100, '7fe0,0010')]));
    expect(await read(path)).toMatchObject({ kind: 'headers', problem: null });
  });

  it('does not take what is nested too deep, and does not fall over it', async () => {
    const open = Buffer.concat([
      dicomObject(image),
      ...Array.from({ length: 60_000 }, () =>
        Buffer.from([0x18, 0, 0x06, 0x90, 0x53, 0x51, 0, 0, 255, 255, 255, 255, 0xfe, 0xff, 0, 0xe0, 255, 255, 255, 255]),
      ),
    ]);
    expect((await read(written(open))).kind).toBe('problem');
  });
});

describe('folders', () => {
  it('are gone through once, links followed, a circle named', async () => {
    const folder = temporaryFolder();
    mkdirSync(join(folder, 'a'));
    mkdirSync(join(folder, 'b'));
    writeFileSync(join(folder, 'a', 'one'), dicomObject(image));
    symlinkSync(join(folder, 'a'), join(folder, 'b', 'again'));
    symlinkSync(folder, join(folder, 'b', 'round'));
    const problems: string[] = [];
    let headers = 0;
    const counts = await readHeaders(nodeDisk, [folder], { header: () => (headers += 1), problem: ({ code }) => problems.push(code) });
    expect([headers, counts, problems]).toEqual([1, { files: 1, read: 1, passedOver: 0 }, ['link-loop']]);
  });

  it('that go away while they are read are named', async () => {
    const folder = temporaryFolder();
    for (const name of ['a', 'b', 'c']) writeFileSync(join(folder, name), dicomObject(image));
    const problems: string[] = [];
    const disk: Disk = {
      ...nodeDisk,
      entries: async (path) => {
        const entries = await nodeDisk.entries(path);
        rmSync(join(folder, 'b'));
        return entries;
      },
    };
    const counts = await readHeaders(disk, [folder], { header: () => {}, problem: ({ code }) => problems.push(code) });
    expect([counts.read, problems]).toEqual([2, ['not-there']]);
  });
});

describe('what groups a series', () => {
  it('is the same for one UID, and another with each reading', () => {
    const [hash, other] = [seriesHash(), seriesHash()];
    expect(hash('1.2.3')).toBe(hash('1.2.3'));
    expect(hash('1.2.3')).not.toBe(hash('1.2.4'));
    expect(hash('1.2.3')).not.toBe(other('1.2.3'));
    expect(hash('1.2.3')).not.toContain('1.2.3');
  });
});
