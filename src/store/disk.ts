/** What a path leads to, links followed. */
export interface FileFacts {
  readonly kind: 'file' | 'folder' | 'other';
  readonly sizeBytes: number;
  readonly modifiedMs: number;
  /** Permission bits alone: 0o600. */
  readonly mode: number;
  /** The same for the same file or folder, whatever path leads to it; absent where the disk cannot say. */
  readonly identity?: string;
}

/** A name in a folder. */
export interface FolderEntry {
  readonly name: string;
  readonly kind: 'file' | 'folder' | 'unknown';
}

/**
 * How a file is opened.
 * `read`: must exist. `new`: must not exist, read and written. `append`: must exist, every write goes to the end.
 * `append-new`: must not exist, then as `append`.
 */
export type OpenHow = 'read' | 'new' | 'append' | 'append-new';

export interface OpenFile {
  /** Reads into the array from a place in the file; gives the number of bytes, 0 at the end. */
  read(into: Uint8Array, position: number): Promise<number>;
  /** One write to the system; gives how many bytes it took, which may be fewer than were given. */
  write(bytes: Uint8Array): Promise<number>;
  /** Waits until the bytes are on the disk. */
  sync(): Promise<void>;
  facts(): Promise<FileFacts>;
  setMode(mode: number): Promise<void>;
  close(): Promise<void>;
}

/**
 * All that the store asks of a disk. Every method rejects with an error that carries the system's `code` (ENOENT, ENOSPC...).
 * Tests put failing disks in its place.
 */
export interface Disk {
  facts(path: string): Promise<FileFacts>;
  /** Names in a folder, sorted. */
  names(folder: string): Promise<string[]>;
  /** Names in a folder, sorted, with what the folder itself says they are: `unknown` where it says nothing, or a link. */
  entries(folder: string): Promise<FolderEntry[]>;
  open(path: string, how: OpenHow, mode?: number): Promise<OpenFile>;
  /** Makes a folder and those above it; gives false when it was there. */
  makeFolder(path: string, mode: number): Promise<boolean>;
  setMode(path: string, mode: number): Promise<void>;
  /** Replaces what has the new name. */
  rename(from: string, to: string): Promise<void>;
  /** A second name for a file; refuses a name that is taken. */
  link(from: string, to: string): Promise<void>;
  remove(path: string): Promise<void>;
  /** Sets the time of change to now. */
  touch(path: string): Promise<void>;
  /** Waits until the names in a folder are on the disk. */
  syncFolder(path: string): Promise<void>;
}
