import { classKeyOf, classTable } from '../calc/classes.js';
import type { ParameterKey } from '../calc/parameters.js';
import { fillDefaults, type GivenParameters } from '../calc/series.js';
import { tissueNames } from '../calc/tissues.js';
import { cleanText } from './clean-text.js';
import type { PresetFile, SeriesFile } from './preset-file.js';
import type { MustKeep, Release, Study, StudySeries } from './study.js';

/** Copies without the bare objects of the JSON reader, so that equal studies are equal in every comparison. */
function plainCopy<T>(value: T): T {
  return value === undefined ? value : (JSON.parse(JSON.stringify(value)) as T);
}

function cleanMustKeep(mustKeep: MustKeep): MustKeep {
  return { ...plainCopy(mustKeep), source: cleanText(mustKeep.source) };
}

/** A tissue as the table writes it: one text in memory is compared at once, two equal ones letter by letter. */
function ownName(tissue: string): string {
  return tissueNames.find((name) => name === tissue) ?? tissue;
}

function seriesOf(file: SeriesFile, index: number): StudySeries {
  const key = classKeyOf(file.family, file.acquisition);
  if (key === null) throw new Error(`no class ${file.family} ${file.acquisition}: check the structure first`);
  const given = plainCopy(file.parameters) as Record<ParameterKey, never> & GivenParameters;
  return {
    id: file.id,
    title: cleanText(file.title),
    plane: cleanText(file.plane ?? 'axial'),
    purpose: file.purpose === undefined ? null : cleanText(file.purpose),
    priority: file.priority ?? index + 1,
    family: classTable[key].family,
    acquisition: classTable[key].acquisition,
    target: ownName(file.target),
    comparison: ownName(file.comparison),
    contrastAgent: file.contrastAgent ?? false,
    nullTissue: file.nullTissue ?? null,
    tissueOverrides: plainCopy(file.tissueOverrides ?? {}),
    parameters: fillDefaults(key, given),
    ranges: plainCopy(file.ranges ?? {}),
    mustKeep: (file.mustKeep ?? []).map(cleanMustKeep),
    pairedWith: plainCopy(file.pairedWith ?? []),
    locked: plainCopy(file.locked ?? []),
    opened: plainCopy(file.opened ?? []),
  };
}

function cleanRelease({ role, secondRole, day, reason }: Release): Release {
  const second = secondRole === undefined ? {} : { secondRole: cleanText(secondRole) };
  return { role: cleanText(role), ...second, day, reason: cleanText(reason) };
}

/** Builds the study from a file whose structure was checked: defaults filled in, texts cleaned. */
export function studyOfFile(file: PresetFile): Study {
  return {
    format: 'holdfast preset',
    version: 1,
    id: file.id,
    title: cleanText(file.title),
    region: cleanText(file.region),
    fieldT: file.fieldT,
    status: file.status ?? 'draft',
    revision: file.revision ?? 1,
    ...(file.released === undefined ? {} : { released: cleanRelease(file.released) }),
    notes: cleanText(file.notes ?? ''),
    minimumSet: plainCopy(file.minimumSet ?? []),
    series: file.series.map(seriesOf),
  };
}
