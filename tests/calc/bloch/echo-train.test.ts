import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deviation, modelSignal, type Relaxation, relaxations, seed, within } from './compare-signal.js';
import { mean, playTrain, uniformTurns } from './isochromats.js';
import { apply, chain, crush, periodic, relax, turn } from './propagate.js';

/** With enough isochromats both sides are exact, so they must agree far better than the 2 % a person could see. */
const exact = 1e-8;

interface TrainSeries {
  readonly repetitionMs: number;
  readonly inversionMs: number | null;
  readonly echoes: number;
  /** Which echo is looked at, counted from 1. */
  readonly echo: number;
  readonly spacingMs: number;
  readonly excitationDeg: number;
  readonly refocusingDeg: number;
}

/**
 * Plays the train from a longitudinal magnetisation before its excitation, over isochromats that precess by every phase in half
 * a spacing; gives the wanted echo and the mean longitudinal magnetisation after it. Twice the echoes and two more make the sum exact.
 */
function play(s: TrainSeries, { t1Ms, t2Ms }: Relaxation, start: number): { readonly echo: number; readonly left: number } {
  const turns = uniformTurns(2 * s.echoes + 2);
  const excited = apply(turn('y', s.excitationDeg), [0, 0, start, 1]);
  const train = { echoes: s.echoes, refocusingDeg: s.refocusingDeg, half: relax(s.spacingMs / 2, t1Ms, t2Ms) };
  const { echoes, after } = playTrain(
    train,
    turns.map(() => excited),
    turns,
  );
  return { echo: echoes[s.echo - 1] as number, left: mean(after, 2) };
}

/** The echo in the steady state: crushed after the train, recovering, inverted where there is an inversion; found by the linear solver. */
function simulateSteady(s: TrainSeries, tissue: Relaxation): number {
  const [none, full] = [play(s, tissue, 0), play(s, tissue, 1)];
  const wait = relax(s.repetitionMs - s.echoes * s.spacingMs - (s.inversionMs ?? 0), tissue.t1Ms, tissue.t2Ms);
  const ending = s.inversionMs === null ? wait : chain(wait, turn('x', 180), relax(s.inversionMs, tissue.t1Ms, tissue.t2Ms));
  // The train is linear in what it starts with: as a propagator of longitudinal magnetisation alone.
  const train = [
    [0, 0, 0, 0],
    [0, 0, 0, 0],
    [0, 0, full.left - none.left, none.left],
    [0, 0, 0, 1],
  ];
  const start = periodic(chain(train, ending, crush))[2] as number;
  return none.echo + (full.echo - none.echo) * start;
}

const trains = fc
  .tuple(fc.integer({ min: 1, max: 28 }), within(0, 1), within(3.5, 14))
  .map(([echoes, share, spacingMs]) => ({ echoes, echo: 1 + Math.floor(share * (echoes - 1) + 0.5), spacingMs }));

describe(`echo trains against an isochromat sum (fast-check seed ${seed})`, () => {
  it('agrees to eight digits in the steady state, refocusing 60 to 180 degrees', () => {
    fc.assert(
      fc.property(relaxations, trains, within(60, 180), within(40, 4000), (tissue, { echoes, echo, spacingMs }, refocusingDeg, rest) => {
        const repetitionMs = echoes * spacingMs + rest;
        const given = {
          repetitionTimeMs: repetitionMs,
          echoTimeMs: echo * spacingMs,
          echoTrainLength: echoes,
          echoSpacingMs: spacingMs,
          refocusingAngleDeg: refocusingDeg,
        };
        const model = modelSignal('fast-spin-echo/2D', given, tissue).signal;
        const simulated = simulateSteady(
          { repetitionMs, inversionMs: null, echoes, echo, spacingMs, excitationDeg: 90, refocusingDeg },
          tissue,
        );
        expect(deviation(model, simulated)).toBeLessThan(exact);
      }),
      { seed, numRuns: 60 },
    );
  });

  it('agrees to eight digits when the excitation is not 90 degrees, so that the train starts with what the last one left', () => {
    fc.assert(
      fc.property(
        relaxations,
        trains,
        within(60, 180),
        within(40, 130),
        within(40, 2000),
        (tissue, { echoes, echo, spacingMs }, refocusingDeg, excitationDeg, rest) => {
          const repetitionMs = echoes * spacingMs + rest;
          const given = { repetitionTimeMs: repetitionMs, echoTimeMs: echo * spacingMs, echoTrainLength: echoes, echoSpacingMs: spacingMs };
          const model = modelSignal(
            'fast-spin-echo/3D',
            { ...given, refocusingAngleDeg: refocusingDeg, flipAngleDeg: excitationDeg },
            tissue,
          ).signal;
          const simulated = simulateSteady(
            { repetitionMs, inversionMs: null, echoes, echo, spacingMs, excitationDeg, refocusingDeg },
            tissue,
          );
          expect(deviation(model, simulated)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 40 },
    );
  });

  it('agrees to eight digits with an inversion before the train, short and long TI', () => {
    fc.assert(
      fc.property(
        relaxations,
        trains,
        within(60, 180),
        within(80, 2600),
        within(60, 6000),
        (tissue, { echoes, echo, spacingMs }, refocusingDeg, inversionMs, rest) => {
          const repetitionMs = inversionMs + echoes * spacingMs + rest;
          const given = {
            repetitionTimeMs: repetitionMs,
            inversionTimeMs: inversionMs,
            echoTimeMs: echo * spacingMs,
            echoTrainLength: echoes,
            echoSpacingMs: spacingMs,
          };
          const model = modelSignal('fast-spin-echo/2D', { ...given, refocusingAngleDeg: refocusingDeg }, tissue).signal;
          const simulated = simulateSteady(
            { repetitionMs, inversionMs, echoes, echo, spacingMs, excitationDeg: 90, refocusingDeg },
            tissue,
          );
          expect(deviation(model, simulated)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 50 },
    );
  });

  it('agrees to eight digits for rotating strips', () => {
    fc.assert(
      fc.property(relaxations, trains, within(90, 180), (tissue, { echoes, echo, spacingMs }, refocusingDeg) => {
        const given = {
          repetitionTimeMs: 3000,
          echoTimeMs: echo * spacingMs,
          echoTrainLength: echoes,
          echoSpacingMs: spacingMs,
          refocusingAngleDeg: refocusingDeg,
        };
        const model = modelSignal('rotating-strip-fast-spin-echo/2D', given, tissue).signal;
        const simulated = simulateSteady(
          { repetitionMs: 3000, inversionMs: null, echoes, echo, spacingMs, excitationDeg: 90, refocusingDeg },
          tissue,
        );
        expect(deviation(model, simulated)).toBeLessThan(exact);
      }),
      { seed, numRuns: 15 },
    );
  });

  it('agrees to eight digits for a single shot from equilibrium, an inversion included', () => {
    const inversions = fc.option(within(80, 2600), { nil: null });
    fc.assert(
      fc.property(
        relaxations,
        fc.integer({ min: 32, max: 128 }),
        within(0.05, 0.95),
        within(3, 6),
        within(60, 180),
        inversions,
        (tissue, lines, share, spacingMs, refocusingDeg, inversionMs) => {
          const echo = 1 + Math.floor(share * (lines - 1));
          const given = {
            repetitionTimeMs: 6000,
            echoTimeMs: echo * spacingMs,
            matrixPhase: lines,
            echoSpacingMs: spacingMs,
            refocusingAngleDeg: refocusingDeg,
          };
          const model = modelSignal(
            'single-shot-fast-spin-echo/2D',
            inversionMs === null ? given : { ...given, inversionTimeMs: inversionMs },
            tissue,
          ).signal;
          const prepared =
            inversionMs === null ? [0, 0, 1, 1] : apply(chain(turn('x', 180), relax(inversionMs, tissue.t1Ms, tissue.t2Ms)), [0, 0, 1, 1]);
          const train = { repetitionMs: 6000, inversionMs, echoes: echo, echo, spacingMs, excitationDeg: 90, refocusingDeg };
          expect(deviation(model, play(train, tissue, prepared[2] as number).echo)).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 25 },
    );
  });

  it('agrees to eight digits for a single shot that is averaged: it comes back to a slice after all slices', () => {
    fc.assert(
      fc.property(relaxations, fc.integer({ min: 1, max: 12 }), within(60, 180), (tissue, slices, refocusingDeg) => {
        const given = {
          repetitionTimeMs: 700,
          echoTimeMs: 80,
          matrixPhase: 64,
          echoSpacingMs: 5,
          refocusingAngleDeg: refocusingDeg,
          averages: 2,
          sliceCount: slices,
        };
        const model = modelSignal('single-shot-fast-spin-echo/2D', given, tissue).signal;
        const train = {
          repetitionMs: 700 * slices,
          inversionMs: null,
          echoes: 64,
          echo: 16,
          spacingMs: 5,
          excitationDeg: 90,
          refocusingDeg,
        };
        expect(deviation(model, simulateSteady(train, tissue))).toBeLessThan(exact);
      }),
      { seed, numRuns: 12 },
    );
  });
});
