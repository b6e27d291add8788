import type { Family } from '../calc/classes.js';
import type { MustKeep, Study, StudySeries } from './study.js';

/** One rule of a site: what is kept, and in which presets. */
export interface SiteRule {
  /** Body region of the presets it holds for; all where it is left out. */
  readonly region?: string;
  /** Class of the series it holds for; all where it is left out. */
  readonly family?: Family;
  readonly mustKeep: MustKeep;
}

/** A file of site rules, checked. */
export interface SiteRules {
  readonly format: 'holdfast rules';
  readonly version: 1;
  readonly notes: string;
  readonly rules: readonly SiteRule[];
}

/** Bounds on a file of site rules. */
export const siteRulesLimits = { bytes: 1_000_000, nesting: 8, rules: 500 } as const;

/** No rules of a site. */
export const noSiteRules: SiteRules = { format: 'holdfast rules', version: 1, notes: '', rules: [] };

const plainWord = (word: string) => word.trim().toLowerCase();

/** What a site keeps in one series of a study, in the order of its file. */
export function siteMustKeeps(site: SiteRules, study: Pick<Study, 'region'>, series: Pick<StudySeries, 'family'>): readonly MustKeep[] {
  return site.rules
    .filter(({ region, family }) => {
      return (region === undefined || plainWord(region) === plainWord(study.region)) && (family === undefined || family === series.family);
    })
    .map(({ mustKeep }) => mustKeep);
}

/**
 * A study in which every series also keeps what the site asks for, after its own must-keeps. What a preset says already is not said twice.
 * The result is for judging; a preset is saved without the rules of its site.
 */
export function withSiteRules(study: Study, site: SiteRules): Study {
  if (site.rules.length === 0) return study;
  const series = study.series.map((one): StudySeries => {
    const said = new Set(one.mustKeep.map((mustKeep) => JSON.stringify(mustKeep)));
    const more = siteMustKeeps(site, study, one).filter((mustKeep) => !said.has(JSON.stringify(mustKeep)));
    return more.length === 0 ? one : { ...one, mustKeep: [...one.mustKeep, ...more] };
  });
  return { ...study, series };
}
