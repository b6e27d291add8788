import type { Series, TissueOverride } from './series.js';
import { type TissueRow, tissueRows } from './tissue-table.js';

/** Relaxation of one tissue at one field: times in ms, proton density relative to CSF. */
export interface Tissue {
  readonly tissue: string;
  readonly t1Ms: number;
  readonly t2Ms: number;
  readonly t2StarMs: number;
  readonly protonDensity: number;
  /** True when a value lies outside the measured fields or comes from a single row. */
  readonly extrapolated: boolean;
}

/** Names of the tissue table, in table order, each once. */
export const tissueNames: readonly string[] = [...new Set(tissueRows.map((row) => row.tissue))];

const cord = 'spinal cord (white matter)';
const fat = 'subcutaneous fat';

/** True for the one tissue whose signal fat suppression acts on; marrow is treated as water. */
export function isFat(tissue: string): boolean {
  return tissue === fat;
}

/** Name of the fat row. */
export const fatTissue = fat;
/** Name of the fluid row. */
export const fluidTissue = 'CSF';

/** Growth of T1 with field where only one row exists: T1 ~ B0^0.33 (assumption, common practice, no source). */
const singleRowSlope = 0.33;
/** Slope of log T1 over log B0 is held within these beyond the measured fields (assumption, no source). */
const slopeRange = { low: 0, high: 0.5 } as const;
/** Cord T1 follows white matter: 750 ms at 3 T over 838 ms of white matter there (an assumption: its two rows disagree). */
const cordOverWhiteMatter = 750 / 838;

/** R2* over R2 per tesla, 1/s/T: 1.5 in brain and cord, 5 elsewhere (common practice, no source). */
function dephasingPerSPerT(tissue: string): number {
  return brainAndCord.has(tissue) ? 1.5 : 5;
}
const brainAndCord = new Set(['white matter', 'grey matter (cortical)', fluidTissue, cord]);

const rowsByTissue = new Map<string, readonly TissueRow[]>(
  tissueNames.map((name) => [name, tissueRows.filter((row) => row.tissue === name).sort((a, b) => a.fieldT - b.fieldT)]),
);

/** Straight line through two points, evaluated at x. */
function onLine(x: number, x0: number, y0: number, x1: number, y1: number): number {
  return y0 + ((x - x0) / (x1 - x0)) * (y1 - y0);
}

/** The two rows around a field, or the two nearest the end beyond which it lies. */
function neighbours(rows: readonly TissueRow[], fieldT: number): readonly [TissueRow, TissueRow] {
  let upper = 1;
  while (upper < rows.length - 1 && fieldT > (rows[upper] as TissueRow).fieldT) upper += 1;
  return [rows[upper - 1] as TissueRow, rows[upper] as TissueRow];
}

/** T1 in ms: straight in log T1 over log B0; beyond the ends the slope is held within 0 to 0.5. */
function t1At(rows: readonly TissueRow[], fieldT: number): number {
  const first = rows[0] as TissueRow;
  if (rows.length === 1) return first.t1Ms * (fieldT / first.fieldT) ** singleRowSlope;
  const [a, b] = neighbours(rows, fieldT);
  const slope = Math.log(b.t1Ms / a.t1Ms) / Math.log(b.fieldT / a.fieldT);
  if (fieldT >= a.fieldT && fieldT <= b.fieldT) return a.t1Ms * (fieldT / a.fieldT) ** slope;
  const held = Math.min(slopeRange.high, Math.max(slopeRange.low, slope));
  const end = fieldT < a.fieldT ? a : b;
  return end.t1Ms * (fieldT / end.fieldT) ** held;
}

/** T2 in ms: R2 straight over B0, held beyond the ends. */
function t2At(rows: readonly TissueRow[], fieldT: number): number {
  const first = rows[0] as TissueRow;
  const last = rows[rows.length - 1] as TissueRow;
  if (fieldT <= first.fieldT) return first.t2Ms;
  if (fieldT >= last.fieldT) return last.t2Ms;
  const [a, b] = neighbours(rows, fieldT);
  return 1 / onLine(fieldT, a.fieldT, 1 / a.t2Ms, b.fieldT, 1 / b.t2Ms);
}

/** T2* in ms: measured rows where they reach (R2* straight over B0), else 1/T2 + k B0. */
function t2StarAt(name: string, rows: readonly TissueRow[], fieldT: number, t2Ms: number): number {
  const measured = rows.filter((row) => row.t2StarMs !== undefined);
  const first = measured[0];
  const last = measured[measured.length - 1];
  if (first !== undefined && last !== undefined && fieldT >= first.fieldT && fieldT <= last.fieldT) {
    if (first === last) return first.t2StarMs as number;
    const [a, b] = neighbours(measured, fieldT);
    return 1 / onLine(fieldT, a.fieldT, 1 / (a.t2StarMs as number), b.fieldT, 1 / (b.t2StarMs as number));
  }
  return 1 / (1 / t2Ms + (dephasingPerSPerT(name) * fieldT) / 1000);
}

/** The table's value at a field, before contrast agent and overrides; null for an unknown name. Values are kept once computed. */
export function tableTissue(name: string, fieldT: number): Tissue | null {
  let atField = kept.get(fieldT);
  if (atField === undefined) {
    if (kept.size > 200) kept.clear();
    atField = new Map();
    kept.set(fieldT, atField);
  }
  const known = atField.get(name);
  if (known !== undefined) return known;
  const rows = rowsByTissue.get(name);
  if (rows === undefined) return null;
  const t2Ms = t2At(rows, fieldT);
  const first = rows[0] as TissueRow;
  const last = rows[rows.length - 1] as TissueRow;
  const tissue: Tissue = {
    tissue: name,
    t1Ms: name === cord ? cordOverWhiteMatter * (tableTissue('white matter', fieldT) as Tissue).t1Ms : t1At(rows, fieldT),
    t2Ms,
    t2StarMs: t2StarAt(name, rows, fieldT, t2Ms),
    protonDensity: first.protonDensity,
    extrapolated: fieldT < first.fieldT - 1e-9 || fieldT > last.fieldT + 1e-9,
  };
  atField.set(name, tissue);
  return tissue;
}
const kept = new Map<number, Map<string, Tissue>>();

/** Concentration of contrast agent in mmol/L some minutes after injection (assumption, common practice, no source). */
const agentMmolPerL: Readonly<Record<string, number>> = {
  'blood (arterial, oxygenated)': 2,
  spleen: 1,
  'kidney cortex': 1,
  'kidney medulla': 1,
  'kidney (whole)': 1,
  liver: 0.5,
};

/** Relaxivity r1 in L/mmol/s: 4.5 at 1.5 T, 4.0 at 3 T, straight between, held beyond (value from memory). */
function relaxivity(fieldT: number): number {
  return Math.min(4.5, Math.max(4.0, onLine(fieldT, 1.5, 4.5, 3, 4.0)));
}

/**
 * The tissue a series sees at a field: table, contrast agent (1/T1 + r1 C), then the series' own overrides, which win.
 * Null for an unknown name.
 */
export function tissueOf(name: string, fieldT: number, series: Pick<Series, 'contrastAgent' | 'tissueOverrides'>): Tissue | null {
  const table = tableTissue(name, fieldT);
  if (table === null) return null;
  const concentration = series.contrastAgent ? (agentMmolPerL[name] ?? 0) : 0;
  const override: TissueOverride | undefined = Object.hasOwn(series.tissueOverrides, name) ? series.tissueOverrides[name] : undefined;
  if (concentration === 0 && override === undefined) return table;
  const t1Ms = concentration === 0 ? table.t1Ms : 1 / (1 / table.t1Ms + (relaxivity(fieldT) * concentration) / 1000);
  const t2Ms = override?.t2Ms ?? table.t2Ms;
  const rows = rowsByTissue.get(name) as readonly TissueRow[];
  return {
    tissue: name,
    t1Ms: override?.t1Ms ?? t1Ms,
    t2Ms,
    t2StarMs: override?.t2StarMs ?? (override?.t2Ms === undefined ? table.t2StarMs : Math.min(t2Ms, t2StarAt(name, rows, fieldT, t2Ms))),
    protonDensity: override?.protonDensity ?? table.protonDensity,
    extrapolated: table.extrapolated,
  };
}

/** Apparent diffusion in um2/ms, numerically 1e-3 mm2/s (common practice, values from memory); null where no value is kept. */
const diffusionUm2PerMs: Readonly<Record<string, number>> = {
  'grey matter (cortical)': 0.8,
  'white matter': 0.7,
  CSF: 3.0,
  'spinal cord (white matter)': 0.9,
  liver: 1.1,
  spleen: 0.8,
  'kidney cortex': 1.9,
  'kidney medulla': 1.9,
  'kidney (whole)': 1.9,
  pancreas: 1.3,
  prostate: 1.5,
  'skeletal muscle': 1.5,
  'breast fibroglandular': 1.8,
  cervix: 1.4,
  myometrium: 1.4,
  'bone marrow (vertebral)': 0.4,
  'subcutaneous fat': 0.05,
  'intervertebral disc (nucleus)': 1.7,
  'articular cartilage': 1.3,
};

/** `e^(-bD)` of a tissue at b in s/mm2 (Mansfield 1977 for echo-planar; Stejskal-Tanner weighting); null where no D is kept. */
export function diffusionFactor(tissue: string, bSPerMm2: number): number | null {
  return decayOf(diffusionUm2PerMs[tissue], bSPerMm2);
}

function decayOf(d: number | undefined, bSPerMm2: number): number | null {
  if (bSPerMm2 === 0) return 1;
  return d === undefined ? null : Math.exp(-bSPerMm2 * d * 1e-3);
}

/**
 * Looks a tissue up for one role in an evaluation (target, comparison, tissue to be nulled), remembering the last one: the edits of a
 * series ask for the same again and again.
 */
export class TissueRole {
  #name = '';
  #fieldT = Number.NaN;
  #contrastAgent = false;
  #overrides: Series['tissueOverrides'] | null = null;
  #tissue: Tissue | null = null;
  #diffusion: number | undefined;
  #isFat = false;

  /** The same as `tissueOf`. */
  tissueOf(name: string, fieldT: number, series: Pick<Series, 'contrastAgent' | 'tissueOverrides'>): Tissue | null {
    if (
      name !== this.#name ||
      fieldT !== this.#fieldT ||
      series.contrastAgent !== this.#contrastAgent ||
      series.tissueOverrides !== this.#overrides
    ) {
      this.#name = name;
      this.#fieldT = fieldT;
      this.#contrastAgent = series.contrastAgent;
      this.#overrides = series.tissueOverrides;
      this.#tissue = tissueOf(name, fieldT, series);
      this.#diffusion = diffusionUm2PerMs[name];
      this.#isFat = isFat(name);
    }
    return this.#tissue;
  }

  /** True when the tissue looked up last is fat. */
  get isFat(): boolean {
    return this.#isFat;
  }

  /** The same as `diffusionFactor`, of the tissue looked up last. */
  diffusionFactor(bSPerMm2: number): number | null {
    return decayOf(this.#diffusion, bSPerMm2);
  }
}

/** Names with a value at this field: every tissue measured at it or between its measured fields. */
export function tissuesWithValueAt(fieldT: number): readonly string[] {
  return tissueNames.filter((name) => !(tableTissue(name, fieldT) as Tissue).extrapolated);
}
