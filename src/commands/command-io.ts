import type { Emphasis } from '../session/text-page.js';
import type { Disk } from '../store/disk.js';
import type { ScannerFile } from '../study/scanner-file.js';

/** Everything a command may touch outside itself. Tests hand in plain objects. */
export interface CommandIo {
  /** Standard output: data alone. */
  readonly write: (text: string) => void;
  /** Standard error: messages. */
  readonly complain: (text: string) => void;
  readonly environment: Readonly<Record<string, string | undefined>>;
  /** Both ends are terminals that screens can be drawn on. */
  readonly canDraw: boolean;
  /** Marks text for the terminal, by the value of `--color` (undefined where it was not given). */
  readonly emphasis: (choice: string | undefined) => (kind: Emphasis, text: string) => string;
  /** Says how far a long work is, on one line that is written anew; absent where nobody looks. Empty text clears it. */
  readonly progress?: (text: string) => void;
  /** Standard output goes to somebody's eyes or ears, not into a file or another program. */
  readonly outputIsSeen?: boolean;
  /** Today as YYYY-MM-DD; the clock of this machine where it is absent. */
  readonly today?: () => string;
  readonly disk: Disk;
  readonly homeFolder: string;
  readonly workingFolder: string;
  /** Folder of the presets that come with the program. */
  readonly shippedPresets: () => Promise<string | null>;
  /** Opens the terminal interface and answers its exit code; null where this program has none. */
  readonly openInterface: ((options: InterfaceOptions) => Promise<number>) | null;
}

/** What the command line says to the interface. */
export interface InterfaceOptions {
  readonly presets: string | undefined;
  readonly records: string | undefined;
  readonly ascii: boolean;
  readonly reader: boolean;
  readonly color: string | undefined;
  /** Scanner file and coil that sessions are begun on; null where none was named. */
  readonly scanner: { readonly file: ScannerFile; readonly coil: string | null } | null;
}
