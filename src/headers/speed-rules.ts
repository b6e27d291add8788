import type { Attributes, Keyword } from './attribute-table.js';
import type { CollectedSeries } from './collected-series.js';
import { derivedAs, type Found, missingFor, readAs, someOf } from './found.js';
import { firstNumber, heldNowhere, says, type ValueRule } from './value-rule.js';

function acceleration(keyword: Keyword): ValueRule {
  return {
    from: [keyword, 'ParallelAcquisition'],
    fields: [keyword],
    how: 'as it stands; ParallelAcquisition NO is 1',
    find: (series) => {
      const found = firstNumber(series, keyword);
      if (found.origin === 'read' && (found.value as number) >= 1) return found;
      if (series.attributes.ParallelAcquisition?.[0] === 'NO') return derivedAs(1, 'ParallelAcquisition NO');
      return missingFor(`${keyword} is not stated`);
    },
  };
}

/** Along which directions only a part of k-space was acquired, as far as that is said. */
function partialAlong(a: Attributes): { readonly phase: boolean; readonly slice: boolean; readonly by: string } | 'none' | null {
  const direction = a.PartialFourierDirection?.[0];
  const stated = a.PartialFourier?.[0];
  if (stated === 'NO') return 'none';
  if (stated === 'YES' || direction !== undefined) {
    const by = `PartialFourier YES${direction === undefined ? '' : `, PartialFourierDirection ${direction}`}`;
    const unsaid = direction === undefined || direction === 'COMBINATION';
    return { phase: unsaid || direction === 'PHASE', slice: unsaid || direction === 'SLICE_SELECT', by };
  }
  if (says(a.ScanOptions, 'PFP')) return { phase: true, slice: false, by: 'ScanOptions PFP' };
  return null;
}

function partialFourier(along: 'phase' | 'slice'): ValueRule['find'] {
  return ({ attributes: a }: CollectedSeries): Found => {
    const fraction = a.PartialFourierFraction?.[0];
    if (fraction !== undefined && fraction > 0) {
      const onSlice = a.PartialFourierDirection?.[0] === 'SLICE_SELECT';
      if (onSlice === (along === 'slice')) return readAs(fraction, 'PartialFourier');
      return derivedAs(1, 'PartialFourier is along the other direction');
    }
    const partial = partialAlong(a);
    if (partial === 'none') return readAs(1, 'PartialFourier NO');
    if (partial === null) return missingFor('PartialFourier is not stated');
    if (partial[along]) return someOf(`${partial.by}: only a part is acquired`);
    // ScanOptions speak of phase alone.
    if (partial.by.startsWith('ScanOptions')) return missingFor('PartialFourier is not stated');
    return derivedAs(1, `${partial.by}: not along this direction`);
  };
}

function findElliptical({ attributes: a }: CollectedSeries): Found {
  const stated = a.CoverageOfKSpace?.[0];
  if (stated === undefined || stated === 'WEDGE') return missingFor('CoverageOfKSpace is not stated, or neither full nor elliptical');
  return readAs(stated !== 'FULL', `CoverageOfKSpace ${stated}`);
}

const partialWords = 'NO is 1; YES is a part, not how much: asked for, or guessed from AcquisitionDuration';

export const speedRules = {
  parallelFactorPhase: acceleration('ParallelReductionFactorInPlane'),
  parallelFactorSlice: acceleration('ParallelReductionFactorOutOfPlane'),
  referenceLines: heldNowhere(),
  referenceScanS: heldNowhere(),
  partialFourierPhase: {
    from: ['PartialFourier', 'PartialFourierDirection', 'ScanOptions'],
    fields: ['PartialFourier', 'PartialFourierDirection'],
    how: partialWords,
    find: partialFourier('phase'),
  },
  partialFourierSlice: {
    from: ['PartialFourier', 'PartialFourierDirection'],
    fields: ['PartialFourier', 'PartialFourierDirection'],
    how: partialWords,
    find: partialFourier('slice'),
  },
  ellipticalSampling: {
    from: ['CoverageOfKSpace'],
    fields: [],
    how: 'FULL is no, CYLINDRICAL and ELLIPSOIDAL are yes',
    find: findElliptical,
  },
  simultaneousSlices: {
    ...heldNowhere(['MultibandAccelerationFactor']),
    find: (series) => {
      const stated = series.attributes.MultibandAccelerationFactor?.[0];
      return stated === undefined ? missingFor('no standard attribute holds it') : readAs(stated, 'MultibandAccelerationFactor');
    },
  },
} as const satisfies Readonly<Record<string, ValueRule>>;
