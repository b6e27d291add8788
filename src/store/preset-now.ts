import type { ParseExpression } from '../formulas/parsed-node.js';
import { readRules } from '../study/read-rules.js';
import type { PresetReport } from '../study/record-report.js';
import { type PresetNow, suggestVariant } from '../study/record-report-suggestion.js';
import type { Disk } from './disk.js';
import { findPreset, type PresetFolder } from './preset-folder.js';

/**
 * What a preset that records name is now, with a suggestion for each of its series.
 *
 * @param parser Loads the parser of formulas, where the preset has any.
 */
export async function presetNow(
  disk: Disk,
  folders: readonly PresetFolder[],
  preset: PresetReport,
  parser: () => Promise<ParseExpression>,
): Promise<PresetNow> {
  // Records name presets by their id; nothing in them is ever taken for a path.
  const found = /[/\\]/.test(preset.preset) ? null : await findPreset(disk, folders, preset.preset, '/');
  if (found === null || !found.ok || found.value.study.id !== preset.preset) return { study: null, suggestions: [] };
  const { study } = found.value;
  const all = study.series.flatMap(({ mustKeep }) => mustKeep);
  const hasRules = all.some(({ rule, when }) => rule !== undefined || when !== undefined);
  const rules = hasRules ? readRules(all, await parser()) : new Map();
  return { study, suggestions: preset.series.map((series) => suggestVariant(study, preset, series, rules)) };
}
