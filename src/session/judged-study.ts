import { type SiteRules, withSiteRules } from '../study/site-rules.js';
import type { Study } from '../study/study.js';
import type { Opened } from './session.js';

/** A study as it is judged: with what the site keeps, and how many must-keeps each series has of its own. */
export function judgedStudy(filed: Study, site: SiteRules): Pick<Opened, 'study' | 'ownMustKeeps'> {
  const study = withSiteRules(filed, site);
  if (study === filed) return { study };
  return { study, ownMustKeeps: Object.fromEntries(filed.series.map(({ id, mustKeep }) => [id, mustKeep.length])) };
}

/** The study as its file has it: a preset is saved without the rules of its site. */
export function filedStudy({ study, ownMustKeeps }: Pick<Opened, 'study' | 'ownMustKeeps'>): Study {
  if (ownMustKeeps === undefined) return study;
  const series = study.series.map((one) => {
    const own = ownMustKeeps[one.id] ?? one.mustKeep.length;
    return own >= one.mustKeep.length ? one : { ...one, mustKeep: one.mustKeep.slice(0, own) };
  });
  return { ...study, series };
}
