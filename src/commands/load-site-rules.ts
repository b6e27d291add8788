import { loadParser } from '../formulas/load-parser.js';
import type { Folders } from '../store/folders.js';
import { readSiteRulesFile } from '../store/site-rules-file.js';
import type { SiteRules } from '../study/site-rules.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import { refusedByStore } from './load-preset.js';

/** What the site keeps in all its presets: `HOLDFAST_RULES`, or `rules.json` beside the settings; no rules where neither is there. */
export async function loadSiteRules({ siteRulesFile, settingsFolder }: Folders, io: CommandIo): Promise<Attempt<SiteRules>> {
  const site = await readSiteRulesFile(io.disk, siteRulesFile, settingsFolder, loadParser);
  return site.ok ? site : refusedByStore(site.problems);
}
