import type { ParseExpression } from '../formulas/parsed-node.js';
import type { Draft } from '../session/draft.js';
import type { Message } from '../session/message.js';
import type { DebouncedSaver } from '../store/debounced-saver.js';
import type { Disk } from '../store/disk.js';
import type { DraftFile } from '../store/draft-file.js';
import type { Folders } from '../store/folders.js';
import type { PresetFolder } from '../store/preset-folder.js';
import type { Settings } from '../store/settings.js';
import type { PictureRunner } from './run-picture.js';
import type { SearchRunner } from './run-search.js';

/** Everything outside that the effects of the interface touch. Tests put plain objects in its place. */
export interface InterfaceWorld {
  readonly disk: Disk;
  /** What a typed path begins at: `~` at the home, any other that does not begin at the root where the program was started. */
  readonly homeFolder: string;
  readonly workingFolder: string;
  readonly folders: Folders;
  readonly presetFolders: readonly PresetFolder[];
  readonly settings: Settings;
  readonly drafts: DraftFile;
  readonly saver: DebouncedSaver<Draft>;
  /** Loads the parser of expressions once, on first need. */
  readonly parser: () => Promise<ParseExpression>;
  readonly searches: SearchRunner;
  readonly pictures: PictureRunner;
  /** Folder of the shipped presets; the objects of pictures lie beside it. */
  readonly shippedPresets: string | null;
  /** Says something to the interface without being asked. */
  readonly tell: (message: Message) => void;
  /** Today as YYYY-MM-DD. */
  readonly today: () => string;
  readonly newId: () => string;
}
