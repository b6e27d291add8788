import { describe, expect, it } from 'vitest';
import { recordOfSession } from '../../src/session/record-of-session.js';
import { modelOfPreset, resultNow, sessionSeries } from '../../src/session/results.js';
import { sessionCautions } from '../../src/session/session-cautions.js';
import type { State } from '../../src/session/state.js';
import { seriesHeadline } from '../../src/session/verdicts.js';
import { recordLine } from '../../src/study/record-line.js';
import { readRecordLine } from '../../src/study/record-line-reader.js';
import { press, sessionOn } from './invented-state.js';

/** Types a value into a row of the patient's screen or of the readings. */
function typed(state: State, screen: 'patient' | 'readings', field: string, value: string): State {
  const there = press(state, screen === 'patient' ? 'p' : 'd');
  const on = { ...there, place: { ...there.place, fields: { ...there.place.fields, [screen]: field } } };
  return press(on, value, 'enter', 'escape');
}

const series = press(sessionOn('liver-3t'), 'enter');
const id = series.place.seriesId;

describe('a reading', () => {
  it('keeps the coil, the field and the body it was read with', () => {
    const state = typed(typed(series, 'patient', 'leftRightMm', '380'), 'readings', 'before timeS', '20');
    expect(sessionSeries(state, id).before).toEqual({
      timeS: 20,
      conditions: { coil: null, fieldT: 3, frontBackMm: null, leftRightMm: 380 },
    });
  });

  it('goes with its last number', () => {
    const state = typed(series, 'readings', 'before timeS', '20');
    const there = press(state, 'd');
    const gone = press({ ...there, place: { ...there.place, fields: { readings: 'before timeS' } } }, 'backspace');
    expect(sessionSeries(gone, id).before).toBeNull();
  });

  it('of SAR no longer holds for other extents: it is said and judges nothing; time still scales', () => {
    const capped = typed(typed(series, 'patient', 'leftRightMm', '380'), 'patient', 'sarCapWkg', '1.2');
    const read = typed(typed(capped, 'readings', 'before timeS', '20'), 'readings', 'before sarWkg', '1');
    expect(seriesHeadline(read, id).text).toContain('SAR 1.00 W/kg');
    const wider = typed(read, 'patient', 'leftRightMm', '420');
    expect(seriesHeadline(wider, id).text).toMatch(/^NOT JUDGED: SAR cap/);
    const said = sessionCautions(wider, id).filter(({ code }) => code === 'reading-no-longer-holds');
    expect(said.map(({ text }) => text)).toEqual([
      'SAR 1 W/kg was read with other body extents typed: it no longer holds, nothing is scaled from it; read it again',
    ]);
    expect(resultNow(wider, id).evaluation.fromReading).toContain('scanTimeS');
    expect(seriesHeadline(press(wider, 'u'), id).text).toContain('SAR 1.00 W/kg');
    // Another number typed now makes it no newer.
    expect(seriesHeadline(typed(wider, 'readings', 'before timeS', '21'), id).text).toMatch(/^NOT JUDGED: SAR cap/);
    // Read again it holds again.
    expect(seriesHeadline(typed(wider, 'readings', 'before sarWkg', '1.1'), id).text).toContain('SAR 1.10 W/kg');
  });

  it('an extent typed for the first time ends nothing', () => {
    const state = typed(typed(series, 'readings', 'before sarWkg', '1'), 'patient', 'leftRightMm', '420');
    expect(sessionCautions(state, id).map(({ code }) => code)).not.toContain('reading-no-longer-holds');
  });
});

describe('the record of a series that was read', () => {
  it('keeps prediction, reading, ratio and conditions, and its class; its line reads back', () => {
    const model = modelOfPreset(series, id).evaluation.figures;
    const before = typed(
      typed(typed(series, 'readings', 'before timeS', '20'), 'readings', 'before b1rmsUt', '2'),
      'readings',
      'before sarWkg',
      '1',
    );
    const state = typed(typed(before, 'readings', 'after timeS', '21'), 'readings', 'after sarWkg', '1.5');
    const record = recordOfSession(press(state, 'o', 'd'));
    const recorded = record?.series.find((one) => one.id === id);
    expect(recorded?.class).toMatch(/^[a-z-]+\/[23]D$/);
    expect(recorded?.readings.after?.conditions).toEqual({ coil: null, fieldT: 3, frontBackMm: null, leftRightMm: null });
    const compared = recorded?.readings.compared;
    expect(compared?.before.timeS).toEqual({ predicted: model.scanTimeS, read: 20, ratio: 20 / (model.scanTimeS as number) });
    expect(compared?.before.b1rmsUt?.ratio).toBeCloseTo(2 / (model.b1PlusRmsUt as number), 12);
    expect(compared?.after.timeS?.predicted).toBeCloseTo(20, 9);
    expect(compared?.after.timeS?.ratio).toBeCloseTo(1.05, 9);
    expect(compared?.after.sarWkg?.ratio).toBeCloseTo(1.5, 9);
    const line = recordLine({ ...record!, id: 'x', day: null });
    expect(readRecordLine(line.trim())).toMatchObject({ ok: true, value: { series: [{ readings: { compared } }] } });
  });

  it('compares nothing where nothing was read', () => {
    expect(recordOfSession(press(series, 'o', 'd'))?.series[0]?.readings).toEqual({ before: null, after: null });
  });
});
