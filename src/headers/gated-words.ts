import type { Attributes } from './attribute-table.js';

const gating = ['REALTIME', 'PROSPECTIVE', 'RETROSPECTIVE', 'PACED'];

/** By which attribute a header says that heartbeats start the shots; null where it does not. */
export function gatedWords(a: Attributes): string | null {
  const technique = a.CardiacSynchronizationTechnique?.[0];
  if (technique !== undefined && gating.includes(technique)) return `CardiacSynchronizationTechnique ${technique}`;
  const option = a.ScanOptions?.find((word) => word === 'CG' || word === 'PPG');
  return option === undefined ? null : `ScanOptions ${option}`;
}
