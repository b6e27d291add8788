import { describe, expect, it } from 'vitest';
import { tissueRows } from '../../src/calc/tissue-table.js';
import { diffusionFactor, isFat, type Tissue, tableTissue, tissueNames, tissueOf, tissuesWithValueAt } from '../../src/calc/tissues.js';

const at = (name: string, fieldT: number) => tableTissue(name, fieldT) as Tissue;
const plain = { contrastAgent: false, tissueOverrides: {} };

describe('the tissue table', () => {
  it('has its own values at the fields of its rows', () => {
    for (const row of tissueRows) {
      const tissue = at(row.tissue, row.fieldT);
      if (row.tissue !== 'spinal cord (white matter)') expect(tissue.t1Ms).toBeCloseTo(row.t1Ms, 9);
      expect(tissue.t2Ms).toBeCloseTo(row.t2Ms, 9);
      expect(tissue.protonDensity).toBe(row.protonDensity);
      expect(tissue.extrapolated).toBe(false);
      if (row.t2StarMs !== undefined) expect(tissue.t2StarMs).toBeCloseTo(row.t2StarMs, 9);
    }
  });

  it('names a source and how it was read for every row', () => {
    for (const row of tissueRows) {
      expect(row.source.length).toBeGreaterThan(10);
      expect(['read in source', 'read in secondary page', 'from memory', 'computed from cited law']).toContain(row.provenance);
    }
  });

  it('knows a name or gives null', () => {
    expect(tableTissue('unobtainium', 1.5)).toBeNull();
    expect(tissueOf('unobtainium', 1.5, plain)).toBeNull();
    expect(tissueNames).toContain('liver');
    expect(new Set(tissueNames).size).toBe(tissueNames.length);
  });

  it('only subcutaneous fat is fat: marrow is treated as water', () => {
    expect(tissueNames.filter(isFat)).toEqual(['subcutaneous fat']);
  });
});

describe('between and beyond the tabulated fields', () => {
  it('T1 is straight in logarithms: liver at 2 T between 586 at 1.5 and 809 at 3 T (computed)', () => {
    expect(at('liver', 2).t1Ms).toBeCloseTo(586 * (2 / 1.5) ** (Math.log(809 / 586) / Math.log(2)), 9);
    expect(at('liver', Math.sqrt(4.5)).t1Ms).toBeCloseTo(Math.sqrt(586 * 809), 9);
    // the lower pair below 1.5 T
    expect(at('liver', 1).t1Ms).toBeCloseTo(339 * (1 / 0.55) ** (Math.log(586 / 339) / Math.log(1.5 / 0.55)), 9);
  });

  it('R2 is straight in B0: liver at 2.25 T is the mean of its two rates (computed)', () => {
    expect(1 / at('liver', 2.25).t2Ms).toBeCloseTo((1 / 46 + 1 / 34) / 2, 12);
    expect(at('liver', 2.25).extrapolated).toBe(false);
  });

  it('beyond the ends R2 is held and the slope of T1 kept within 0 to 0.5 (assumption)', () => {
    const slope = Math.log(809 / 586) / Math.log(2);
    expect(at('liver', 7).t1Ms).toBeCloseTo(809 * (7 / 3) ** slope, 9);
    expect(at('liver', 7).t2Ms).toBe(34);
    expect(at('liver', 7).extrapolated).toBe(true);
    // 0.546 between 0.55 and 1.5 T is held to 0.5 below
    expect(at('liver', 0.3).t1Ms).toBeCloseTo(339 * Math.sqrt(0.3 / 0.55), 9);
    expect(at('liver', 0.3).t2Ms).toBe(66);
    expect(at('liver', 0.3).extrapolated).toBe(true);
  });

  it('a single row: T1 grows as B0 to 0.33, R2 stays (assumption)', () => {
    expect(at('intervertebral disc (nucleus)', 3).t1Ms).toBeCloseTo(1100 * 2 ** 0.33, 9);
    expect(at('intervertebral disc (nucleus)', 3).t2Ms).toBe(108);
    expect(at('intervertebral disc (nucleus)', 3).extrapolated).toBe(true);
    expect(at('kidney (whole)', 0.2).t1Ms).toBeCloseTo(507.8 * (0.2 / 0.55) ** 0.33, 9);
  });

  it.each([0.2, 0.55, 1, 1.5, 2.89, 3, 7])(
    'CSF has T1 4.3 s at %d T (field independent, 4.3 +- 0.2 s: Rooney, Magn Reson Med 2007;57:308, abstract; read in the source)',
    (fieldT) => {
      expect(at('CSF', fieldT).t1Ms).toBeCloseTo(4300, 6);
    },
  );

  it('cord follows white matter: 750 x white matter over 838 (an assumption, its two rows disagree)', () => {
    expect(at('spinal cord (white matter)', 3).t1Ms).toBeCloseTo(750, 9);
    expect(at('spinal cord (white matter)', 1.5).t1Ms).toBeCloseTo((750 * 646) / 838, 9);
    expect(at('spinal cord (white matter)', 1.5).t2Ms).toBe(74);
  });
});

describe('T2*', () => {
  it('is tabulated in brain between its measured fields, rate straight in B0', () => {
    expect(at('white matter', 3).t2StarMs).toBeCloseTo(53.2, 9);
    expect(1 / at('white matter', 2.25).t2StarMs).toBeCloseTo((1 / 66.2 + 1 / 53.2) / 2, 12);
  });

  it('else is 1/T2 + k B0 with 1.5 /s/T in brain and cord, 5 elsewhere (common practice, no source)', () => {
    expect(1 / at('liver', 3).t2StarMs).toBeCloseTo(1 / 34 + 0.015, 12);
    expect(1 / at('CSF', 3).t2StarMs).toBeCloseTo(1 / 2000 + 0.0045, 12);
    expect(1 / at('spinal cord (white matter)', 3).t2StarMs).toBeCloseTo(1 / 66 + 0.0045, 12);
    expect(1 / at('white matter', 0.55).t2StarMs).toBeCloseTo(1 / 89 + 0.000825, 12);
    expect(1 / at('grey matter (cortical)', 7).t2StarMs).toBeCloseTo(1 / 76 + 0.0105, 12);
  });
});

describe('contrast agent: 1/T1 + r1 C (r1 4.5 at 1.5 T, 4.0 at 3 T; concentrations by assumption)', () => {
  const enhanced = (name: string, fieldT: number) => (tissueOf(name, fieldT, { contrastAgent: true, tissueOverrides: {} }) as Tissue).t1Ms;

  it.each<[string, number, number]>([
    ['blood (arterial, oxygenated)', 2, 1441],
    ['spleen', 1, 1057],
    ['kidney cortex', 1, 966],
    ['kidney medulla', 1, 1412],
    ['liver', 0.5, 586],
  ])('%s takes %d mmol/L', (name, mmol, t1) => {
    expect(1 / enhanced(name, 1.5)).toBeCloseTo(1 / t1 + 0.0045 * mmol, 12);
  });

  it('the whole kidney takes 1 mmol/L', () => {
    expect(1 / enhanced('kidney (whole)', 1.5) - 1 / at('kidney (whole)', 1.5).t1Ms).toBeCloseTo(0.0045, 12);
  });

  it('r1 falls to 4.0 at 3 T, straight between and held beyond', () => {
    const r1 = (fieldT: number) => 1000 * (1 / enhanced('spleen', fieldT) - 1 / at('spleen', fieldT).t1Ms);
    expect(r1(3)).toBeCloseTo(4, 9);
    expect(r1(2.25)).toBeCloseTo(4.25, 9);
    expect(r1(0.55)).toBeCloseTo(4.5, 9);
    expect(r1(7)).toBeCloseTo(4, 9);
  });

  it('leaves the other tissues and T2 alone', () => {
    expect(enhanced('skeletal muscle', 3)).toBe(1420);
    expect(tissueOf('spleen', 3, { contrastAgent: true, tissueOverrides: {} })?.t2Ms).toBe(61);
  });
});

describe('overrides of a series', () => {
  it('win over table and contrast agent', () => {
    const liver = tissueOf('liver', 3, { contrastAgent: true, tissueOverrides: { liver: { t1Ms: 400, protonDensity: 0.8 } } });
    expect(liver).toMatchObject({ t1Ms: 400, t2Ms: 34, protonDensity: 0.8 });
  });

  it('a T2 of its own moves T2* too, unless that is given', () => {
    const long = tissueOf('liver', 3, { contrastAgent: false, tissueOverrides: { liver: { t2Ms: 80 } } });
    expect(1 / (long as Tissue).t2StarMs).toBeCloseTo(1 / 80 + 0.015, 12);
    expect(tissueOf('liver', 3, { contrastAgent: false, tissueOverrides: { liver: { t2Ms: 80, t2StarMs: 25 } } })?.t2StarMs).toBe(25);
  });

  it('touch no other tissue', () => {
    expect(tissueOf('spleen', 3, { contrastAgent: false, tissueOverrides: { liver: { t1Ms: 1 } } })?.t1Ms).toBe(1328);
  });
});

describe('diffusion', () => {
  it.each<[string, number]>([
    // um2/ms; common practice, values from memory
    ['grey matter (cortical)', 0.8],
    ['white matter', 0.7],
    ['CSF', 3.0],
    ['spinal cord (white matter)', 0.9],
    ['liver', 1.1],
    ['spleen', 0.8],
    ['kidney cortex', 1.9],
    ['kidney medulla', 1.9],
    ['kidney (whole)', 1.9],
    ['pancreas', 1.3],
    ['prostate', 1.5],
    ['skeletal muscle', 1.5],
    ['breast fibroglandular', 1.8],
    ['cervix', 1.4],
    ['myometrium', 1.4],
    ['bone marrow (vertebral)', 0.4],
    ['subcutaneous fat', 0.05],
    ['intervertebral disc (nucleus)', 1.7],
    ['articular cartilage', 1.3],
  ])('%s keeps e^(-b D) with D %d', (name, d) => {
    expect(diffusionFactor(name, 1000)).toBeCloseTo(Math.exp(-d), 12);
    expect(diffusionFactor(name, 50)).toBeCloseTo(Math.exp(-0.05 * d), 12);
  });

  it('is 1 without weighting, and null where no value is kept', () => {
    expect(diffusionFactor('synovial fluid', 0)).toBe(1);
    expect(diffusionFactor('synovial fluid', 800)).toBeNull();
  });
});

describe('tissuesWithValueAt', () => {
  it('lists what is measured at a field or around it', () => {
    expect(tissuesWithValueAt(1.5)).toContain('intervertebral disc (nucleus)');
    expect(tissuesWithValueAt(3)).not.toContain('intervertebral disc (nucleus)');
    expect(tissuesWithValueAt(1)).toContain('liver');
    expect(tissuesWithValueAt(1)).not.toContain('prostate');
    expect(tissuesWithValueAt(7)).toEqual([]);
  });
});
