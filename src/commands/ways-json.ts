import type { NothingFits } from '../search/nothing-fits.js';
import type { SearchResult } from '../search/search.js';
import type { Way } from '../search/way.js';

/**
 * One way as data. Values set by hand are among its changes, so that applying them to the preset gives its figures. A split that follows is nothing to
 * set: `gives` names it, as rounds needed.
 */
function wayDocument({ kind, changes: { rounds, ...others }, given, figures, gives, gains, cautions, spare, verdict }: Way): object {
  const { timeS, holdS, b1rmsUt, sarWkg, rfRatio } = spare;
  return {
    kind,
    changes: given.rounds === undefined || rounds === undefined ? others : { ...others, rounds },
    figures,
    gives,
    gains,
    cautions,
    spare: { timeS, holdS, b1rmsUt, sarWkg, ...(rfRatio === null ? {} : { rfRatio }) },
    verdict,
  };
}

/** What `ways --json` adds to the document of figures. */
export function waysDocument(result: SearchResult, bands: object, nothing: NothingFits | null): object {
  const pairs = (points: SearchResult['fronts']['timeSnr']) => points.map(({ timeS, value }) => [timeS, value]);
  return {
    ways: result.ways.map(wayDocument),
    lattice: result.lattice,
    formed: result.formed,
    fitting: result.fitting,
    proven: result.proven && (nothing?.proven ?? true),
    bands,
    fronts: { timeSnr: pairs(result.fronts.timeSnr), timeLoss: pairs(result.fronts.timeLoss) },
    nearest: result.nearest === null ? null : wayDocument(result.nearest),
    binding: (nothing?.bindings ?? []).map(({ binders, way, needs }) => ({
      limits: binders.map(({ name }) => name),
      way: wayDocument(way),
      needs,
    })),
  };
}
