import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deviation, modelSignal, type Relaxation, relaxations, seed, within } from './compare-signal.js';
import { apply, chain, crush, periodic, relax, repeat, turn } from './propagate.js';

interface Cycle {
  readonly repetitionMs: number;
  readonly inversionMs: number;
  readonly readouts: number;
  readonly centre: number;
  readonly spacingMs: number;
  readonly echoMs: number;
  readonly angleDeg: number;
}

/** The echo at the central readout of a periodic cycle: inversion, wait, readouts each crushed, wait. Signed. */
function simulate(s: Cycle, { t1Ms, t2StarMs }: Relaxation): number {
  const pulse = turn('y', s.angleDeg);
  const readout = chain(pulse, relax(s.spacingMs, t1Ms, t2StarMs), crush);
  const before = s.inversionMs - s.centre * s.spacingMs;
  const prepared = chain(turn('x', 180), crush, relax(before, t1Ms, t2StarMs));
  const after = relax(s.repetitionMs - before - s.readouts * s.spacingMs, t1Ms, t2StarMs);
  const start = periodic(chain(prepared, repeat(readout, s.readouts), after));
  return apply(chain(prepared, repeat(readout, s.centre), pulse, relax(s.echoMs, t1Ms, t2StarMs)), start)[0] as number;
}

describe(`inversion-prepared gradient echo against Bloch propagation (fast-check seed ${seed})`, () => {
  it('agrees to eight digits at the central readout of the periodic cycle', () => {
    fc.assert(
      fc.property(
        relaxations,
        fc.integer({ min: 8, max: 220 }),
        fc.constantFrom(1, 0.875, 0.75, 0.625),
        within(3, 12),
        within(4, 16),
        within(1, 900),
        within(1, 1500),
        (tissue, partitions, partialFourier, spacingMs, angleDeg, before, after) => {
          const readouts = Math.ceil(partialFourier * partitions - 1e-9);
          const centre = Math.floor((partialFourier - 0.5) * partitions + 0.5);
          const inversionMs = before + centre * spacingMs;
          const repetitionMs = before + readouts * spacingMs + after;
          const echoMs = spacingMs / 2;
          const given = {
            repetitionTimeMs: repetitionMs,
            inversionTimeMs: inversionMs,
            echoTimeMs: echoMs,
            echoSpacingMs: spacingMs,
            flipAngleDeg: angleDeg,
          };
          const model = modelSignal(
            'inversion-prepared-gradient-echo/3D',
            { ...given, sliceCount: partitions, partialFourierSlice: partialFourier },
            tissue,
          );
          const simulated = simulate({ repetitionMs, inversionMs, readouts, centre, spacingMs, echoMs, angleDeg }, tissue);
          expect(deviation(model.signal, simulated)).toBeLessThan(1e-8);
        },
      ),
      { seed, numRuns: 60 },
    );
  });

  it('counts oversampled and accelerated partitions: 160 with 25 % and R 2 are 100 readouts', () => {
    const tissue = { t1Ms: 900, t2Ms: 70, t2StarMs: 50 };
    const given = {
      repetitionTimeMs: 2000,
      inversionTimeMs: 800,
      echoTimeMs: 3,
      echoSpacingMs: 7,
      flipAngleDeg: 9,
      sliceCount: 160,
      sliceOversamplingPercent: 25,
      parallelFactorSlice: 2,
    };
    const model = modelSignal('inversion-prepared-gradient-echo/3D', given, tissue).signal;
    const simulated = simulate(
      { repetitionMs: 2000, inversionMs: 800, readouts: 100, centre: 50, spacingMs: 7, echoMs: 3, angleDeg: 9 },
      tissue,
    );
    expect(deviation(model, simulated)).toBeLessThan(1e-9);
  });
});
