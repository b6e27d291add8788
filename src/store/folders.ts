import { isAbsolute, join, resolve } from 'node:path';

/** Where things are kept. */
export interface Folders {
  readonly settingsFolder: string;
  readonly recordsFile: string;
  readonly draftsFolder: string;
  /** Presets that this user saved. */
  readonly ownPresetsFolder: string;
  /** Presets of the site; null when none is named. */
  readonly sitePresetsFolder: string | null;
  /** Scanner files of the site; null when none is named. */
  readonly siteScannersFolder: string | null;
  /** Rules of the site; null when none is named: then `rules.json` beside the settings holds, where it is there. */
  readonly siteRulesFile: string | null;
}

/** The variables of the environment that are asked. */
export interface Environment {
  readonly XDG_CONFIG_HOME?: string | undefined;
  readonly XDG_DATA_HOME?: string | undefined;
  readonly XDG_STATE_HOME?: string | undefined;
  readonly HOLDFAST_PRESETS?: string | undefined;
  readonly HOLDFAST_RECORDS?: string | undefined;
  readonly HOLDFAST_SCANNERS?: string | undefined;
  readonly HOLDFAST_RULES?: string | undefined;
}

/** What decides where things are kept; flags win over the environment, that over the settings. */
export interface FolderChoices {
  readonly environment: Environment;
  readonly homeFolder: string;
  /** Relative paths that a person gave are looked up from here. */
  readonly workingFolder: string;
  readonly flags?: { readonly presets?: string | undefined; readonly records?: string | undefined };
  readonly settings?: { readonly presetsFolder: string | null; readonly recordsFile: string | null };
}

/**
 * The folders of this user after the XDG Base Directory Specification 0.8: `$XDG_CONFIG_HOME`, `$XDG_DATA_HOME`, `$XDG_STATE_HOME`,
 * each with `holdfast` in it. A relative path in one of them is left aside, as that specification asks.
 */
export function foldersOf({ environment, homeFolder, workingFolder, flags = {}, settings }: FolderChoices): Folders {
  const base = (given: string | undefined, otherwise: string) => {
    return join(given !== undefined && isAbsolute(given) ? given : join(homeFolder, otherwise), 'holdfast');
  };
  const chosen = (...choices: readonly (string | null | undefined)[]) => {
    const first = choices.find((choice) => choice !== null && choice !== undefined && choice !== '');
    return first ? resolve(workingFolder, first) : null;
  };
  const dataFolder = base(environment.XDG_DATA_HOME, join('.local', 'share'));
  return {
    settingsFolder: base(environment.XDG_CONFIG_HOME, '.config'),
    recordsFile: chosen(flags.records, environment.HOLDFAST_RECORDS, settings?.recordsFile) ?? join(dataFolder, 'records.jsonl'),
    draftsFolder: base(environment.XDG_STATE_HOME, join('.local', 'state')),
    ownPresetsFolder: join(dataFolder, 'presets'),
    sitePresetsFolder: chosen(flags.presets, environment.HOLDFAST_PRESETS, settings?.presetsFolder),
    siteScannersFolder: chosen(environment.HOLDFAST_SCANNERS),
    siteRulesFile: chosen(environment.HOLDFAST_RULES),
  };
}
