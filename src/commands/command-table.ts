import type { CommandRow, OptionRow } from './command-row.js';

/** Options that every command takes. */
export const everywhere: readonly OptionRow[] = [
  { name: 'presets', value: 'DIR', help: "folder with the site's presets (or HOLDFAST_PRESETS)" },
  { name: 'records', value: 'FILE', help: 'file that sessions are recorded in (or HOLDFAST_RECORDS)' },
  { name: 'ascii', value: null, help: 'plain ASCII characters only' },
  { name: 'reader', value: null, help: 'one sentence a line, for screen readers' },
  { name: 'color', value: 'never|16|256|true', choices: ['never', '16', '256', 'true'], help: 'how many colours the terminal shows' },
  { name: 'help', value: null, help: 'this help' },
];

/** Options of the program itself, without a command. */
export const bareOptions: readonly OptionRow[] = [
  ...everywhere,
  { name: 'version', value: null, help: 'version of the program and of its model' },
];

/** The table of commands. */
export const commandTable: readonly CommandRow[] = [
  {
    words: ['figures'],
    summary: 'every figure of a study or of one series, with changes tried out',
    details: [
      'PRESET is the id of a preset or the path of a preset file.',
      'A value that is set wins. Echo spacing, TE and TR that are not set are carried where the change moves them.',
      'Everything is relative to the preset as its file has it, at the field of the file.',
    ],
    arguments: [
      { name: 'PRESET', required: true },
      { name: 'SERIES', required: false },
    ],
    options: [
      { name: 'set', value: 'KEY=VALUE', repeats: true, help: 'a parameter with its unit: "fieldOfViewMm=38 cm", pacing.periodMs=4000' },
      { name: 'field', value: 'T', help: 'field strength to evaluate at, in tesla' },
      { name: 'body', value: 'AP=MM,RL=MM', help: 'widest extents of the patient at this level, arms included' },
      { name: 'reading', value: 'KEY=VALUE', repeats: true, help: 'what the scanner displays for the preset: timeS, b1rmsUt, sarWkg' },
      { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' },
    ],
    examples: [
      'holdfast figures liver-3t',
      'holdfast figures liver-3t t1-3d --set sliceThicknessMm=4 --set sliceCount=54',
      'holdfast figures ./my-knee.json pd-sag --field 1.5 --json',
    ],
    load: async () => (await import('./figures.js')).runFigures,
  },
  {
    words: ['ways'],
    summary: 'the best ways to make a series fit what this patient can do',
    details: [
      'PRESET is the id of a preset or the path of a preset file, SERIES one of its series.',
      'Each way is the exact best of its own question among the values a scanner accepts. Exit code 1 where nothing fits.',
    ],
    arguments: [
      { name: 'PRESET', required: true },
      { name: 'SERIES', required: true },
    ],
    options: [
      { name: 'hold', value: 'S', help: 'seconds this patient can hold one breath' },
      { name: 'time', value: 'S', help: 'seconds the series may take' },
      { name: 'b1rms', value: 'UT', help: 'B1+rms cap in uT; needs --reading b1rmsUt' },
      { name: 'sar', value: 'WKG', help: 'SAR cap in W/kg; needs --reading sarWkg' },
      { name: 'rf-ratio', value: 'X', help: 'RF power cap as a ratio to the preset' },
      { name: 'reading', value: 'KEY=VALUE', repeats: true, help: 'what the scanner displays for the preset: timeS, b1rmsUt, sarWkg' },
      { name: 'body', value: 'AP=MM,RL=MM', help: 'widest extents of the patient at this level, arms included' },
      { name: 'keep', value: 'FIGURE=RATIO', repeats: true, help: 'how far a figure may move: relativeSnr=0.8, voxelPhaseMm=1.2' },
      { name: 'set', value: 'KEY=VALUE', repeats: true, help: 'a parameter that every way has' },
      { name: 'open', value: 'KEY', repeats: true, help: 'a parameter that may change although its class locks it' },
      { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' },
    ],
    examples: ['holdfast ways liver-3t t1-3d --hold 11', 'holdfast ways lumbar-spine-1.5t t2-sag --b1rms 2.0 --reading b1rmsUt=2.8'],
    load: async () => (await import('./ways.js')).runWays,
  },
  {
    words: ['budget'],
    summary: 'the whole session in so many minutes: what to keep, shorten or skip',
    details: ['PRESET is the id of a preset or the path of a preset file. The minimum set of the study comes first.'],
    arguments: [{ name: 'PRESET', required: true }],
    options: [
      { name: 'minutes', value: 'M', help: 'minutes that are left' },
      { name: 'longest', value: 'S', help: 'no series longer than this, in seconds' },
      { name: 'overhead', value: 'S', help: 'seconds between series, counted once for each planned one; 20 unless given' },
      { name: 'done', value: 'SERIES', repeats: true, help: 'a series that is done already' },
      { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' },
    ],
    examples: ['holdfast budget brain-child-fast-3t --minutes 5 --overhead 10'],
    load: async () => (await import('./budget.js')).runBudget,
  },
  {
    words: ['presets', 'list'],
    summary: 'the presets that can be named',
    details: ['Presets of the folder given by --presets come before those that ship with the program.'],
    arguments: [],
    options: [],
    examples: ['holdfast presets list'],
    load: async () => (await import('./presets-list.js')).runPresetsList,
  },
  {
    words: ['presets', 'show'],
    summary: 'one preset: its series, its parameters, what must be kept and why',
    details: ['PRESET is the id of a preset or the path of a preset file.'],
    arguments: [{ name: 'PRESET', required: true }],
    options: [],
    examples: ['holdfast presets show liver-3t'],
    load: async () => (await import('./presets-show.js')).runPresetsShow,
  },
  {
    words: ['presets', 'check'],
    summary: 'are these preset files right? Exit code 1 when one is not',
    details: ['Without FILE all presets are checked: those of --presets and those that ship with the program.'],
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [],
    examples: ['holdfast presets check ./my-knee.json'],
    load: async () => (await import('./presets-check.js')).runPresetsCheck,
  },
];

/** The usage line of a command. */
export function usageOf(command: CommandRow): string {
  const words = command.arguments.map((argument) => {
    const name = argument.repeats ? `${argument.name}...` : argument.name;
    return argument.required ? name : `[${name}]`;
  });
  const options = command.options.map((option) => {
    const shown = option.value === null ? `[--${option.name}]` : `[--${option.name} ${option.value}]`;
    return option.repeats ? `${shown}...` : shown;
  });
  return ['holdfast', ...command.words, ...words, ...options].join(' ');
}
