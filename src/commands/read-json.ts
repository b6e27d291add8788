import { classRow } from '../calc/classes.js';
import { givenOfHeaders, lackingFor, type SeriesToDraft } from '../headers/draft-of-headers.js';
import type { ReadResult } from './read.js';

/** The document that `read --json` prints. */
export function readJson({ counts, problems, more, series, draft, picked, written }: ReadResult): string {
  const document = {
    files: counts.files,
    read: counts.read,
    passedOver: counts.passedOver,
    series: series.map((one) => seriesDocument(one, picked.has(one.read.id))),
    draft:
      draft.study === null ? null : { id: draft.study.id, series: draft.study.series.map(({ id }) => id), path: written?.path ?? null },
    leftOut: draft.leftOut,
    problems: problems.map(({ code, path, message }) => ({ code, path, text: message })),
    moreProblems: Object.fromEntries(more),
  };
  return `${JSON.stringify(document, null, 2)}\n`;
}

function seriesDocument(one: SeriesToDraft, isPicked: boolean): object {
  const { read, typed } = one;
  const { key, reason } = read.decision;
  return {
    id: read.id,
    seriesNumber: read.seriesNumber,
    source: read.source,
    images: read.images,
    madeFromOthers: read.isDerived,
    picked: isPicked,
    class: key === null ? null : { family: classRow(key).family, acquisition: classRow(key).acquisition },
    classReason: reason,
    plane: read.plane.value ?? null,
    fieldT: read.fieldT.value ?? null,
    bodyPart: read.bodyPart,
    coverageMm: read.coverageMm,
    echoTimesMs: read.echoTimesMs,
    bValues: read.bValues,
    durationS: read.durationS,
    computedS: read.computedS,
    values: Object.fromEntries(
      read.values.map(({ key: name, value, origin, words }) => {
        const own = typed[name];
        return [name, own === undefined ? { value: value ?? null, origin, from: words } : { value: own, origin: 'typed', from: 'typed' }];
      }),
    ),
    needed: key === null ? ['class'] : lackingFor(key, givenOfHeaders(one)),
    missing: read.values.filter(({ key: name, origin }) => origin === 'missing' && typed[name] === undefined).map(({ key: name }) => name),
  };
}
