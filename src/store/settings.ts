import { preparationS, restS } from '../calc/time.js';

/** Which characters the screen may use; `auto` asks the locale. */
export const glyphChoices = ['auto', 'unicode', 'ascii'] as const;
/** How many colours; `auto` asks the terminal. */
export const colourChoices = ['auto', 'never', '16', '256', 'true'] as const;

/** What a person or a site set on purpose. Nothing else is kept here. */
export interface Settings {
  /** Nicknames for the record; empty when none was given. No serial numbers. */
  readonly scannerName: string;
  readonly coilName: string;
  /** Role of whoever works here: technologist, physicist... */
  readonly role: string;
  readonly glyphs: (typeof glyphChoices)[number];
  readonly colour: (typeof colourChoices)[number];
  /** Rest between two breath-holds. */
  readonly restS: number;
  /** Preparation before a series. */
  readonly preparationS: number;
  /** Screens as linear text. */
  readonly readerMode: boolean;
  /** Permissions of files that are made, in octal digits. */
  readonly fileMode: string;
  /** Whether records name the day. */
  readonly keepDay: boolean;
  /** Whether releasing a preset takes a second role. */
  readonly secondRoleToRelease: boolean;
  /** Presets of the site; null when there are none. */
  readonly presetsFolder: string | null;
  /** Where records go; null for the user's own folder. */
  readonly recordsFile: string | null;
}

/** Settings of somebody who set nothing. */
export const defaultSettings: Settings = {
  scannerName: '',
  coilName: '',
  role: 'technologist',
  glyphs: 'auto',
  colour: 'auto',
  restS,
  preparationS,
  readerMode: false,
  fileMode: '0600',
  keepDay: true,
  secondRoleToRelease: false,
  presetsFolder: null,
  recordsFile: null,
};

/** All keys of the settings file. */
export const settingKeys = Object.keys(defaultSettings) as readonly (keyof Settings)[];

/**
 * The number behind `fileMode`.
 *
 * @example fileModeOf({ ...defaultSettings, fileMode: '0660' }).toString(8) //=> '660'
 */
export function fileModeOf(settings: Settings): number {
  return Number.parseInt(settings.fileMode, 8);
}
