import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deviation, modelSignal, type Relaxation, relaxations, seed, within } from './compare-signal.js';
import { apply, chain, crush, periodic, relax, transverse, turn } from './propagate.js';

/** Both sides are exact, so they must agree far better than the 0.2 % a person could see. */
const exact = 1e-8;

const repetitions = within(Math.log(2.5), Math.log(1500)).map(Math.exp);

/** The periodic echo of a gradient echo whose transverse magnetisation is crushed each time: perfect RF spoiling. */
function simulateSpoiled(repetitionMs: number, echoMs: number, angleDeg: number, { t1Ms, t2StarMs }: Relaxation): number {
  const pulse = turn('x', angleDeg);
  const start = periodic(chain(pulse, relax(repetitionMs, t1Ms, t2StarMs), crush));
  return transverse(apply(chain(pulse, relax(echoMs, t1Ms, t2StarMs)), start));
}

/** The periodic echo of a balanced gradient echo on resonance, pulses alternating in sign. */
function simulateBalanced(repetitionMs: number, echoMs: number, angleDeg: number, { t1Ms, t2Ms }: Relaxation): number {
  const [one, other] = [turn('x', angleDeg), turn('x', -angleDeg)];
  const rest = relax(repetitionMs, t1Ms, t2Ms);
  const start = periodic(chain(one, rest, other, rest));
  return transverse(apply(chain(one, relax(echoMs, t1Ms, t2Ms)), start));
}

describe(`gradient echoes against Bloch propagation (fast-check seed ${seed})`, () => {
  it('agrees to eight digits for spoiled gradient echoes, 2D and 3D', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('2D', '3D'),
        relaxations,
        repetitions,
        within(0.1, 0.7),
        within(1, 90),
        (acquisition, tissue, rest, share, angleDeg) => {
          const repetitionMs = acquisition === '2D' ? rest + 12 : rest;
          const echoMs = share * rest;
          const given = { repetitionTimeMs: repetitionMs, echoTimeMs: echoMs, flipAngleDeg: angleDeg };
          const model = modelSignal(`spoiled-gradient-echo/${acquisition as '2D' | '3D'}`, given, tissue).signal;
          expect(deviation(model, simulateSpoiled(repetitionMs, echoMs, angleDeg, tissue))).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 100 },
    );
  });

  it('agrees to eight digits for both echoes of a dual gradient echo', () => {
    fc.assert(
      fc.property(
        relaxations,
        within(40, 300),
        within(1, 4),
        within(1, 10),
        within(5, 90),
        (tissue, repetitionMs, first, between, angleDeg) => {
          const given = { repetitionTimeMs: repetitionMs, echoTimeMs: first, secondEchoTimeMs: first + between, flipAngleDeg: angleDeg };
          const model = modelSignal('spoiled-gradient-echo/2D', given, tissue);
          expect(deviation(model.signal, simulateSpoiled(repetitionMs, first, angleDeg, tissue))).toBeLessThan(exact);
          expect(deviation(model.secondSignal as number, simulateSpoiled(repetitionMs, first + between, angleDeg, tissue))).toBeLessThan(
            exact,
          );
        },
      ),
      { seed, numRuns: 40 },
    );
  });

  it('agrees to eight digits for balanced gradient echoes, 2D and 3D', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('2D', '3D'),
        relaxations,
        within(2.5, 12),
        within(0.2, 0.8),
        within(5, 90),
        (acquisition, tissue, repetitionMs, share, angleDeg) => {
          const echoMs = share * repetitionMs;
          const given = { repetitionTimeMs: repetitionMs, echoTimeMs: echoMs, flipAngleDeg: angleDeg };
          const model = modelSignal(`balanced-steady-state/${acquisition as '2D' | '3D'}`, given, tissue).signal;
          expect(deviation(model, simulateBalanced(repetitionMs, echoMs, angleDeg, tissue))).toBeLessThan(exact);
        },
      ),
      { seed, numRuns: 100 },
    );
  });

  it('agrees to eight digits for echo-planar gradient echoes, in their steady state and from equilibrium', () => {
    fc.assert(
      fc.property(relaxations, within(15, 60), within(30, 4000), within(10, 90), fc.boolean(), (tissue, echoMs, rest, angleDeg, once) => {
        const repetitionMs = echoMs + rest;
        const given = {
          repetitionTimeMs: repetitionMs,
          echoTimeMs: echoMs,
          flipAngleDeg: angleDeg,
          matrixPhase: 64,
          echoSpacingMs: 0.5,
          volumes: once ? 1 : 5,
        };
        const model = modelSignal('echo-planar-gradient-echo/2D', given, tissue).signal;
        const single = transverse(apply(chain(turn('x', angleDeg), relax(echoMs, tissue.t1Ms, tissue.t2StarMs)), [0, 0, 1, 1]));
        expect(deviation(model, once ? single : simulateSpoiled(repetitionMs, echoMs, angleDeg, tissue))).toBeLessThan(exact);
      }),
      { seed, numRuns: 60 },
    );
  });
});
