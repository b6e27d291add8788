import { describe, expect, it } from 'vitest';
import { auditRecords, shippedStudy } from '../../scripts/invented-records.js';
import { changeRequest } from '../../src/study/change-request.js';
import { RecordCounts } from '../../src/study/record-report.js';
import { suggestVariant } from '../../src/study/record-report-suggestion.js';

describe('changeRequest', () => {
  it('stays on one page with its lines to sign, however many must-keeps there are and however long their words', () => {
    const shipped = shippedStudy('liver-3t');
    const counts = new RecordCounts();
    for (const record of auditRecords(shipped)) counts.add(record);
    const preset = counts.report().presets[0]!;
    for (const [many, source] of [
      [0, ''],
      [3, 'short'],
      [30, 'a source with a very long title, '.repeat(12)],
    ] as const) {
      const mustKeep = Array.from({ length: many }, () => ({ figure: 'voxelSliceMm' as const, atMost: 5, source }));
      const study = { ...shipped, series: shipped.series.map((series) => ({ ...series, mustKeep })) };
      const suggested = suggestVariant(study, preset, preset.series[0]!, new Map());
      if (suggested.kind === 'none') throw new Error(suggested.why);
      const lines = changeRequest(study, preset, preset.series[0]!, suggested.suggestion).trimEnd().split('\n');
      expect(lines.length).toBeLessThanOrEqual(60);
      expect(lines.at(-1)).toContain('Decision, day, reason');
      expect(lines.join('\n')).toContain(
        many === 0 ? 'none named for this series' : many === 3 ? 'kept: voxel, slice 4 mm' : 'more, none crossed',
      );
    }
  });
});
