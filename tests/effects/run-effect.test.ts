import { mkdtempSync, readFileSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { openWorld } from '../../src/effects/open-world.js';
import { recordOfSession, studyOfSession } from '../../src/session/record-of-session.js';
import { draftNow } from '../../src/session/update.js';
import { nodeDisk } from '../../src/store/node-disk.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';
import { onField, press, sessionOn } from '../session/invented-state.js';

const presets = new URL('../../presets', import.meta.url).pathname;

function worldIn(homeFolder: string) {
  return openWorld({
    disk: nodeDisk,
    environment: {},
    homeFolder,
    workingFolder: homeFolder,
    shippedPresets: presets,
    presets: undefined,
    records: undefined,
    programUrl: import.meta.url,
  });
}

const newHome = () => mkdtempSync(join(tmpdir(), 'holdfast-effects-'));
const changed = () => press(onField(press(sessionOn('liver-3t'), 'enter'), 'sliceCount'), '-');

describe('the effects of the interface on a disk of their own', () => {
  it('a record is one line that reads back, with an id and a day, in a file of mode 0600', async () => {
    const home = newHome();
    const world = await worldIn(home);
    const record = recordOfSession(changed());
    if (record === null) throw new Error('no record');
    const answer = await world.runEffect({ kind: 'save-record', ask: 1, record, again: false });
    expect(answer).toMatchObject({ kind: 'done' });
    const path = join(home, '.local/share/holdfast/records.jsonl');
    const read = readRecordLine(readFileSync(path, 'utf8').trim());
    expect(read.ok && read.value).toMatchObject({
      region: 'liver',
      fieldT: 3,
      day: expect.stringMatching(/^\d{4}-\d\d-\d\d$/),
      series: [{ id: 't1-3d' }],
    });
    expect(statSync(path).mode & 0o777).toBe(0o600);
    await world.leave(null);
  });

  it('a draft is offered to the next program, and goes when its record is saved', async () => {
    const home = newHome();
    const first = await worldIn(home);
    await first.leave(draftNow(changed()));
    const second = await worldIn(home);
    const [drafts] = (await Promise.all(second.firstMessages)).flat().filter(({ kind }) => kind === 'drafts');
    expect(drafts).toMatchObject({ drafts: [{ session: { opened: { study: { id: 'liver-3t' } } } }] });
    const id = drafts?.kind === 'drafts' ? (drafts.drafts[0]?.id ?? '') : '';
    expect(await second.runEffect({ kind: 'claim-draft', ask: 1, id })).toMatchObject({ kind: 'draft' });
    expect(await second.runEffect({ kind: 'claim-draft', ask: 2, id })).toMatchObject({ kind: 'failed' });
    await second.runEffect({ kind: 'drop-draft' });
    await second.leave(null);
    const third = await worldIn(home);
    expect((await Promise.all(third.firstMessages)).flat()).toContainEqual({ kind: 'drafts', drafts: [] });
    await third.leave(null);
  });

  it('a draft preset is saved under a name of its own and can then be chosen', async () => {
    const home = newHome();
    const world = await worldIn(home);
    const study = studyOfSession(changed());
    if (study === null) throw new Error('no study');
    expect(await world.runEffect({ kind: 'save-preset', ask: 1, study })).toMatchObject({
      kind: 'done',
      words: expect.stringContaining('liver-3t-draft'),
    });
    const again = await worldIn(home);
    const messages = (await Promise.all(again.firstMessages)).flat();
    const own = messages
      .flatMap((message) => (message.kind === 'presets' ? message.presets : []))
      .find((preset) => preset.study.id === 'liver-3t-draft');
    expect(own?.origin).toBe('own');
    expect(own?.study.series.find(({ id }) => id === 't1-3d')?.parameters.sliceCount).toBe(70);
  });

  it('an expression is worked out, or refused with what was given and expected', async () => {
    const world = await worldIn(newHome());
    const own = { name: 'averages', unit: '', value: 4 };
    expect(await world.runEffect({ kind: 'read-expression', ask: 1, text: '/2', own })).toEqual({ kind: 'value', value: 2 });
    expect(await world.runEffect({ kind: 'read-expression', ask: 2, text: 'sqrt(4)', own })).toMatchObject({ kind: 'failed' });
  });

  it('a page for paper says what changed', async () => {
    const home = newHome();
    const world = await worldIn(home);
    const record = recordOfSession(changed());
    if (record === null) throw new Error('no record');
    const answer = await world.runEffect({ kind: 'save-page', ask: 1, record });
    const path = answer?.kind === 'done' ? answer.words.replace('Page written: ', '') : '';
    expect(readFileSync(path, 'utf8')).toContain('NO REASON GIVEN');
  });
});
