import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { openWorld } from '../../src/effects/open-world.js';
import type { Message } from '../../src/session/message.js';
import { nodeDisk } from '../../src/store/node-disk.js';

const presets = new URL('../../presets', import.meta.url).pathname;

/** What the interface is told at the start, in a home with some files beside the settings. */
async function told(files: Readonly<Record<string, string>>, environment: Readonly<Record<string, string>> = {}): Promise<Message[]> {
  const homeFolder = mkdtempSync(join(tmpdir(), 'holdfast-scanners-'));
  const settings = join(homeFolder, '.config', 'holdfast');
  mkdirSync(join(settings, 'scanners'), { recursive: true });
  for (const [name, text] of Object.entries(files)) writeFileSync(join(settings, name), text);
  const world = await openWorld({
    disk: nodeDisk,
    environment,
    homeFolder,
    workingFolder: homeFolder,
    shippedPresets: presets,
    presets: undefined,
    records: undefined,
    programUrl: import.meta.url,
  });
  const messages = (await Promise.all(world.firstMessages)).flat();
  await world.leave(null);
  return messages;
}

const room2 = JSON.stringify({ format: 'holdfast scanner', version: 1, name: 'room 2', fieldT: 1.5 });
const rules = { format: 'holdfast rules', version: 1, rules: [{ mustKeep: { rule: 'averages <= 4', source: 'invented' } }] };

const scannersOf = (messages: readonly Message[]) =>
  messages.flatMap((message) => (message.kind === 'scanners' ? [[message.scanners.map(({ name }) => name), message.notes]] : []));
const notesOf = (messages: readonly Message[]) => messages.flatMap((message) => (message.kind === 'note' ? [message.words] : []));
const rulesOf = (messages: readonly Message[]) =>
  messages.flatMap((message) => (message.kind === 'site-rules' ? [message.siteRules.rules] : []));

describe('scanner files and rules of the site at the start of the interface', () => {
  it('reads the scanners of the settings folder and the shipped ones, and no rules where there are none', async () => {
    const messages = await told({ 'scanners/room2.json': room2 });
    expect(scannersOf(messages)).toEqual([[['demo-1.5t', 'demo-3t', 'room 2'], []]]);
    expect(rulesOf(messages)).toEqual([[]]);
    expect(notesOf(messages)).toEqual([]);
  });

  it('knows the scanner that the settings name before a preset can be opened', async () => {
    const order = (messages: readonly Message[]) =>
      messages.map(({ kind }) => kind).filter((kind) => ['scanners', 'presets'].includes(kind));
    expect(order(await told({ 'config.json': '{ "scannerName": "demo-3t" }' }))).toEqual(['scanners', 'presets']);
    expect(order(await told({}))).toEqual(['presets', 'scanners']);
  });

  it('a scanner file of the site wins over a shipped one of the same name', async () => {
    const messages = await told({ 'scanners/own.json': room2.replace('room 2', 'Demo-3T') });
    const scanners = messages.flatMap((message) => (message.kind === 'scanners' ? message.scanners : []));
    expect(scanners.map(({ name, fieldT }) => `${name} ${fieldT}`)).toEqual(['demo-1.5t 1.494', 'Demo-3T 1.5']);
  });

  it('says what is wrong with a scanner file, and offers the others', async () => {
    const [[names, notes] = [[], []]] = scannersOf(await told({ 'scanners/room2.json': '{ "format": "holdfast scanner" }' }));
    expect(names).toEqual(['demo-1.5t', 'demo-3t']);
    expect(String(notes)).toMatch(/room2\.json/);
  });

  it('reads the rules beside the settings', async () => {
    expect(rulesOf(await told({ 'rules.json': JSON.stringify(rules) }))).toEqual([rules.rules]);
  });

  it.each([
    ['a formula that is refused', JSON.stringify(rules).replace('averages <= 4', 'averages = 4'), /rules\.json/],
    ['no JSON', 'keep it sharp', /rules\.json/],
  ])('tells of rules with %s, and the rest works', async (_name, text, words) => {
    const messages = await told({ 'rules.json': text });
    expect(rulesOf(messages)).toEqual([]);
    expect(notesOf(messages)).toEqual([expect.stringMatching(/^The rules of the site are not checked: /)]);
    expect(notesOf(messages)[0]).toMatch(words);
    expect(messages.some((message) => message.kind === 'presets' && message.presets.length > 20)).toBe(true);
  });

  it('tells of named rules that are not there', async () => {
    expect(notesOf(await told({}, { HOLDFAST_RULES: '/nowhere/rules.json' }))).toEqual([
      expect.stringMatching(/not checked: .*rules\.json/),
    ]);
  });
});
