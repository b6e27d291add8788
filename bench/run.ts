import { keepsBudget, type Row } from './row.js';

function figure(value: number): string {
  return value >= 100 ? value.toFixed(0) : value >= 10 ? value.toFixed(1) : value.toFixed(2);
}

/**
 * `npm run bench`: every row, ratios in one run with the absolute times beside them; the exit code.
 * `npm run bench -- --check` ends with 1 when a budget is missed; words or phrases pick the rows whose name holds one of them.
 */
export async function runRows(rows: readonly Row[], asked: readonly string[]): Promise<number> {
  const words = asked.filter((word) => !word.startsWith('--'));
  let missed = 0;
  for (const row of rows) {
    if (words.length > 0 && !words.some((word) => row.name.includes(word))) continue;
    const measured = await row.measure();
    const kept = keepsBudget(row, measured);
    if (!kept) missed += 1;
    const ratio = measured.yardstick === null ? '' : `${figure(measured.ratio)} x`;
    const budget = row.budget === null ? 'no budget' : `${kept ? 'within' : 'MISSED,'} ${row.budget}`;
    const yardstick = measured.yardstick === null ? '' : ` against ${figure(measured.yardstick)} ${row.unit}, ${row.against}`;
    console.log(`${ratio.padStart(9)}  ${budget.padEnd(12)}  ${row.name}: ${figure(measured.subject)} ${row.unit}${yardstick}`);
  }
  if (missed > 0) console.log(`${missed} ${missed === 1 ? 'budget' : 'budgets'} missed`);
  return asked.includes('--check') && missed > 0 ? 1 : 0;
}
