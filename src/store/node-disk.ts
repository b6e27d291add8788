import { fstatSync, type Stats } from 'node:fs';
import { chmod, type FileHandle, link, mkdir, open, readdir, rename, stat, unlink, utimes } from 'node:fs/promises';
import type { Disk, FileFacts, OpenFile, OpenHow } from './disk.js';

/** Appended files are opened for reading too, so that a record can be read back. */
const flags: Readonly<Record<OpenHow, string>> = { read: 'r', new: 'wx+', append: 'a+', 'append-new': 'ax+' };

/** Systems that cannot sync a folder say so with one of these; nothing is lost by going on. */
const cannotSyncFolders = new Set(['EINVAL', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS', 'EISDIR', 'EPERM', 'EACCES', 'EBADF']);

/** The disk of this machine. */
export const nodeDisk: Disk = {
  facts: async (path) => factsOf(await stat(path)),
  names: async (folder) => (await readdir(folder)).sort(),
  entries: async (folder) => {
    const entries = await readdir(folder, { withFileTypes: true });
    return entries
      .map((entry) => ({
        name: entry.name,
        kind: entry.isFile() ? ('file' as const) : entry.isDirectory() ? ('folder' as const) : ('unknown' as const),
      }))
      .sort((a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0));
  },
  open: async (path, how, mode = 0o600) => openFile(await open(path, flags[how], mode)),
  makeFolder: async (path, mode) => (await mkdir(path, { recursive: true, mode })) !== undefined,
  setMode: (path, mode) => chmod(path, mode),
  rename: (from, to) => rename(from, to),
  link: (from, to) => link(from, to),
  remove: (path) => unlink(path),
  touch: (path) => utimes(path, new Date(), new Date()),
  syncFolder,
};

function openFile(handle: FileHandle): OpenFile {
  return {
    read: async (into, position) => (await handle.read(into, 0, into.length, position)).bytesRead,
    write: async (bytes) => (await handle.write(bytes, 0, bytes.length, null)).bytesWritten,
    sync: () => handle.sync(),
    // The system holds the facts of an open file: nothing is waited for, and a trip through the thread pool costs more than the answer.
    facts: async () => factsOf(fstatSync(handle.fd)),
    setMode: (mode) => handle.chmod(mode),
    close: () => handle.close(),
  };
}

function factsOf(stats: Stats): FileFacts {
  return {
    kind: stats.isFile() ? 'file' : stats.isDirectory() ? 'folder' : 'other',
    sizeBytes: stats.size,
    modifiedMs: stats.mtimeMs,
    mode: stats.mode & 0o777,
    identity: `${stats.dev}:${stats.ino}`,
  };
}

async function syncFolder(path: string): Promise<void> {
  let handle: FileHandle | null = null;
  try {
    handle = await open(path, 'r');
    await handle.sync();
  } catch (error) {
    if (!cannotSyncFolders.has((error as NodeJS.ErrnoException).code ?? '')) throw error;
  } finally {
    await handle?.close();
  }
}
