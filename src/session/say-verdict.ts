import type { LimitKind, Verdict } from '../calc/verdict.js';
import { sayTime } from './say-time.js';

/**
 * A verdict in words: nobody subtracts.
 *
 * @example sayVerdict({ word: 'OVER', kind: 'hold', value: 17, limit: 11, spare: -6 }) //=> 'OVER by 6.0 s'
 */
export function sayVerdict(verdict: Verdict): string {
  const amount = sayAmount(verdict.kind, Math.abs(verdict.spare));
  return verdict.word === 'OVER' ? `OVER by ${amount}` : `${verdict.word}, ${amount} to spare`;
}

/** Times in the trade's digits; RF in two digits of its own unit (uT or W/kg, which the limit names). Never a bare zero. */
function sayAmount(kind: LimitKind, amount: number): string {
  if (kind === 'rf') return amount > 0 && amount < 0.005 ? 'less than 0.01' : amount.toFixed(2);
  return amount > 0 && amount < 0.05 ? 'less than 0.1 s' : sayTime(amount);
}
