import type { Answer, Effect } from '../session/message.js';
import type { Disk } from '../store/disk.js';
import { objectOfRegion } from '../store/object-folder.js';
import type { ObjectFile } from '../study/object-file.js';
import type { InterfaceWorld } from './interface-world.js';

/** Objects that were read, by region: they ship with the program and do not change. */
const objects = new WeakMap<Disk, Map<string, ObjectFile>>();

/** Draws preset and now beside the program. Where a newer ask took its place nothing is answered. */
export async function drawPicture(
  { disk, pictures, shippedPresets }: Pick<InterfaceWorld, 'disk' | 'pictures' | 'shippedPresets'>,
  { problem }: Extract<Effect, { kind: 'picture' }>,
): Promise<Answer | null> {
  const known = objects.get(disk) ?? new Map<string, ObjectFile>();
  objects.set(disk, known);
  let object = known.get(problem.region);
  if (object === undefined) {
    const read = await objectOfRegion(disk, shippedPresets, problem.region);
    if (!read.ok) return { kind: 'failed', problems: read.problems };
    object = read.value;
    known.set(problem.region, object);
  }
  const drawn = await pictures.draw(problem, object);
  if (drawn === null) return null;
  return drawn.ok ? { kind: 'pictures', pictures: drawn.value } : { kind: 'failed', problems: drawn.problems };
}
