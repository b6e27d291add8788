import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { openWorld } from '../../src/effects/open-world.js';
import { lineText } from '../../src/screens/line.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import type { HeadersFound } from '../../src/session/header-view.js';
import type { Answer, Message } from '../../src/session/message.js';
import { update } from '../../src/session/update.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { asciiGlyphs } from '../../src/terminal/glyphs.js';
import { imagesOfPreset, singleFrames } from '../headers/attributes-of-preset.js';
import { type Attribute, dicomObject } from '../headers/dicom-object.js';
import { markedAttributes, marks } from '../headers/marked-object.js';
import { inventedFolder, inventedHeaders } from '../session/invented-headers.js';
import { keyOf, presetChoice, startState } from '../session/invented-state.js';
import { temporaryFolder } from '../store/temporary-folder.js';

/** Somebody's world, and a folder of objects in their home. */
async function atHome(objects: readonly Buffer[]) {
  const home = temporaryFolder();
  mkdirSync(join(home, 'my exam', 'inner'), { recursive: true });
  for (const [at, bytes] of objects.entries())
    writeFileSync(join(home, 'my exam', at % 2 === 0 ? '' : 'inner', `${String(at).padStart(4, '0')}.dcm`), bytes);
  const world = await openWorld({
    disk: nodeDisk,
    environment: {},
    homeFolder: home,
    workingFolder: join(home, 'my exam'),
    shippedPresets: null,
    presets: undefined,
    records: undefined,
    programUrl: import.meta.url,
  });
  const told: Message[] = [];
  world.listen((message) => told.push(message));
  return { home, told, run: world.runEffect, leave: world.leave };
}

function foundIn(answer: Answer | null): HeadersFound {
  if (answer?.kind !== 'headers') throw new Error(JSON.stringify(answer));
  return answer.found;
}

const problemOf = (answer: Answer | null) => (answer?.kind === 'failed' ? answer.problems[0]?.message : undefined);

describe('a folder read from the interface', () => {
  it('gives the same series as the command, whatever way the path was typed', async () => {
    const { home, run } = await atHome(inventedFolder);
    const whole = join(home, 'my exam');
    for (const path of [whole, `"${whole}"`, `'${whole}'`, whole.replace(' ', '\\ '), '~/my exam', '~/my exam/', '.']) {
      const found = foundIn(await run({ kind: 'read-headers', ask: 1, path }));
      expect([path, found.series.length, found.read, found.isStopped]).toEqual([path, 4, inventedFolder.length, false]);
      expect(found.series.map(({ decision }) => decision)).toEqual(inventedHeaders.series.map(({ decision }) => decision));
    }
  });

  it('a wrong path, and a folder without headers, are told in words that name no file', async () => {
    const { home, run } = await atHome([Buffer.from('PK\u0003\u0004 packed')]);
    expect(problemOf(await run({ kind: 'read-headers', ask: 1, path: '/no/such/DOE^JANE' }))).toBe('Nothing is there under this path.');
    expect(problemOf(await run({ kind: 'read-headers', ask: 2, path: `${home}/my exam/0000.dcm/x` }))).toBe(
      'Nothing is there under this path.',
    );
    expect(problemOf(await run({ kind: 'read-headers', ask: 3, path: '~/my exam' }))).toBe(
      'No MR object and no sidecar among 1 file (1 file is a packed file (zip or gzip)).',
    );
    expect(problemOf(await run({ kind: 'class-headers', ask: 4, id: 's1', key: 'spin-echo/2D' }))).toContain('No series s1');
  });

  it('what cannot be read is counted by kind and the rest is read', async () => {
    const cut = inventedFolder[0]!.subarray(0, 700);
    const { run } = await atHome([...inventedFolder, Buffer.from('PK\u0003\u0004'), Buffer.from('PK\u0003\u0004'), cut]);
    const found = foundIn(await run({ kind: 'read-headers', ask: 1, path: '.' }));
    expect(found.read).toBe(inventedFolder.length);
    expect([...found.notes].sort()).toEqual([
      '1 file is damaged or cut short: its header ends before it should',
      '2 files, each is a packed file (zip or gzip)',
    ]);
  });

  it('another class is read from what was collected', async () => {
    const { run } = await atHome(inventedFolder);
    const found = foundIn(await run({ kind: 'read-headers', ask: 1, path: '.' }));
    const id = found.series.find(({ decision }) => decision.key === null)?.id ?? '';
    const answer = await run({ kind: 'class-headers', ask: 2, id, key: 'fast-spin-echo/2D' });
    expect(answer).toMatchObject({ kind: 'header-series', series: { id, decision: { key: 'fast-spin-echo/2D', reason: 'typed' } } });
    expect(await run({ kind: 'class-headers', ask: 3, id, key: null })).toMatchObject({ series: { decision: { key: null } } });
  });

  it('goes on between keys, tells how far it is, is stopped with what it has, and ends when the interface is left', async () => {
    const many = Array.from({ length: 40 }, () => inventedFolder).flat();
    const { run, told, leave } = await atHome(many);
    let turns = 0;
    const turning = setInterval(() => {
      turns += 1;
    }, 0);
    const whole = foundIn(await run({ kind: 'read-headers', ask: 1, path: '.' }));
    clearInterval(turning);
    expect(turns).toBeGreaterThan(5);
    expect(whole.read).toBe(many.length);
    for (const message of told) expect(message).toMatchObject({ kind: 'counted', ask: 1 });

    const stopping = run({ kind: 'read-headers', ask: 2, path: '.' });
    await new Promise((resolve) => setTimeout(resolve, 15));
    await run({ kind: 'stop-headers' });
    const answer = await stopping;
    // So early that nothing may have been read yet.
    if (answer?.kind === 'headers') {
      expect(answer.found.isStopped).toBe(true);
      expect(answer.found.read).toBeLessThan(many.length);
    } else expect(problemOf(answer)).toBe('Stopped before the first header.');

    const first = run({ kind: 'read-headers', ask: 3, path: '.' });
    const second = run({ kind: 'read-headers', ask: 4, path: '.' });
    expect(await first).toBeNull();
    expect(foundIn(await second).isStopped).toBe(false);

    const left = run({ kind: 'read-headers', ask: 5, path: '.' });
    await leave(null);
    const last = await left;
    expect(last?.kind === 'headers' ? last.found.isStopped : problemOf(last)).toBeTruthy();
  });

  it('nothing that could name somebody reaches answers, screens or the draft that is saved', async () => {
    const { study } = presetChoice('liver-3t');
    const series = study.series.find(({ id }) => id === 't1-3d')!;
    const images = singleFrames(imagesOfPreset({ ...series, parameters: { ...series.parameters, sliceCount: 3 } }, 3), '1.2.7.7.7.77.9');
    const withMarks = (attributes: readonly Attribute[]) => {
      const byTag = new Map(markedAttributes().map((one) => [one.tag, one]));
      for (const one of attributes) byTag.set(one.tag, one);
      return dicomObject([...byTag.values()]);
    };
    const { home, run, told } = await atHome([]);
    mkdirSync(join(home, 'ZQXMARK'));
    for (const [at, image] of images.entries()) writeFileSync(join(home, 'ZQXMARK', `ZQXMARK${at}`), withMarks(image));
    writeFileSync(join(home, 'ZQXMARK', 'ZQXMARK.zip'), 'PK\u0003\u0004');
    const typing = update(startState(), { kind: 'key', key: keyOf('/'), atMs: 1 })[0];
    const reading = update(update(typing, { kind: 'key', key: { name: 'paste', text: '~/ZQXMARK' }, atMs: 2 })[0], {
      kind: 'key',
      key: keyOf('enter'),
      atMs: 3,
    })[0];
    const answer = await run({ kind: 'read-headers', ask: 1, path: '~/ZQXMARK' });
    expect(foundIn(answer).read).toBe(3);
    const list = update(reading, { kind: 'answer', ask: reading.open.headers!, answer: answer! })[0];
    const review = update(list, { kind: 'key', key: keyOf('enter'), atMs: 4 })[0];
    const frames = [list, review].flatMap((state) =>
      [false, true].flatMap((reader) =>
        screenLines({ ...state, size: { columns: 160, rows: 50 } }, { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader }).map(
          lineText,
        ),
      ),
    );
    const [saving] = update(list, { kind: 'key', key: keyOf('s'), atMs: 5 })[1];
    if (saving?.kind !== 'save-preset') throw new Error('nothing is saved');
    const saved = await run(saving);
    const files = readdirSync(home, { recursive: true, encoding: 'utf8' }).filter(
      (name) => !name.startsWith('ZQXMARK') && statSync(join(home, name)).isFile(),
    );
    expect(files.some((name) => name.endsWith('-draft.json'))).toBe(true);
    const texts = [
      JSON.stringify(answer),
      JSON.stringify(saved),
      JSON.stringify(told),
      ...frames,
      ...files,
      ...files.map((name) => readFileSync(join(home, name), 'utf8')),
    ];
    for (const text of texts) for (const mark of marks) expect(text.includes(mark) ? text : '').toBe('');
  });
});
