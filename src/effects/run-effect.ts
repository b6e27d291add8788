import type { Answer, Effect } from '../session/message.js';
import { carryPreset } from './carry-preset.js';
import { claimDraft } from './claim-draft.js';
import { drawPicture } from './draw-picture.js';
import { beginHeaders, stopHeaders } from './header-reading.js';
import type { InterfaceWorld } from './interface-world.js';
import { listRecords } from './list-records.js';
import { loadPresets } from './load-presets.js';
import { readPastRecord } from './read-past-record.js';
import { readResiduals } from './read-residuals.js';
import { readRevisions } from './read-revisions.js';
import { readSessionRules } from './read-session-rules.js';
import { readTypedExpression } from './read-typed-expression.js';
import { stopReading } from './record-reading.js';
import { checkRelease, releasePreset } from './release-preset.js';
import { reportRecords } from './report-records.js';
import { savePage } from './save-page.js';
import { savePreset } from './save-preset.js';
import { saveRecord } from './save-record.js';
import { planSession, searchWays } from './search-ways.js';

/** Carries an effect out. Those that were asked answer; the others answer nothing. `quit` belongs to whoever holds the screen. */
export async function runEffect(world: InterfaceWorld, effect: Effect): Promise<Answer | null> {
  switch (effect.kind) {
    case 'save-draft':
      world.saver.change(effect.draft);
      return null;
    case 'drop-draft':
      await world.saver.forget();
      await world.drafts.discard();
      return null;
    case 'save-record':
      return saveRecord(world, effect);
    case 'claim-draft':
      return claimDraft(world, effect);
    case 'read-expression':
      return readTypedExpression(world, effect);
    case 'read-rules':
      return readSessionRules(world, effect);
    case 'save-preset':
      return savePreset(world, effect);
    case 'save-page':
      return savePage(world, effect);
    case 'search':
      return searchWays(world, effect);
    case 'plan':
      return planSession(world, effect);
    case 'carry':
      return carryPreset(world, effect);
    case 'picture':
      return drawPicture(world, effect);
    case 'read-residuals':
      return readResiduals(world, effect);
    case 'stop-search':
      world.searches.stop();
      return null;
    case 'list-presets':
      world.tell(await loadPresets(world));
      return null;
    case 'read-revisions':
      return readRevisions(world, effect);
    case 'check-release':
      return checkRelease(world, effect);
    case 'release':
      return releasePreset(world, effect);
    case 'list-records':
      return listRecords(world, effect);
    case 'report-records':
      return reportRecords(world, effect);
    case 'read-record':
      return readPastRecord(world, effect);
    case 'stop-reading':
      stopReading(world);
      return null;
    case 'read-headers': {
      // Before anything is loaded: it may be stopped meanwhile.
      const reading = beginHeaders(world);
      // What parses objects is loaded when somebody reads a folder, and not before.
      const { readFolder } = await import('./read-folder.js');
      return readFolder(world, effect, reading);
    }
    case 'class-headers': {
      const { classHeaders } = await import('./read-folder.js');
      return classHeaders(world, effect);
    }
    case 'stop-headers':
      stopHeaders(world);
      return null;
    case 'quit':
      return null;
  }
}
