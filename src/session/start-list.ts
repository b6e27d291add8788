import { draftOf } from './draft.js';
import type { DraftChoice, PresetChoice } from './message.js';
import type { State } from './state.js';

/** One line of the start screen: an unfinished session, or a preset. */
export type StartRow =
  | { readonly kind: 'draft'; readonly field: string; readonly draft: DraftChoice; readonly words: string; readonly changes: number }
  | { readonly kind: 'preset'; readonly field: string; readonly preset: PresetChoice };

/** Whether a preset is meant by what was typed: a number narrows the field strength, a word the region, the id and the title. */
export function isMeant({ study }: PresetChoice, narrowing: string): boolean {
  const text = `${study.region} ${study.id} ${study.title}`.toLowerCase();
  return narrowing
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '' && word !== 't')
    .every((word) => {
      const field = /^(\d+(?:\.\d*)?)t?$/.exec(word)?.[1];
      return field === undefined ? text.includes(word) : String(study.fieldT).startsWith(field);
    });
}

/** The lines of the start screen: unfinished sessions first, then presets by region and field strength, of one id the first. */
export function startRows(state: State): readonly StartRow[] {
  const drafts = state.drafts.flatMap((draft): StartRow[] => {
    const read = draftOf(draft.session);
    if (read === null) return [];
    const changes = read.session.series.reduce((sum, { set }) => sum + Object.keys(set).length, 0);
    return [
      { kind: 'draft', field: `draft ${draft.id}`, draft, words: `${read.opened.study.fieldT} T  ${read.opened.study.title}`, changes },
    ];
  });
  const seen = new Set<string>();
  const presets = state.presets.filter((preset) => {
    // The first of an id is the one that is taken: one that it hides is not offered, however it is called.
    if (seen.has(preset.study.id)) return false;
    seen.add(preset.study.id);
    return isMeant(preset, state.narrowing);
  });
  presets.sort(
    (a, b) => compareTexts(a.study.region, b.study.region) || a.study.fieldT - b.study.fieldT || compareTexts(a.study.id, b.study.id),
  );
  return [
    ...(state.narrowing === '' ? drafts : []),
    ...presets.map((preset): StartRow => ({ kind: 'preset', field: `preset ${preset.study.id}`, preset })),
  ];
}

/** Order of the alphabet, the same everywhere. */
export function compareTexts(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

/** The field strengths of the presets that are meant, weakest first. */
export function fieldStrengths(state: State): readonly number[] {
  return [...new Set(state.presets.map(({ study }) => study.fieldT))].sort((a, b) => a - b);
}
