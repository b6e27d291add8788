import type { GivenParameters } from '../calc/series.js';

/** What does not go together among the parameters of one series: keys from the outside in, and why. */
export interface Clash {
  readonly path: readonly [string, ...string[]];
  readonly given: string;
  readonly expected: string;
  readonly hint: string;
}

/** Parameters whose values are each within range, but that contradict each other whatever the model says. */
export function parameterClashes(given: GivenParameters): Clash[] {
  const clashes: Clash[] = [];
  const { diffusion, pacing } = given;
  if (diffusion !== undefined) {
    const count = diffusion.bValuesSPerMm2.length;
    if (diffusion.averages.length !== count) {
      clashes.push({
        path: ['diffusion', 'averages'],
        given: `${diffusion.averages.length} averages for ${count} b-values`,
        expected: `${count}, one for each b-value`,
        hint: 'Give the averages of every b-value, in the same order.',
      });
    }
    if (given.averages !== undefined && given.averages !== 1) {
      clashes.push({
        path: ['averages'],
        given: `${given.averages} beside "diffusion"`,
        expected: '1, since each b-value has its own averages',
        hint: 'Leave "averages" out and use "diffusion.averages".',
      });
    }
    const twice = diffusion.bValuesSPerMm2.find((b, i) => diffusion.bValuesSPerMm2.indexOf(b) !== i);
    if (twice !== undefined) {
      clashes.push({
        path: ['diffusion', 'bValuesSPerMm2'],
        given: `b ${twice} stands there twice`,
        expected: 'each b-value once',
        hint: 'Add its averages up.',
      });
    }
  }
  if (pacing?.windowMs !== undefined && pacing.periodMs !== undefined && pacing.windowMs > pacing.periodMs) {
    clashes.push({
      path: ['pacing', 'windowMs'],
      given: `a window of ${pacing.windowMs} ms in a period of ${pacing.periodMs} ms`,
      expected: 'a window no longer than the period',
      hint: 'Shorten the window.',
    });
  }
  return clashes;
}
