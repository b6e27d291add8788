import { rangeChart } from '../session/chart.js';
import type { State } from '../session/state.js';
import { chartPane } from './chart-pane.js';
import { fill, type Line, line } from './line.js';
import type { Look } from './look.js';

/** One parameter through its range: two figures, their limits, a cursor that reads both axes. */
export function chartScreen(state: State, look: Look, columns: number, rows: number): Line[] {
  const chart = rangeChart(state);
  if (chart === null) return fill([line('This parameter has no range of numbers here')], rows);
  return fill(chartPane(chart, look, columns, Math.min(rows, 34)), rows);
}
