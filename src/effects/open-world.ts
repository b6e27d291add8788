import type { ParseExpression } from '../formulas/parsed-node.js';
import type { Draft } from '../session/draft.js';
import type { Answer, Effect, Message } from '../session/message.js';
import type { Defaults } from '../session/state.js';
import { debouncedSaver } from '../store/debounced-saver.js';
import type { Disk } from '../store/disk.js';
import { draftFile } from '../store/draft-file.js';
import { heartbeatMs } from '../store/draft-owner.js';
import { type Folders, foldersOf } from '../store/folders.js';
import { presetFolders } from '../store/preset-folder.js';
import { randomId } from '../store/random-id.js';
import { defaultSettings, fileModeOf } from '../store/settings.js';
import { readSettings } from '../store/settings-file.js';
import type { ScannerFile } from '../study/scanner-file.js';
import { toolVersion } from '../study/tool-version.js';
import { stopHeaders } from './header-reading.js';
import type { InterfaceWorld } from './interface-world.js';
import { loadDrafts, loadPresets } from './load-presets.js';
import { stopReading } from './record-reading.js';
import { runEffect } from './run-effect.js';
import { openPictureWorker, pictureRunner } from './run-picture.js';
import { openSearchWorker, searchRunner } from './run-search.js';

/** Where the interface finds its files, and what the command line said. */
export interface WorldChoices {
  readonly disk: Disk;
  readonly environment: Readonly<Record<string, string | undefined>>;
  readonly homeFolder: string;
  readonly workingFolder: string;
  readonly shippedPresets: string | null;
  readonly presets: string | undefined;
  readonly records: string | undefined;
  /** Scanner file and one of its coils, by its exact name, that were named on the command line. */
  readonly scanner?: { readonly file: ScannerFile; readonly coil: string | null } | null;
  /** Of the program's own file: the bundle of the search lies beside it. */
  readonly programUrl: string;
}

/** The world outside as the interface reaches it. */
export interface OpenWorld {
  readonly defaults: Defaults;
  readonly ascii: boolean;
  readonly reader: boolean;
  /** Colour of the settings; undefined where they leave it to the terminal. */
  readonly color: string | undefined;
  readonly runEffect: (effect: Effect) => Promise<Answer | null>;
  readonly firstMessages: readonly Promise<readonly Message[]>[];
  /** Tells the interface what happens outside, from when it listens. */
  readonly listen: (send: (message: Message) => void) => void;
  readonly leave: (draft: Draft | null) => Promise<void>;
}

/** Opens settings, presets, drafts and records for the interface. A wrong settings file is said, and the defaults hold. */
export async function openWorld(choices: WorldChoices): Promise<OpenWorld> {
  const { disk, environment, homeFolder, workingFolder } = choices;
  const flags = { presets: choices.presets, records: choices.records };
  const base = { environment, homeFolder, workingFolder, flags };
  const read = await readSettings(disk, foldersOf(base).settingsFolder);
  const settings = read.ok ? read.value.settings : defaultSettings;
  const notes = read.ok
    ? read.value.notes
    : read.problems.map((problem) => ({ ...problem, message: `${problem.message} The defaults hold.` }));
  const folders: Folders = foldersOf({ ...base, settings });
  const drafts = draftFile({ disk, tool: toolVersion, folder: folders.draftsFolder, fileMode: fileModeOf(settings) });
  const late: { note: (message: Message) => void } = { note: () => {} };
  const saver = debouncedSaver<Draft>({
    save: (draft) => drafts.save(draft),
    onChange: (outcome) =>
      late.note({
        kind: 'note',
        words: outcome.ok ? 'The session is saved again' : `The session is not saved as it goes: ${outcome.problems[0]?.message ?? ''}`,
      }),
  });
  const parser: { loading: Promise<ParseExpression> | null } = { loading: null };
  const searches = searchRunner(() => openSearchWorker(choices.programUrl));
  const pictures = pictureRunner(() => openPictureWorker(choices.programUrl));
  const world: InterfaceWorld = {
    disk,
    homeFolder,
    workingFolder,
    folders,
    presetFolders: presetFolders(folders.sitePresetsFolder, folders.ownPresetsFolder, choices.shippedPresets),
    settings,
    drafts,
    saver,
    parser: () => {
      parser.loading ??= import('../formulas/load-parser.js').then(({ loadParser }) => loadParser());
      return parser.loading;
    },
    searches,
    pictures,
    shippedPresets: choices.shippedPresets,
    tell: (message) => late.note(message),
    today,
    newId: randomId,
  };
  const beat = setInterval(() => void drafts.beat(), heartbeatMs);
  beat.unref();
  const named = settings.scannerName !== '';
  // The readers of their files are loaded when they are needed, like the files themselves.
  const scanners = () => import('./load-scanners.js').then(({ loadScanners }) => loadScanners(world));
  const rules = () => import('./load-scanners.js').then(({ loadSiteRules }) => loadSiteRules(world));
  // A key typed ahead opens a preset as soon as presets are there: the scanner that the settings name is known before.
  const presets = Promise.all([...(named ? [scanners()] : []), loadPresets(world)]);
  // Else the list of presets is on screen before scanners are read, and always before rules are.
  const later = presets.then(() => Promise.all([...(named ? [] : [scanners()]), rules()]));
  return {
    defaults: {
      role: settings.role,
      scannerName: settings.scannerName,
      coilName: settings.coilName,
      pauses: { preparationS: settings.preparationS, restS: settings.restS },
      release: { folder: folders.sitePresetsFolder, secondRole: settings.secondRoleToRelease },
      ...(choices.scanner == null ? {} : { scanner: choices.scanner }),
    },
    ascii: settings.glyphs === 'ascii',
    reader: settings.readerMode,
    color: settings.colour === 'auto' ? undefined : settings.colour,
    runEffect: (effect) => runEffect(world, effect),
    firstMessages: [
      presets,
      later,
      loadDrafts(world),
      Promise.resolve(notes.map(({ message }): Message => ({ kind: 'note', words: message }))),
    ],
    listen: (send) => {
      late.note = send;
    },
    leave: async (draft) => {
      searches.close();
      stopReading(world);
      stopHeaders(world);
      pictures.close();
      clearInterval(beat);
      if (draft !== null) saver.change(draft);
      await saver.flush();
      await drafts.leave();
    },
  };
}

/** The day here, as YYYY-MM-DD. */
function today(): string {
  const now = new Date();
  return [now.getFullYear(), String(now.getMonth() + 1).padStart(2, '0'), String(now.getDate()).padStart(2, '0')].join('-');
}
