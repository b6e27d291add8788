import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deviation, modelSignal, type Relaxation, relaxations, seed, within } from './compare-signal.js';
import { mean, uniformTurns } from './isochromats.js';
import { apply, chain, crush, type Propagator, periodic, relax, turn } from './propagate.js';

/** Both sides are exact, so they must agree far better than the 0.2 % a person could see. */
const exact = 1e-8;

interface SpinEcho {
  readonly repetitionMs: number;
  readonly echoesMs: readonly number[];
  readonly inversionMs: number | null;
  readonly excitationDeg: number;
  readonly refocusingDeg: number;
}

/** Phases that a pair of crushers winds into a voxel; each refocusing pulse has its own pair. */
const phases = uniformTurns(8);

/** The periodic echoes of a spin echo with crushed refocusing pulses, as a sum over isochromats. */
function simulate(s: SpinEcho, { t1Ms, t2Ms }: Relaxation): number[] {
  const excite = turn('y', s.excitationDeg);
  const refocus = turn('x', s.refocusingDeg);
  const crushed = phases.map((phase) => chain(phase, refocus, phase));
  const last = s.echoesMs[s.echoesMs.length - 1] as number;
  const wait = s.repetitionMs - last - (s.inversionMs ?? 0);
  const ending =
    s.inversionMs === null
      ? relax(wait, t1Ms, t2Ms)
      : chain(relax(wait, t1Ms, t2Ms), turn('x', 180), crush, relax(s.inversionMs, t1Ms, t2Ms));
  // One propagator per isochromat and echo; two refocusing pulses have two independent phases.
  let paths: Propagator[] = [excite];
  const upTo: Propagator[][] = [];
  let from = 0;
  for (const echoMs of s.echoesMs) {
    const half = relax((echoMs - from) / 2, t1Ms, t2Ms);
    paths = paths.flatMap((path) => crushed.map((pulse) => chain(path, half, pulse, half)));
    upTo.push(paths);
    from = echoMs;
  }
  const averaged = (all: readonly Propagator[]): Propagator =>
    [0, 1, 2, 3].map((i) => [0, 1, 2, 3].map((j) => all.reduce((sum, p) => sum + (p[i]?.[j] as number), 0) / all.length));
  const start = periodic(chain(averaged(paths), crush, ending, crush));
  return upTo.map((all) =>
    mean(
      all.map((path) => apply(path, start)),
      0,
    ),
  );
}

const seconds = within(30, 4000);

describe(`spin echo against Bloch propagation (fast-check seed ${seed})`, () => {
  it('agrees to eight digits at 90 and 180 degrees', () => {
    fc.assert(
      fc.property(relaxations, within(5, 120), seconds, (tissue, echoMs, rest) => {
        const given = { repetitionTimeMs: echoMs + rest, echoTimeMs: echoMs };
        const [echo] = simulate(
          { repetitionMs: echoMs + rest, echoesMs: [echoMs], inversionMs: null, excitationDeg: 90, refocusingDeg: 180 },
          tissue,
        );
        expect(deviation(modelSignal('spin-echo/2D', given, tissue).signal, echo as number)).toBeLessThan(exact);
      }),
      { seed, numRuns: 60 },
    );
  });

  it('agrees to eight digits at any excitation and refocusing angle', () => {
    fc.assert(
      fc.property(
        relaxations,
        within(5, 120),
        seconds,
        within(20, 150),
        within(60, 180),
        (tissue, echoMs, rest, excitationDeg, refocusingDeg) => {
          const given = {
            repetitionTimeMs: echoMs + rest,
            echoTimeMs: echoMs,
            flipAngleDeg: excitationDeg,
            refocusingAngleDeg: refocusingDeg,
          };
          const [echo] = simulate(
            { repetitionMs: echoMs + rest, echoesMs: [echoMs], inversionMs: null, excitationDeg, refocusingDeg },
            tissue,
          );
          expect(deviation(modelSignal('spin-echo/3D', given, tissue).signal, echo as number)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 40 },
    );
  });

  it('agrees to eight digits after an inversion, on either side of the null', () => {
    fc.assert(
      fc.property(
        relaxations,
        within(5, 100),
        within(50, 2500),
        seconds,
        within(120, 180),
        (tissue, echoMs, inversionMs, rest, refocusingDeg) => {
          const repetitionMs = inversionMs + echoMs + rest;
          const given = {
            repetitionTimeMs: repetitionMs,
            echoTimeMs: echoMs,
            inversionTimeMs: inversionMs,
            refocusingAngleDeg: refocusingDeg,
          };
          const [echo] = simulate({ repetitionMs, echoesMs: [echoMs], inversionMs, excitationDeg: 90, refocusingDeg }, tissue);
          expect(deviation(modelSignal('spin-echo/2D', given, tissue).signal, echo as number)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 60 },
    );
  });

  it('agrees to eight digits for both echoes of a dual spin echo', () => {
    fc.assert(
      fc.property(relaxations, within(8, 40), within(10, 90), seconds, within(120, 180), (tissue, first, between, rest, refocusingDeg) => {
        const second = first + between;
        const given = { repetitionTimeMs: second + rest, echoTimeMs: first, secondEchoTimeMs: second, refocusingAngleDeg: refocusingDeg };
        const [a, b] = simulate(
          { repetitionMs: second + rest, echoesMs: [first, second], inversionMs: null, excitationDeg: 90, refocusingDeg },
          tissue,
        );
        const model = modelSignal('spin-echo/2D', given, tissue);
        expect(deviation(model.signal, a as number)).toBeLessThan(exact);
        expect(deviation(model.secondSignal as number, b as number)).toBeLessThan(exact);
      }),
      { seed, numRuns: 30 },
    );
  });

  it('agrees to eight digits for echo-planar spin echoes in their steady state, an inversion included', () => {
    const inversions = fc.option(within(100, 2400), { nil: null });
    fc.assert(
      fc.property(
        relaxations,
        within(30, 120),
        inversions,
        seconds,
        within(120, 180),
        (tissue, echoMs, inversionMs, rest, refocusingDeg) => {
          const repetitionMs = (inversionMs ?? 0) + echoMs + rest + 20;
          const given = {
            repetitionTimeMs: repetitionMs,
            echoTimeMs: echoMs,
            refocusingAngleDeg: refocusingDeg,
            matrixPhase: 64,
            echoSpacingMs: 0.5,
            dummyShots: 1,
          };
          const model = modelSignal(
            'echo-planar-spin-echo/2D',
            inversionMs === null ? given : { ...given, inversionTimeMs: inversionMs },
            tissue,
          );
          const [echo] = simulate({ repetitionMs, echoesMs: [echoMs], inversionMs, excitationDeg: 90, refocusingDeg }, tissue);
          expect(deviation(model.signal, echo as number)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 40 },
    );
  });

  it('starts a single echo-planar spin echo from equilibrium', () => {
    fc.assert(
      fc.property(relaxations, within(30, 120), within(60, 180), (tissue, echoMs, refocusingDeg) => {
        const given = {
          repetitionTimeMs: echoMs + 60,
          echoTimeMs: echoMs,
          refocusingAngleDeg: refocusingDeg,
          matrixPhase: 64,
          echoSpacingMs: 0.5,
        };
        const half = relax(echoMs / 2, tissue.t1Ms, tissue.t2Ms);
        const echo = mean(
          phases.map((phase) => apply(chain(turn('y', 90), half, phase, turn('x', refocusingDeg), phase, half), [0, 0, 1, 1])),
          0,
        );
        expect(deviation(modelSignal('echo-planar-spin-echo/2D', given, tissue).signal, echo)).toBeLessThan(exact);
      }),
      { seed, numRuns: 40 },
    );
  });
});
