import type { CommandRow, OptionRow } from './command-row.js';
import { filterOptions } from './record-filter-options.js';

/** Options that every command takes. */
export const everywhere: readonly OptionRow[] = [
  { name: 'presets', value: 'DIR', help: "folder with the site's presets (or HOLDFAST_PRESETS)" },
  { name: 'records', value: 'FILE', help: 'file that sessions are recorded in (or HOLDFAST_RECORDS)' },
  { name: 'ascii', value: null, help: 'plain ASCII characters only' },
  { name: 'reader', value: null, help: 'one sentence a line, for screen readers' },
  { name: 'color', value: 'never|16|256|true', choices: ['never', '16', '256', 'true'], help: 'how many colours the terminal shows' },
  { name: 'help', value: null, help: 'this help' },
];

const scannerOptions: readonly OptionRow[] = [
  { name: 'scanner', value: 'NAME', help: 'scanner file: its exact field, gradients, pulses and coils' },
  { name: 'coil', value: 'NAME', help: 'coil of the scanner file; the first unless given' },
];

/** Options of the program itself, without a command. */
export const bareOptions: readonly OptionRow[] = [
  ...scannerOptions,
  ...everywhere,
  { name: 'version', value: null, help: 'version of the program and of its model' },
];

const jsonOption: OptionRow = { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' };
const fieldOption: OptionRow = { name: 'field', value: 'T', help: 'exact field of the magnet, in tesla' };
const recordDetails = [
  'FILE is a record file, or a folder of them (one a scanner); several read as one. Without FILE: that of --records.',
  'Damaged lines are named, counted and skipped.',
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
      ...scannerOptions,
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
      {
        name: 'rf-ratio',
        value: 'X',
        help: 'RF power cap as a ratio to the preset; power goes with the square of B1+rms: 0.5 is 0.71 of its B1+rms',
      },
      { name: 'reading', value: 'KEY=VALUE', repeats: true, help: 'what the scanner displays for the preset: timeS, b1rmsUt, sarWkg' },
      { name: 'body', value: 'AP=MM,RL=MM', help: 'widest extents of the patient at this level, arms included' },
      { name: 'keep', value: 'FIGURE=RATIO', repeats: true, help: 'how far a figure may move: relativeSnr=0.8, voxelPhaseMm=1.2' },
      { name: 'set', value: 'KEY=VALUE', repeats: true, help: 'a parameter that every way has' },
      { name: 'open', value: 'KEY', repeats: true, help: 'a parameter that may change although its class locks it' },
      ...scannerOptions,
      { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' },
    ],
    examples: ['holdfast ways liver-3t t1-3d --hold 11', 'holdfast ways lumbar-spine-1.5t t2-sag --b1rms 2.0 --reading b1rmsUt=2.8'],
    load: async () => (await import('./ways.js')).runWays,
  },
  {
    words: ['picture'],
    summary: 'the preset and a change side by side, as computed pictures of an invented object',
    details: [
      'PRESET is the id of a preset or the path of a preset file, SERIES one of its series.',
      'An illustration of the model, never an image of a patient: noise, blur, ringing, wrap, fat shift, contrast and slice thickness of an invented object of plain shapes.',
      'The object of the body region is taken, or the one of --object.',
    ],
    arguments: [
      { name: 'PRESET', required: true },
      { name: 'SERIES', required: true },
    ],
    options: [
      { name: 'set', value: 'KEY=VALUE', repeats: true, help: 'a parameter with its unit: "sliceThicknessMm=5 mm"' },
      { name: 'field', value: 'T', help: 'field strength of the second picture, in tesla' },
      ...scannerOptions,
      { name: 'body', value: 'AP=MM,RL=MM', help: 'widest extents of the body; those of the object unless given' },
      { name: 'snr', value: 'N', help: "signal to noise of the preset's target, an assumption; 20 unless given" },
      { name: 'object', value: 'FILE', help: 'an object file of your own' },
      { name: 'out', value: 'FILE', help: 'the PNG to write' },
      { name: 'replace', value: null, help: 'write over a file that is there' },
      jsonOption,
    ],
    examples: ['holdfast picture liver-3t t1-3d --set sliceThicknessMm=5 --out thicker.png'],
    load: async () => (await import('./picture.js')).runPicture,
  },
  {
    words: ['budget'],
    summary: 'the whole session in so many minutes: what to keep, shorten or skip',
    details: ['PRESET is the id of a preset or the path of a preset file. The minimum set of the study comes first.'],
    arguments: [{ name: 'PRESET', required: true }],
    options: [
      { name: 'minutes', value: 'M', help: 'minutes that are left' },
      { name: 'longest', value: 'S', help: 'no series longer than this, in seconds' },
      { name: 'hold', value: 'S', help: 'seconds this patient can hold one breath' },
      { name: 'overhead', value: 'S', help: 'seconds between series, counted once for each planned one; 20 unless given' },
      { name: 'done', value: 'SERIES', repeats: true, help: 'a series that is done already' },
      ...scannerOptions,
      { name: 'json', value: null, help: 'one JSON document on standard output, nothing else there' },
    ],
    examples: ['holdfast budget brain-child-fast-3t --minutes 5 --overhead 10'],
    load: async () => (await import('./budget.js')).runBudget,
  },
  {
    words: ['presets', 'list'],
    summary: 'the presets that can be named',
    details: [
      'Presets of the folder given by --presets come before those that ship with the program.',
      'Of each the current revision is listed.',
    ],
    arguments: [],
    options: [{ name: 'revisions', value: null, help: 'every revision, with who released it, when and why' }],
    examples: ['holdfast presets list', 'holdfast presets list --revisions'],
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
    details: [
      'Checked are the form of the file and its rules; that the timing is possible and every figure has a value; in/opposed pairs and nulls at the exact field; that must-keeps and the rules of the site are kept and name a source.',
      'Without FILE all presets are checked: those of --presets and those that ship with the program.',
    ],
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [fieldOption, jsonOption],
    examples: ['holdfast presets check ./my-knee.json', 'holdfast presets check liver-3t --field 2.89'],
    load: async () => (await import('./presets-check.js')).runPresetsCheck,
  },
  {
    words: ['presets', 'diff'],
    summary: 'two presets or revisions side by side: parameters, and what they do to the figures',
    details: [
      'A and B are ids, revisions (liver-3t@2) or paths. A alone is compared with the revision before it.',
      'With --record, what that session planned is compared with what it used; A and B are then record files.',
    ],
    arguments: [
      { name: 'A', required: false },
      { name: 'B', required: false },
    ],
    options: [{ name: 'record', value: 'ID', help: 'planned against used of this record' }, jsonOption],
    examples: ['holdfast presets diff liver-3t@2 liver-3t@3', 'holdfast presets diff liver-3t liver-1.5t'],
    load: async () => (await import('./presets-diff.js')).runPresetsDiff,
  },
  {
    words: ['presets', 'carry'],
    summary: 'a preset at another field or on another scanner: what each parameter becomes, and why',
    details: [
      'PRESET is the id of a preset or the path of a preset file. Fields from 0.5 to 3 T. What comes out is a proposal: nothing is released by it.',
      'Equal contrast (unless another is asked for): bandwidth for equal chemical shift, TI by null, in and opposed echoes at the exact field, TR, angle or TE solved for the contrast ratio of the named pair.',
      'Equal snr spends what SNR is gained on averages and bandwidth as well; shift solves nothing else; time lets no series take longer.',
    ],
    arguments: [{ name: 'PRESET', required: true }],
    options: [
      { name: 'to', value: 'T', help: 'field to carry to, in tesla' },
      ...scannerOptions,
      {
        name: 'equal',
        value: 'contrast|snr|shift|time',
        choices: ['contrast', 'snr', 'shift', 'time'],
        help: 'what is held equal; contrast unless given',
      },
      { name: 'out', value: 'FILE', help: 'write the proposal as a draft preset; never overwrites' },
      jsonOption,
    ],
    examples: ['holdfast presets carry shoulder-1.5t --to 3', 'holdfast presets carry liver-3t --scanner demo-1.5t --out draft.json'],
    load: async () => (await import('./presets-carry.js')).runPresetsCarry,
  },
  {
    words: ['presets', 'release'],
    summary: "check a preset and make it the next revision in the site's folder",
    details: [
      'The folder is that of --presets. A revision never changes afterwards, and says by which role, when and why it was released.',
      'Whoever comes second is told whose revision is there and what differs, and may take the own changes over on top of it.',
    ],
    arguments: [{ name: 'PRESET', required: true }],
    options: [
      { name: 'role', value: 'ROLE', help: 'role of whoever releases; no name' },
      { name: 'reason', value: 'TEXT', help: 'why, in at most 80 characters' },
      { name: 'second-role', value: 'ROLE', help: 'a second role that agrees; some sites ask for it' },
      { name: 'as', value: 'ID', help: 'id to release a draft under' },
      { name: 'based-on', value: 'REVISION', help: 'revision that the preset was made from' },
      { name: 'on-top', value: null, help: 'take the changes over on top of a newer revision' },
      fieldOption,
    ],
    examples: ['holdfast presets release ./liver.json --role physicist --reason "short holds"'],
    load: async () => (await import('./presets-release.js')).runPresetsRelease,
  },
  {
    words: ['read'],
    summary: 'headers of DICOM objects or sidecars, series by series, to a draft preset',
    details: [
      'FILE is a DICOM object of an MR series, a BIDS sidecar (.json), or a folder of them. Pixels are never loaded; names, ids, dates, places and free text are never read.',
      'Each value says where it comes from: read, derived, a guess, or missing; what is missing is for a person to type.',
      'Files that cannot be read are named, the rest is read, and the exit code is 1.',
    ],
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [
      { name: 'set', value: '[SERIES:]KEY=VALUE', repeats: true, help: 'a value that the header does not say: s2:echoSpacingMs=9.5' },
      { name: 'class', value: '[SERIES:]CLASS', repeats: true, help: 'the class of a series: s2:fast-spin-echo/2D' },
      {
        name: 'series',
        value: 'SERIES',
        repeats: true,
        help: 'a series that goes into the draft; unless given, all but those made from others',
      },
      { name: 'field', value: 'T', help: 'field strength of the draft, in tesla, where the headers do not say it' },
      { name: 'out', value: 'FILE', help: 'write the series that are whole as a draft preset; never overwrites' },
      { name: 'explain', value: null, help: 'the table of what is read from which attribute' },
      jsonOption,
    ],
    examples: [
      'holdfast read ./exam',
      'holdfast read ./exam --series s2 --set s2:echoSpacingMs=9.5 --out draft.json',
      'holdfast read --explain',
    ],
    load: async () => (await import('./read.js')).runRead,
  },
  {
    words: ['scanner', 'list'],
    summary: 'the scanners that can be named',
    details: [
      'Scanner files are looked for in the folder of HOLDFAST_SCANNERS, in "scanners" beside the settings, and among those that ship with the program (two invented ones).',
    ],
    arguments: [],
    options: [jsonOption],
    examples: ['holdfast scanner list'],
    load: async () => (await import('./scanner-list.js')).runScannerList,
  },
  {
    words: ['scanner', 'show'],
    summary: 'one scanner: its numbers, and what changes in a preset on it',
    details: [
      'NAME is the name of a scanner or the path of a scanner file.',
      'With --preset: frequencies at the exact field, noise factor, shortest TE and TR and slices per TR of each series, beside those without a scanner file.',
    ],
    arguments: [{ name: 'NAME', required: true }],
    options: [
      { name: 'preset', value: 'PRESET', help: 'show what changes in this preset' },
      { name: 'coil', value: 'NAME', help: 'coil of the scanner file; the first unless given' },
      jsonOption,
    ],
    examples: ['holdfast scanner show demo-3t', 'holdfast scanner show demo-3t --coil head --preset brain-3t'],
    load: async () => (await import('./scanner-show.js')).runScannerShow,
  },
  {
    words: ['scanner', 'check'],
    summary: 'are these scanner files right? Exit code 1 when one is not',
    details: ['Without FILE all scanner files are checked.'],
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [],
    examples: ['holdfast scanner check ./room-2.json'],
    load: async () => (await import('./scanner-check.js')).runScannerCheck,
  },
  {
    words: ['records', 'list'],
    summary: 'the sessions that were recorded, one a line',
    details: recordDetails,
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [...filterOptions, jsonOption],
    examples: ['holdfast records list --from 2026-03-01 --preset liver-3t'],
    load: async () => (await import('./records-list.js')).runRecordsList,
  },
  {
    words: ['records', 'show'],
    summary: 'one session: what was planned, what was used, and why',
    details: ['RECORD is the id of a record or its beginning.', ...recordDetails],
    arguments: [
      { name: 'RECORD', required: true },
      { name: 'FILE', required: false, repeats: true },
    ],
    options: [jsonOption],
    examples: ['holdfast records show 8f3c0a5b'],
    load: async () => (await import('./records-show.js')).runRecordsShow,
  },
  {
    words: ['records', 'report'],
    summary: 'which presets are rewritten, in which direction, for which reason',
    details: [
      'Per preset and series: how often run, rewritten, repeated and given up; what was changed and by how much; reasons; quality; must-keeps crossed; revisions mixed; readings against predictions.',
      ...recordDetails,
    ],
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [
      ...filterOptions,
      { name: 'readings', value: null, help: "only the scanner's readings against predictions, by scanner and class" },
      { name: 'html', value: 'FILE', help: 'write the report as one page with plots as well' },
      { name: 'save-drafts', value: null, help: 'save suggested variants as draft presets, for review' },
      jsonOption,
    ],
    examples: [
      'holdfast records report --from 2026-01-01',
      'holdfast records report --readings',
      'holdfast records report scanner-a.jsonl scanner-b.jsonl --html report.html',
    ],
    load: async () => (await import('./records-report.js')).runRecordsReport,
  },
  {
    words: ['records', 'export'],
    summary: 'records as a table or as lines, or a change request for a committee',
    details: recordDetails,
    arguments: [{ name: 'FILE', required: false, repeats: true }],
    options: [
      ...filterOptions,
      { name: 'csv', value: null, help: 'a table, one row a series' },
      { name: 'lines', value: null, help: 'JSON lines, as they are recorded' },
      { name: 'change-request', value: null, help: 'one page: what, why, how often, figures before and after' },
      { name: 'series', value: 'SERIES', help: 'series of the change request' },
      { name: 'picture', value: 'FILE', help: 'PNG to go with the change request: what the change does to an invented object' },
    ],
    examples: ['holdfast records export --csv > records.csv', 'holdfast records export --change-request --preset liver-3t'],
    load: async () => (await import('./records-export.js')).runRecordsExport,
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
