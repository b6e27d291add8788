import { loadParser } from '../formulas/load-parser.js';
import { readRules } from '../study/read-rules.js';
import { withSiteRules } from '../study/site-rules.js';
import type { Study } from '../study/study.js';
import type { Attempt } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { type LoadedPreset, loadPreset } from './load-preset.js';
import { loadSiteRules } from './load-site-rules.js';

/** A preset that is judged by the rules of its site too. */
export interface JudgedPreset extends LoadedPreset {
  /** The study as its file has it, without the rules of the site. */
  readonly filed: Study;
}

/** Finds a preset and adds what the site keeps in all its presets (`HOLDFAST_RULES`, or `rules.json` beside the settings) to its must-keeps. */
export async function loadJudgedPreset(wanted: string, request: CommandRequest, io: CommandIo): Promise<Attempt<JudgedPreset>> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return settings;
  const { presetFolders, folders } = settings.value;
  const loaded = await loadPreset(wanted, presetFolders, io);
  if (!loaded.ok) return loaded;
  const site = await loadSiteRules(folders, io);
  if (!site.ok) return site;
  const filed = loaded.value.study;
  const study = withSiteRules(filed, site.value);
  if (study === filed) return { ok: true, value: { ...loaded.value, filed } };
  const rules = readRules(
    study.series.flatMap(({ mustKeep }) => mustKeep),
    await loadParser(),
  );
  return { ok: true, value: { ...loaded.value, study, rules, filed } };
}
