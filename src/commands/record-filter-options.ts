import type { OptionRow } from './command-row.js';

/** Options that choose records. */
export const filterOptions: readonly OptionRow[] = [
  { name: 'from', value: 'DAY', help: 'first day, YYYY-MM-DD' },
  { name: 'to', value: 'DAY', help: 'last day, YYYY-MM-DD' },
  { name: 'preset', value: 'ID', help: 'sessions of this preset' },
  { name: 'region', value: 'REGION', help: 'sessions of this body region' },
  { name: 'role', value: 'ROLE', help: 'sessions recorded by this role' },
  { name: 'reason', value: 'REASON', help: 'sessions that give this reason ("breath-hold short")' },
];
