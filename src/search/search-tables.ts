import { modelOf } from '../calc/model.js';
import { resolveParameters } from '../calc/resolve.js';
import { type Groups, groupsOf } from './groups.js';
import { Join } from './join.js';
import { LineTable } from './line-states.js';
import type { SearchSetting } from './setting.js';
import { ShortestTiming } from './shortest-timing.js';
import { SignalTable } from './signal-states.js';

/** Tables that all parts of a search share. */
export interface SearchTables {
  readonly setting: SearchSetting;
  readonly groups: Groups;
  readonly lines: LineTable;
  readonly signals: SignalTable;
  readonly join: Join;
  readonly shortest: ShortestTiming;
}

/** Forms the tables of a setting. */
export function tablesOf(setting: SearchSetting): SearchTables {
  const { problem, baseline } = setting;
  const groups = groupsOf(setting);
  const { parameters } = resolveParameters(baseline, problem.set, problem.scanner);
  // What the class cannot use has no effect: the model says what is left.
  const start = modelOf({ ...problem.series, parameters }, problem.scanner, baseline.model.slotFactor).series.parameters;
  return {
    setting,
    groups,
    lines: new LineTable(setting, groups, start),
    signals: new SignalTable(setting, groups),
    join: new Join(setting),
    shortest: new ShortestTiming(setting),
  };
}
