import { spoiledGradientEchoSignal } from '../src/calc/signal/spoiled-gradient-echo.js';

/** How many different calls there are; all they take lies in the nearest cache. */
const kinds = 64;

/** Values between two ends in an order without neighbours. */
const spread = (low: number, high: number, step: number) =>
  Float64Array.from({ length: kinds }, (_, i) => low + ((high - low) * ((i * step) % kinds)) / kinds);
const repetitionTimesMs = spread(3, 10, 13);
const echoTimesMs = spread(1, 3, 27);
const flipAnglesDeg = spread(5, 20, 33);
const t1sMs = spread(500, 1500, 43);
const t2StarsMs = spread(10, 60, 51);

/**
 * The yardstick: one bare signal of a spoiled gradient echo, of invented timings, angles and tissues, every one of them another from
 * call to call as they are in an evaluation. What stays the same in a loop is worked out once, and would not be timed.
 */
export function bareSignal(turn: number): number {
  const k = turn & (kinds - 1);
  return spoiledGradientEchoSignal(
    repetitionTimesMs[k] as number,
    echoTimesMs[k] as number,
    flipAnglesDeg[k] as number,
    t1sMs[k] as number,
    t2StarsMs[k] as number,
  );
}
