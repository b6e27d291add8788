import { isAbsolute } from 'node:path';
import { shownValue } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { freeText } from '../study/record-text.js';
import { type StoreProblem, storeProblem } from './problem-of-error.js';
import { colourChoices, glyphChoices, type Settings, settingKeys } from './settings.js';

interface SettingCheck {
  readonly expected: string;
  readonly holds: (value: unknown) => boolean;
}

const longestS = 600;
const name: SettingCheck = {
  expected: 'text of at most 80 characters without control characters',
  holds: (value) => typeof value === 'string' && value === freeText(value),
};
const flag: SettingCheck = { expected: 'true or false', holds: (value) => typeof value === 'boolean' };
const seconds: SettingCheck = {
  expected: `seconds from 0 to ${longestS}`,
  holds: (value) => typeof value === 'number' && value >= 0 && value <= longestS,
};
const place: SettingCheck = {
  expected: 'an absolute path, or null',
  holds: (value) => value === null || (typeof value === 'string' && isAbsolute(value) && !value.includes('\0')),
};

function oneOf(choices: readonly string[]): SettingCheck {
  return { expected: `one of ${choices.join(', ')}`, holds: (value) => typeof value === 'string' && choices.includes(value) };
}

const checks: Readonly<Record<keyof Settings, SettingCheck>> = {
  scannerName: name,
  coilName: name,
  role: name,
  glyphs: oneOf(glyphChoices),
  colour: oneOf(colourChoices),
  restS: seconds,
  preparationS: seconds,
  readerMode: flag,
  // Without reading and writing by the owner the next start could not read what this one wrote.
  fileMode: {
    expected: 'octal digits from "0600" to "0666", in quotes',
    holds: (value) => typeof value === 'string' && /^0?6[0246][0246]$/.test(value),
  },
  keepDay: flag,
  secondRoleToRelease: flag,
  presetsFolder: place,
  recordsFile: place,
};

/** Everything that is wrong with settings as a file or a person gives them. Exit code 78. */
export function settingProblems(given: Readonly<Record<string, unknown>>, file: string): StoreProblem[] {
  return Object.entries(given).flatMap(([key, value]) => {
    if (!Object.hasOwn(checks, key)) return [unknownKey(key, file)];
    const { expected, holds } = checks[key as keyof Settings];
    if (holds(value)) return [];
    return [
      storeProblem(
        'setting-wrong',
        78,
        key,
        `${file}: ${key} is ${shownValue(value)}, expected ${expected}.`,
        'Mend or remove this line of the settings.',
      ),
    ];
  });
}

function unknownKey(key: string, file: string): StoreProblem {
  const near = nearestWord(key, settingKeys);
  const hint = near === null ? `Known are ${settingKeys.join(', ')}.` : `Did you mean ${near}?`;
  return storeProblem('setting-unknown', 78, key, `${file}: ${shownValue(key)} is no setting.`, hint);
}
