import { describe, expect, it } from 'vitest';
import { edit, seriesOf } from '../series-of.js';

const textOf = (code: string, edited: ReturnType<typeof edit>) => edited.cautions.find((caution) => caution.code === code)?.text;

describe('numbers that cautions say', () => {
  it('an acceleration that the coil table does not know: along phase, and along partitions only where there are any', () => {
    expect(textOf('g-unknown', edit(seriesOf('spin-echo/2D', { parallelFactorPhase: 5 })))).toContain('acceleration 5 x 1 is not known');
    expect(
      textOf('g-unknown', edit(seriesOf('spoiled-gradient-echo/3D', { parallelFactorPhase: 5, parallelFactorSlice: 2, sliceCount: 20 }))),
    ).toContain('acceleration 5 x 2 is not known');
  });

  it('a change of the contrast ratio in percent', () => {
    const edited = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 500 }), { repetitionTimeMs: 2000 });
    const change = edited.figures.contrastRatioChange as number;
    expect(Math.abs(change)).toBeGreaterThan(0.1);
    expect(textOf('contrast-drift', edited)).toContain(`changes by ${Math.round(100 * change)} %`);
  });
});
