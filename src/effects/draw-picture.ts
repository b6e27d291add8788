import type { Answer, Effect } from '../session/message.js';
import { objectOfRegion } from '../store/object-folder.js';
import type { InterfaceWorld } from './interface-world.js';

/** Draws preset and now beside the program. Where a newer ask took its place nothing is answered. */
export async function drawPicture(
  { disk, pictures, shippedPresets }: Pick<InterfaceWorld, 'disk' | 'pictures' | 'shippedPresets'>,
  { problem }: Extract<Effect, { kind: 'picture' }>,
): Promise<Answer | null> {
  const object = await objectOfRegion(disk, shippedPresets, problem.region);
  if (!object.ok) return { kind: 'failed', problems: object.problems };
  const drawn = await pictures.draw(problem, object.value);
  if (drawn === null) return null;
  return drawn.ok ? { kind: 'pictures', pictures: drawn.value } : { kind: 'failed', problems: drawn.problems };
}
