import type { CommandIo } from './command-io.js';

/** Files smaller than this are read before anybody looks. */
const progressFromBytes = 8_000_000;

/** How a long reading is told. */
export interface ReadingWords {
  /** A screen reader is told once each quarter, a line each; eyes one line that is written anew. */
  readonly reader: boolean;
  /** Rows go out as they are read: where they are seen they say by themselves how far it is, and would be torn by more words. */
  readonly rows?: boolean;
}

/** Says how far a long reading is, where somebody looks; `done` leaves a clean line. */
export function readingProgress({ reader, rows = false }: ReadingWords, io: CommandIo) {
  const { progress } = io;
  const silent = progress === undefined || (rows && io.outputIsSeen === true);
  let last = -1;
  return {
    tell: (readBytes: number, totalBytes: number): void => {
      if (silent || totalBytes < progressFromBytes) return;
      const percent = Math.min(100, Math.floor((100 * readBytes) / totalBytes));
      const now = reader ? percent - (percent % 25) : percent;
      if (now === last) return;
      last = now;
      if (reader) io.complain(`reading records: ${now} %\n`);
      else progress(`reading records: ${now} %`);
    },
    done: (): void => {
      if (!silent && !reader && last >= 0) progress('');
    },
  };
}
