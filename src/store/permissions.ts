/** Files are for their owner alone unless the site's settings say otherwise. */
export const privateFileMode = 0o600;

/**
 * The mode of a folder whose files have a mode of reading and writing bits: whoever may read or write a file may enter its folder.
 *
 * @example folderModeOf(0o640).toString(8) //=> '750'
 */
export function folderModeOf(fileMode: number): number {
  const enters = (fileMode | (fileMode >> 1)) & 0o222;
  return fileMode | (enters >> 1);
}
