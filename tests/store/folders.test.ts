import { describe, expect, it } from 'vitest';
import { foldersOf } from '../../src/store/folders.js';

const place = { environment: {}, homeFolder: '/home/a', workingFolder: '/work' };

describe('foldersOf', () => {
  it('keeps settings, records and drafts in the folders of the XDG specification', () => {
    expect(foldersOf(place)).toEqual({
      settingsFolder: '/home/a/.config/holdfast',
      recordsFile: '/home/a/.local/share/holdfast/records.jsonl',
      draftsFolder: '/home/a/.local/state/holdfast',
      ownPresetsFolder: '/home/a/.local/share/holdfast/presets',
      sitePresetsFolder: null,
      siteScannersFolder: null,
      siteRulesFile: null,
    });
    const environment = { XDG_CONFIG_HOME: '/c', XDG_DATA_HOME: '/d', XDG_STATE_HOME: '/s' };
    expect(foldersOf({ ...place, environment })).toMatchObject({
      settingsFolder: '/c/holdfast',
      recordsFile: '/d/holdfast/records.jsonl',
      draftsFolder: '/s/holdfast',
    });
  });

  it("finds the site's scanner files and rules by the environment, from where the program was started", () => {
    const environment = { HOLDFAST_SCANNERS: 'scanners', HOLDFAST_RULES: '/site/rules.json' };
    expect(foldersOf({ ...place, environment })).toMatchObject({ siteScannersFolder: '/work/scanners', siteRulesFile: '/site/rules.json' });
    expect(foldersOf({ ...place, environment: { HOLDFAST_SCANNERS: '', HOLDFAST_RULES: '' } })).toEqual(foldersOf(place));
  });

  it('leaves relative and empty XDG paths aside', () => {
    expect(foldersOf({ ...place, environment: { XDG_CONFIG_HOME: 'c', XDG_STATE_HOME: '' } })).toEqual(foldersOf(place));
  });

  it('takes flags before the environment before the settings', () => {
    const settings = { presetsFolder: '/set/p', recordsFile: '/set/r' };
    const environment = { HOLDFAST_PRESETS: '/env/p', HOLDFAST_RECORDS: '/env/r' };
    const flags = { presets: 'p', records: '/flag/r' };
    expect(foldersOf({ ...place, settings })).toMatchObject({ sitePresetsFolder: '/set/p', recordsFile: '/set/r' });
    expect(foldersOf({ ...place, settings, environment })).toMatchObject({ sitePresetsFolder: '/env/p', recordsFile: '/env/r' });
    expect(foldersOf({ ...place, settings, environment, flags })).toMatchObject({ sitePresetsFolder: '/work/p', recordsFile: '/flag/r' });
    expect(foldersOf({ ...place, settings, environment: { HOLDFAST_PRESETS: '' } })).toMatchObject({ sitePresetsFolder: '/set/p' });
  });
});
