import {COLUMN, TRACE_COLUMNS} from '#sim-core/index';
import {TraceStore} from '../trace/trace-store';
import {marksOf} from './trend-marks';
import {phaseSpans} from './trend-scene';

describe('phaseSpans', () => {
  it('begins with the first row and ends each phase where the next begins', () => {
    const store = new TraceStore();
    const rows = new Float64Array(TRACE_COLUMNS.length);
    rows[COLUMN.phase] = 1;
    store.append({rows, count: 1});

    const spans = phaseSpans(
      [
        {kind: 'slackBegan', atTick: 50, atS: 0.5},
        {kind: 'phase', phase: 'running', atTick: 100, atS: 1},
        {kind: 'phase', phase: 'stopping', atTick: 300, atS: 3},
      ],
      store,
    );

    expect(spans).toEqual([
      {phase: 'starting', fromTick: 0, toTick: 100},
      {phase: 'running', fromTick: 100, toTick: 300},
      {phase: 'stopping', fromTick: 300, toTick: Infinity},
    ]);
  });
});

describe('marksOf', () => {
  it('puts acts and events in the order of time and marks alarms', () => {
    const marks = marksOf(
      [
        {n: 1, tick: 0, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 5}},
        {n: 2, tick: 400, kind: 'set', set: {kp: 0.2}},
        {n: 3, tick: 420, kind: 'pause'},
      ],
      [{kind: 'webBroke', atTick: 300, atS: 3, value: 612}],
      'si',
    );

    expect(marks.map(({tick, isAlarm}) => [tick, isAlarm])).toEqual([
      [0, false],
      [300, true],
      [400, false],
    ]);
    expect(marks[0]!.label).toBe('run 120 m/min');
    expect(marks[1]!.label).toBe('web broke at 612 N');
  });
});
