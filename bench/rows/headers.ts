import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { readSeries } from '../../src/headers/read-series.js';
import { SeriesCollector } from '../../src/headers/series-collector.js';
import { firstBytes } from '../../src/store/dicom/read-file-headers.js';
import { readHeaders } from '../../src/store/dicom/read-headers.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { type Attribute, dicomObject, mrImage } from '../../tests/headers/dicom-object.js';
import { median } from '../median.js';
import type { Measured, Row } from '../row.js';

const objects = 2000;
const rounds = 9;
/** Folders read one after the other for the memory: the last ones must need no more than the first. */
const memoryRounds = 12;

/** A header as long as real ones are (about 130 attributes), and pixels of 256 x 256. */
function invented(i: number): Buffer {
  const text = (tag: string, vr: string, value: string): Attribute => ({ tag, vr, value });
  const series = Math.floor(i / 100);
  const attributes: Attribute[] = [
    text('0008,0008', 'CS', 'ORIGINAL\\PRIMARY\\M\\ND'),
    text('0008,0016', 'UI', mrImage),
    text('0008,0060', 'CS', 'MR'),
    text('0018,0020', 'CS', 'SE'),
    text('0018,0021', 'CS', 'SK'),
    text('0018,0023', 'CS', '2D'),
    text('0018,0050', 'DS', '4'),
    text('0018,0080', 'DS', '4000'),
    text('0018,0081', 'DS', '100'),
    text('0018,0083', 'DS', '2'),
    text('0018,0087', 'DS', '3'),
    text('0018,0088', 'DS', '4.4'),
    text('0018,0091', 'IS', '16'),
    text('0018,0094', 'DS', '80'),
    text('0018,0095', 'DS', '220'),
    { tag: '0018,1310', vr: 'US', value: [320, 0, 0, 205] },
    text('0018,1312', 'CS', 'COL'),
    text('0018,1314', 'DS', '90'),
    text('0020,000e', 'UI', `1.2.3.${series}`),
    text('0020,0011', 'IS', String(series)),
    text('0020,0032', 'DS', `-100\\-100\\${(i % 100) * 4.4}`),
    text('0020,0037', 'DS', '1\\0\\0\\0\\1\\0'),
    { tag: '0028,0010', vr: 'US', value: [256] },
    { tag: '0028,0011', vr: 'US', value: [320] },
    text('0028,0030', 'DS', '0.7\\0.7'),
    ...Array.from({ length: 100 }, (_, k) => text(`0019,${(0x1000 + k).toString(16)}`, 'LO', `invented ${k}`)),
    text('0029,1020', 'OB', 'x'.repeat(8000)),
    { tag: '0008,1140', vr: 'SQ', value: [[text('0008,1150', 'UI', '1.2'), text('0008,1155', 'UI', '1.2.3')]] },
  ];
  const pixels = Buffer.alloc(12 + 256 * 320 * 2);
  pixels.write('\xe0\x7f\x10\x00OW', 0, 'latin1');
  pixels.writeUInt32LE(256 * 320 * 2, 8);
  return Buffer.concat([dicomObject(attributes), pixels]);
}

/** The yardstick: the first 64 kB of the same files, read one after the other and thrown away. */
async function readFirstBytes(folder: string): Promise<number> {
  const buffer = Buffer.alloc(firstBytes);
  let bytes = 0;
  for (const name of await nodeDisk.names(folder)) {
    const file = await nodeDisk.open(join(folder, name), 'read');
    bytes += await file.read(buffer, 0);
    await file.close();
  }
  return bytes;
}

async function readAll(folder: string): Promise<number> {
  const collector = new SeriesCollector();
  await readHeaders(nodeDisk, [folder], {
    header: (header) => collector.add(header),
    problem: ({ message }) => {
      throw new Error(message);
    },
  });
  return collector.series().map((one, i) => readSeries(one, `s${i}`)).length;
}

interface Reading {
  readonly headersMs: readonly number[];
  readonly bytesMs: readonly number[];
  readonly firstMb: number;
  readonly lastMb: number;
}

function liveMb(): number {
  setFlagsFromString('--expose_gc');
  (runInNewContext('gc') as () => void)();
  return process.memoryUsage().heapUsed / 1e6;
}

async function measureAll(): Promise<Reading> {
  const folder = mkdtempSync(join(tmpdir(), 'holdfast-bench-'));
  try {
    for (let i = 0; i < objects; i += 1) writeFileSync(join(folder, `${String(i).padStart(5, '0')}.dcm`), invented(i));
    const [headersMs, bytesMs]: [number[], number[]] = [[], []];
    // Time of the processor, reading included: what other programs take meanwhile is not ours.
    const time = async (work: () => Promise<unknown>) => {
      const start = process.cpuUsage();
      await work();
      const { user, system } = process.cpuUsage(start);
      return (user + system) / 1000;
    };
    if ((await readAll(folder)) !== objects / 100) throw new Error('the series were not told apart');
    await readFirstBytes(folder);
    for (let i = 0; i < rounds; i += 1) {
      bytesMs.push(await time(() => readFirstBytes(folder)));
      headersMs.push(await time(() => readAll(folder)));
    }
    const firstMb = liveMb();
    for (let i = 0; i < memoryRounds; i += 1) await readAll(folder);
    return { headersMs, bytesMs, firstMb, lastMb: liveMb() };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

let reading: Promise<Reading> | null = null;

function read(): Promise<Reading> {
  reading ??= measureAll();
  return reading;
}

/** A folder as a physicist names it: an exam of 2,000 images. */
export const rows: readonly Row[] = [
  {
    name: `headers of a folder of ${objects} objects`,
    against: 'reading the first 64 kB of the same files',
    unit: 'ms',
    budget: 2,
    measure: async (): Promise<Measured> => {
      const { headersMs, bytesMs } = await read();
      const ratio = median(headersMs.map((ms, i) => ms / bytesMs[i]!));
      return { subject: median(headersMs), yardstick: median(bytesMs), ratio };
    },
  },
  {
    name: `headers, live memory after ${objects * (rounds + memoryRounds)} objects`,
    against: `that after ${objects * rounds}`,
    unit: 'MB',
    budget: 1.1,
    measure: async (): Promise<Measured> => {
      const { firstMb, lastMb } = await read();
      return { subject: lastMb, yardstick: firstMb, ratio: lastMb / firstMb };
    },
  },
];
