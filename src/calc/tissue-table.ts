/** One published value of a tissue at one field: the planner's table. Times in ms, field in tesla, proton density relative to CSF. */
export interface TissueRow {
  readonly tissue: string;
  readonly fieldT: number;
  readonly t1Ms: number;
  readonly t2Ms: number;
  /** Where measured; else it follows from T2 and the field. */
  readonly t2StarMs?: number;
  readonly protonDensity: number;
  readonly source: string;
  /** How the value reached this table. */
  readonly provenance: string;
  readonly note: string;
}

/**
 * Population values, not this patient. Published T1 of one tissue scatters by a quarter and more.
 * Proton densities: a textbook table with CSF = 1 read in a secondary page, or values from memory.
 */
export const tissueRows: readonly TissueRow[] = [
  { tissue: 'white matter', fieldT: 1.5, t1Ms: 646, t2Ms: 80, t2StarMs: 66.2, protonDensity: 0.7, source: 'composite: T1 Wright 2008; T2 Cox & Gowland 2010; T2* Peters 2007', provenance: 'from memory', note: 'T2 read in source; T2* from memory' },
  { tissue: 'grey matter (cortical)', fieldT: 1.5, t1Ms: 1197, t2Ms: 87, t2StarMs: 84, protonDensity: 0.83, source: 'composite: T1 Wright 2008; T2 Cox & Gowland 2010 (frontal); T2* Peters 2007', provenance: 'from memory', note: 'T2 read in source; T2* from memory' },
  { tissue: 'white matter', fieldT: 3, t1Ms: 838, t2Ms: 71, t2StarMs: 53.2, protonDensity: 0.7, source: 'composite: T1 Wright 2008; T2 Cox & Gowland 2010; T2* Peters 2007', provenance: 'read in secondary page', note: 'T2 read in source' },
  { tissue: 'grey matter (cortical)', fieldT: 3, t1Ms: 1607, t2Ms: 76, t2StarMs: 66, protonDensity: 0.83, source: 'composite: T1 Wright 2008; T2 Cox & Gowland 2010 (frontal); T2* Peters 2007', provenance: 'read in secondary page', note: 'T2 read in source' },
  { tissue: 'white matter', fieldT: 0.55, t1Ms: 493, t2Ms: 89, protonDensity: 0.7, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'from memory', note: 'bracketed by Rooney fit 464 and Bottomley 555' },
  { tissue: 'grey matter (cortical)', fieldT: 0.55, t1Ms: 717, t2Ms: 112, protonDensity: 0.83, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'from memory', note: 'bracketed by Rooney fit 685 and Bottomley 676' },
  { tissue: 'CSF', fieldT: 0.55, t1Ms: 4300, t2Ms: 2200, protonDensity: 1, source: 'composite: T1 Rooney 2007; T2 Spijkerman 2018 (3 T, 2030) / web table (1.5 T)', provenance: 'read in secondary page', note: 'T2 is weakly known; 1.5-2.5 s all defensible' },
  { tissue: 'CSF', fieldT: 1.5, t1Ms: 4300, t2Ms: 2200, protonDensity: 1, source: 'composite: T1 Rooney 2007; T2 Spijkerman 2018 (3 T, 2030) / web table (1.5 T)', provenance: 'read in secondary page', note: 'T2 is weakly known; 1.5-2.5 s all defensible' },
  { tissue: 'CSF', fieldT: 3, t1Ms: 4300, t2Ms: 2000, protonDensity: 1, source: 'composite: T1 Rooney 2007; T2 Spijkerman 2018 (3 T, 2030) / web table (1.5 T)', provenance: 'read in secondary page', note: 'T2 is weakly known; 1.5-2.5 s all defensible' },
  { tissue: 'blood (arterial, oxygenated)', fieldT: 0.55, t1Ms: 1122, t2Ms: 263, protonDensity: 0.85, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'read in secondary page', note: '' },
  { tissue: 'blood (arterial, oxygenated)', fieldT: 1.5, t1Ms: 1441, t2Ms: 290, protonDensity: 0.85, source: 'Stanisz GJ et al. Magn Reson Med 2005;54:507-512, Table 1 (in vitro, 37 C, mixed species)', provenance: 'read in secondary page', note: '' },
  { tissue: 'blood (arterial, oxygenated)', fieldT: 3, t1Ms: 1841, t2Ms: 275, protonDensity: 0.85, source: 'composite: T1 Li 2017; T2 Stanisz 2005', provenance: 'read in secondary page', note: 'T2 read in secondary' },
  { tissue: 'skeletal muscle', fieldT: 0.55, t1Ms: 569.4, t2Ms: 47, protonDensity: 0.9, source: 'computed from Bottomley PA et al. Med Phys 1984;11:425-448, T1=A*nu^B; T2 from same review (field-independent)', provenance: 'from memory', note: '' },
  { tissue: 'skeletal muscle', fieldT: 1.5, t1Ms: 1130, t2Ms: 35.3, protonDensity: 0.9, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: '' },
  { tissue: 'skeletal muscle', fieldT: 3, t1Ms: 1420, t2Ms: 31.7, protonDensity: 0.9, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: '' },
  { tissue: 'liver', fieldT: 0.55, t1Ms: 339, t2Ms: 66, protonDensity: 0.9, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'from memory', note: 'Bottomley law gives 337' },
  { tissue: 'liver', fieldT: 1.5, t1Ms: 586, t2Ms: 46, protonDensity: 0.9, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'liver', fieldT: 3, t1Ms: 809, t2Ms: 34, protonDensity: 0.9, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'spleen', fieldT: 0.55, t1Ms: 560.3, t2Ms: 62, protonDensity: 0.9, source: 'computed from Bottomley PA et al. Med Phys 1984;11:425-448, T1=A*nu^B; T2 from same review (field-independent)', provenance: 'from memory', note: '' },
  { tissue: 'spleen', fieldT: 1.5, t1Ms: 1057, t2Ms: 79, protonDensity: 0.9, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'spleen', fieldT: 3, t1Ms: 1328, t2Ms: 61, protonDensity: 0.9, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'kidney cortex', fieldT: 1.5, t1Ms: 966, t2Ms: 87, protonDensity: 0.95, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'kidney cortex', fieldT: 3, t1Ms: 1142, t2Ms: 76, protonDensity: 0.95, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'kidney medulla', fieldT: 1.5, t1Ms: 1412, t2Ms: 85, protonDensity: 0.95, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'kidney medulla', fieldT: 3, t1Ms: 1545, t2Ms: 81, protonDensity: 0.95, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'kidney (whole)', fieldT: 0.55, t1Ms: 507.8, t2Ms: 58, protonDensity: 0.95, source: 'computed from Bottomley PA et al. Med Phys 1984;11:425-448, T1=A*nu^B; T2 from same review (field-independent)', provenance: 'from memory', note: '' },
  { tissue: 'pancreas', fieldT: 1.5, t1Ms: 584, t2Ms: 46, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'pancreas', fieldT: 3, t1Ms: 725, t2Ms: 43, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'subcutaneous fat', fieldT: 0.55, t1Ms: 187, t2Ms: 93, protonDensity: 0.95, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'read in secondary page', note: '' },
  { tissue: 'subcutaneous fat', fieldT: 1.5, t1Ms: 288, t2Ms: 165, protonDensity: 0.95, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: 'fat T2 is sequence dependent (58-165)' },
  { tissue: 'subcutaneous fat', fieldT: 3, t1Ms: 371, t2Ms: 133, protonDensity: 0.95, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: 'fat T2 is sequence dependent (41-154)' },
  { tissue: 'bone marrow (vertebral)', fieldT: 1.5, t1Ms: 549, t2Ms: 49, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'bone marrow (vertebral)', fieldT: 3, t1Ms: 586, t2Ms: 49, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'articular cartilage', fieldT: 1.5, t1Ms: 1060, t2Ms: 42.1, protonDensity: 0.6, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: '' },
  { tissue: 'articular cartilage', fieldT: 3, t1Ms: 1240, t2Ms: 36.9, protonDensity: 0.6, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'read in secondary page', note: '' },
  { tissue: 'synovial fluid', fieldT: 1.5, t1Ms: 2850, t2Ms: 1210, protonDensity: 1, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'from memory', note: '' },
  { tissue: 'synovial fluid', fieldT: 3, t1Ms: 3620, t2Ms: 767, protonDensity: 1, source: 'Gold GE et al. AJR 2004;183:343-351 (in vivo, n=5)', provenance: 'from memory', note: '' },
  { tissue: 'spinal cord (white matter)', fieldT: 1.5, t1Ms: 745, t2Ms: 74, protonDensity: 0.7, source: 'Stanisz GJ et al. Magn Reson Med 2005;54:507-512, Table 1 (in vitro, 37 C, mixed species)', provenance: 'read in secondary page', note: 'rat, in vitro' },
  { tissue: 'spinal cord (white matter)', fieldT: 3, t1Ms: 750, t2Ms: 66, protonDensity: 0.7, source: 'Smith SA, van Zijl PCM. ISMRM 2007 (in vivo cervical cord)', provenance: 'read in secondary page', note: '' },
  { tissue: 'prostate', fieldT: 1.5, t1Ms: 1317, t2Ms: 88, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in secondary page', note: '' },
  { tissue: 'prostate', fieldT: 3, t1Ms: 1597, t2Ms: 74, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'myometrium', fieldT: 1.5, t1Ms: 1309, t2Ms: 117, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'from memory', note: 'SDs from memory' },
  { tissue: 'myometrium', fieldT: 3, t1Ms: 1514, t2Ms: 79, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'cervix', fieldT: 1.5, t1Ms: 1135, t2Ms: 58, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'from memory', note: 'SDs from memory' },
  { tissue: 'cervix', fieldT: 3, t1Ms: 1616, t2Ms: 83, protonDensity: 0.85, source: 'de Bazelaire CMJ et al. Radiology 2004;230:652-659 (in vivo, n=6)', provenance: 'read in source', note: '' },
  { tissue: 'breast fibroglandular', fieldT: 1.5, t1Ms: 1266, t2Ms: 57.5, protonDensity: 0.8, source: 'Rakow-Penner R et al. J Magn Reson Imaging 2006;23:87-91 (in vivo breast)', provenance: 'read in secondary page', note: '' },
  { tissue: 'breast fibroglandular', fieldT: 3, t1Ms: 1445, t2Ms: 54.4, protonDensity: 0.8, source: 'Rakow-Penner R et al. J Magn Reson Imaging 2006;23:87-91 (in vivo breast)', provenance: 'read in secondary page', note: '' },
  { tissue: 'myocardium', fieldT: 0.55, t1Ms: 701, t2Ms: 58, protonDensity: 0.85, source: 'Campbell-Washburn AE et al. Radiology 2019;293:384-393 (in vivo 0.55 T)', provenance: 'read in secondary page', note: '' },
  { tissue: 'myocardium', fieldT: 1.5, t1Ms: 995.8, t2Ms: 55.8, protonDensity: 0.85, source: 'Granitz M et al. Wien Klin Wochenschr 2019;131:143-155 (in vivo MOLLI T1 / GraSE T2, n=60)', provenance: 'read in source', note: '' },
  { tissue: 'myocardium', fieldT: 3, t1Ms: 1183.8, t2Ms: 51.6, protonDensity: 0.85, source: 'Granitz M et al. Wien Klin Wochenschr 2019;131:143-155 (in vivo MOLLI T1 / GraSE T2, n=60)', provenance: 'read in source', note: '' },
  { tissue: 'intervertebral disc (nucleus)', fieldT: 1.5, t1Ms: 1100, t2Ms: 108, protonDensity: 0.85, source: 'composite: T1 placeholder; T2 Marinelli 2010', provenance: 'from memory', note: 'T1 very low confidence' },
];
