import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { inventedRecords } from '../../scripts/invented-records.js';
import { linesOfFile } from '../../src/store/lines-of-file.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { maximumRecordBytes } from '../../src/store/record-file.js';
import { readRecords } from '../../src/store/record-reader.js';
import { recordLine } from '../../src/study/record-line.js';
import { RecordCounts } from '../../src/study/record-report.js';
import { median } from '../median.js';
import type { Measured, Row } from '../row.js';

/** Records of five series in one file, files of different records, and how often these are read one after the other. */
const recordsAFile = 2000;
const differentFiles = 10;
const filesInAll = 50;
const few = recordsAFile * differentFiles;
const many = recordsAFile * filesInAll;

/** One long reading, file by file: the report and the bare parsing of the same file take turns, so that the machine weighs on both. */
interface Reading {
  readonly reportUs: readonly number[];
  readonly parseUs: readonly number[];
  /** Live memory of the whole process after so many records, MB. */
  readonly afterFewMb: number;
  readonly afterManyMb: number;
}

/** The yardstick: the same reading of the same file, each line parsed as JSON and nothing else. */
async function parseLines(path: string): Promise<number> {
  const file = await nodeDisk.open(path, 'read');
  let kept = 0;
  for await (const { bytes } of linesOfFile(file, maximumRecordBytes)) {
    if (bytes === null || bytes.length === 0) continue;
    kept += (JSON.parse(bytes.toString('utf8')) as { series: unknown[] }).series.length;
  }
  await file.close();
  return kept;
}

async function countLines(path: string, counts: RecordCounts): Promise<void> {
  for await (const entry of readRecords(nodeDisk, [path])) if (entry.kind === 'record') counts.add(entry.record);
}

function collectGarbage(): void {
  setFlagsFromString('--expose_gc');
  (runInNewContext('gc') as () => void)();
}

async function readAll(): Promise<Reading> {
  const folder = mkdtempSync(join(tmpdir(), 'holdfast-bench-'));
  try {
    const paths = Array.from({ length: differentFiles }, (_, i) => join(folder, `${i}.jsonl`));
    for (const [i, path] of paths.entries()) {
      writeFileSync(path, [...inventedRecords(recordsAFile, i + 1)].map((record) => `${recordLine(record)}\n`).join(''));
    }
    // Once through for the compiler, into counts that are thrown away.
    await countLines(paths[0]!, new RecordCounts());
    if ((await parseLines(paths[0]!)) !== recordsAFile * 5) throw new Error('the yardstick did not read what it should');
    const counts = new RecordCounts();
    const [reportUs, parseUs]: [number[], number[]] = [[], []];
    let afterFewMb = 0;
    const liveMb = () => {
      collectGarbage();
      return process.memoryUsage().heapUsed / 1e6;
    };
    // Time of the processor, reading included: what other programs take meanwhile is not ours.
    const time = async (work: () => Promise<unknown>) => {
      const start = process.cpuUsage();
      await work();
      const { user, system } = process.cpuUsage(start);
      return (user + system) / recordsAFile;
    };
    for (let i = 0; i < filesInAll; i += 1) {
      const path = paths[i % differentFiles]!;
      const report = () => countLines(path, counts);
      const parse = () => parseLines(path);
      if (i % 2 === 0) reportUs.push(await time(report));
      parseUs.push(await time(parse));
      if (i % 2 === 1) reportUs.push(await time(report));
      if (i + 1 === differentFiles) afterFewMb = liveMb();
    }
    const afterManyMb = liveMb();
    if (counts.report().sessions !== many) throw new Error(`the report counted ${counts.report().sessions} sessions of ${many}`);
    return { reportUs, parseUs, afterFewMb, afterManyMb };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

let reading: Promise<Reading> | null = null;

function read(): Promise<Reading> {
  reading ??= readAll();
  return reading;
}

/** Report over parsing, file by file, of the first so many files. */
function againstParsing({ reportUs, parseUs }: Reading, files: number): Measured {
  const ratios = reportUs.slice(0, files).map((us, i) => us / parseUs[i]!);
  return { subject: median(reportUs.slice(0, files)), yardstick: median(parseUs.slice(0, files)), ratio: median(ratios) };
}

/** What the lead asks at the end of a shift, or the physicist once a year: it must not take longer for a longer file. */
export const rows: readonly Row[] = [
  {
    name: `records report over ${few} sessions of five series, a session`,
    against: 'reading and parsing the same lines as JSON',
    unit: 'us',
    budget: 1.5,
    measure: async () => againstParsing(await read(), differentFiles),
  },
  {
    name: `records report over ${many} sessions of five series, a session`,
    against: 'reading and parsing the same lines as JSON',
    unit: 'us',
    budget: 1.5,
    measure: async () => againstParsing(await read(), filesInAll),
  },
  {
    name: `records report, time a session over ${many}`,
    against: `that over ${few}, both against parsing`,
    unit: 'us',
    budget: 1.2,
    measure: async () => {
      const [a, b] = [againstParsing(await read(), differentFiles), againstParsing(await read(), filesInAll)];
      return { subject: b.subject, yardstick: a.subject, ratio: b.ratio / a.ratio };
    },
  },
  {
    name: `records report, live memory after ${many} sessions`,
    against: `that after ${few}`,
    unit: 'MB',
    budget: 1.2,
    measure: async () => {
      const { afterFewMb, afterManyMb } = await read();
      return { subject: afterManyMb, yardstick: afterFewMb, ratio: afterManyMb / afterFewMb };
    },
  },
];
