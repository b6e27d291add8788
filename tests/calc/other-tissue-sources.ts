/** Values of one published source: tissue, field in tesla, T1 and T2 in ms where it gives them. */
export interface OtherSource {
  readonly source: string;
  /** How the values were read. */
  readonly provenance: string;
  readonly values: readonly (readonly [string, number, number | null, number | null])[];
}

/** Published relaxation of the same tissues from other sources than the planner's table, 0.5 to 3 T. */
export const otherSources: readonly OtherSource[] = [
  {
    source: 'Stanisz GJ et al. Magn Reson Med 2005;54:507-512, Table 1 (in vitro, 37 C, mixed species)',
    provenance: 'read in secondary page',
    values: [
      ['white matter', 1.5, 884, 72],
      ['white matter', 3, 1084, 69],
      ['grey matter (cortical)', 1.5, 1124, 95],
      ['grey matter (cortical)', 3, 1820, 99],
      ['spinal cord (white matter)', 3, 993, 78],
      ['skeletal muscle', 1.5, 1008, 44],
      ['skeletal muscle', 3, 1412, 50],
      ['myocardium', 1.5, 1030, 40],
      ['myocardium', 3, 1471, 47],
      ['liver', 1.5, 576, null],
      ['liver', 3, 812, 42],
      ['blood (arterial, oxygenated)', 3, 1932, null],
      ['articular cartilage', 1.5, 1024, 30],
      ['articular cartilage', 3, 1168, 27],
      ['articular cartilage', 1.5, 1038, 44],
      ['articular cartilage', 3, 1156, 43],
      ['kidney (whole)', 1.5, 690, 55],
      ['kidney (whole)', 3, 1194, 56],
    ],
  },
  {
    source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)',
    provenance: 'read in source',
    values: [
      ['skeletal muscle', 3, 898, 29],
      ['subcutaneous fat', 3, 382, 68],
    ],
  },
  {
    source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)',
    provenance: 'read in secondary page',
    values: [
      ['skeletal muscle', 1.5, 856, 27],
      ['subcutaneous fat', 1.5, 343, 58],
    ],
  },
  {
    source: 'Wansapura JP et al. J Magn Reson Imaging 1999;9:531-538 (in vivo)',
    provenance: 'read in secondary page',
    values: [
      ['white matter', 3, 832, 79.6],
      ['grey matter (cortical)', 3, 1331, 110],
    ],
  },
  {
    source: 'Whittall KP et al. Magn Reson Med 1997;37:34-43 (in vivo; T2 = main-peak geometric mean)',
    provenance: 'read in secondary page',
    values: [
      ['white matter', 1.5, 756, 77.4],
      ['grey matter (cortical)', 1.5, 1200, 79.9],
    ],
  },
  {
    source: 'Rooney WD et al. Magn Reson Med 2007;57:308-318 (in vivo)',
    provenance: 'from memory',
    values: [
      ['white matter', 1, 555, null],
      ['grey matter (cortical)', 1, 1036, null],
      ['white matter', 1.5, 656, null],
      ['grey matter (cortical)', 1.5, 1188, null],
    ],
  },
  {
    source: 'computed from Rooney 2007 power law T1=A*(gamma*B0)^B: WM A=7.1e-4 B=0.382, GM A=1.16e-3 B=0.376 (s, Hz)',
    provenance: 'computed from cited law',
    values: [
      ['white matter', 0.55, 463.9, null],
      ['grey matter (cortical)', 0.55, 684.6, null],
      ['white matter', 1.5, 680.6, null],
      ['grey matter (cortical)', 1.5, 998.3, null],
      ['white matter', 3, 886.9, null],
      ['grey matter (cortical)', 3, 1295.5, null],
    ],
  },
  {
    source: 'Spijkerman JM et al. MAGMA 2018;31:415-424 (CSF T2)',
    provenance: 'read in secondary page',
    values: [['CSF', 3, null, 2030]],
  },
  {
    source: 'Lu H et al. Magn Reson Med 2004;52:679-682 (bovine blood, Hct 0.42, 37 C)',
    provenance: 'read in source',
    values: [['blood (arterial, oxygenated)', 3, 1664, null]],
  },
  {
    source: 'Edden RAE et al. J Magn Reson Imaging 2010;32:982-987 (in vivo breast, n=6)',
    provenance: 'read in source',
    values: [['breast fibroglandular', 3, 1680, 71]],
  },
  {
    source: 'Hanson CA et al. Radiology 2020;297:344-351 (meta-analysis, 42 studies, n=954)',
    provenance: 'read in source',
    values: [
      ['myocardium', 1.5, null, 52],
      ['myocardium', 3, null, 46],
    ],
  },
  {
    source: 'Tirkes T et al. Abdom Radiol 2019;44:3133-3138 (in vivo, medians, dual-flip spoiled gradient echo)',
    provenance: 'read in source',
    values: [
      ['pancreas', 1.5, 654, null],
      ['pancreas', 3, 717, null],
    ],
  },
  {
    source: 'Pai A et al. Magn Reson Imaging 2008;26:1215-1220, PMC2849643 (in vivo knee, mean over 5 methods)',
    provenance: 'read in source',
    values: [
      ['articular cartilage', 3, null, 36.38],
      ['skeletal muscle', 3, null, 34.08],
    ],
  },
  {
    source: 'computed from Bottomley PA et al. Med Phys 1984;11:425-448, T1=A*nu^B',
    provenance: 'computed from cited law',
    values: [
      ['skeletal muscle', 0.5, 547.1, null],
      ['skeletal muscle', 1, 732.1, null],
      ['skeletal muscle', 1.5, 868.1, null],
      ['myocardium', 0.5, 582.5, null],
      ['myocardium', 0.55, 602.9, null],
      ['myocardium', 1, 748.5, null],
      ['myocardium', 1.5, 866.7, null],
      ['liver', 0.5, 324.7, null],
      ['liver', 0.55, 336.7, null],
      ['liver', 1, 422.5, null],
      ['liver', 1.5, 492.9, null],
      ['kidney (whole)', 0.5, 495.9, null],
      ['kidney (whole)', 1, 589.2, null],
      ['kidney (whole)', 1.5, 651.8, null],
      ['spleen', 0.5, 542.9, null],
      ['spleen', 1, 683.4, null],
      ['spleen', 1.5, 781.9, null],
      ['subcutaneous fat', 0.5, 214, null],
      ['subcutaneous fat', 0.55, 217.6, null],
      ['subcutaneous fat', 1, 241.5, null],
      ['subcutaneous fat', 1.5, 259.1, null],
      ['grey matter (cortical)', 0.5, 656.5, null],
      ['grey matter (cortical)', 0.55, 676.1, null],
      ['grey matter (cortical)', 1, 812.9, null],
      ['grey matter (cortical)', 1.5, 921.1, null],
      ['white matter', 0.5, 536.8, null],
      ['white matter', 0.55, 554.9, null],
      ['white matter', 1, 683.1, null],
      ['white matter', 1.5, 786.6, null],
    ],
  },
];
