import {type LogEntry} from '../run/log';
import {PHASES} from '../run/trace';
import {aScenario} from '../test-support/a-scenario';
import {aTrace} from '../test-support/a-trace';
import {type CommandRef, type Window} from './criteria';
import {commandsOf, type GivenCommand, type RunFacts, spanOf} from './windows';

type CommandWindow = Window & {readonly kind: 'commands'};

const lastStop: CommandRef = {command: 'stop', nth: -1, fromSpeedMps: 1.95};
const afterStop: CommandWindow = {kind: 'commands', from: lastStop, forS: 7, atLeastS: 7};
const restart: CommandWindow = {
  kind: 'commands',
  from: lastStop,
  then: {command: 'run', withinS: [12, 20]},
  forS: 11,
  atLeastS: 8,
};

/** Sixty seconds; each run takes 8 s to 2 m/s, each stop from there 4 s. */
function facts(commands: readonly GivenCommand[], rest: Partial<RunFacts> = {}): RunFacts {
  const speedAt = (row: number): number => {
    const last = commands.findLast(({tick}) => tick < row);
    if (last === undefined) return 0;
    const sinceS = (row - last.tick) / 100;
    return last.command === 'run' ? Math.min(2, sinceS / 4) : Math.max(0, 2 - sinceS / 2);
  };
  const rows = aTrace(6000, {lineMps: speedAt});
  return {rows, commands, sampleS: 0.01, endedEarly: false, ...rest};
}

const run = (tick: number): GivenCommand => ({tick, command: 'run'});
const stop = (tick: number): GivenCommand => ({tick, command: 'stop'});

function ticks(window: Window, given: RunFacts): readonly [number, number] | null {
  const span = spanOf(window, given);
  return span === null ? null : [span.from, span.to];
}

describe('spanOf', () => {
  it('begins at the last stop from job speed and lasts as long as asked', () => {
    const given = facts([run(0), stop(1000), run(2500), stop(4000)]);

    expect(ticks(afterStop, given)).toEqual([4000, 4700]);
    expect(ticks({...afterStop, from: {...lastStop, nth: 0}}, given)).toEqual([1000, 1700]);
    expect(ticks({...afterStop, from: {...lastStop, nth: 2}}, given)).toBeNull();
  });

  it('ends with the next command of any kind', () => {
    const open: CommandWindow = {kind: 'commands', from: {command: 'run', nth: 0}};

    expect(ticks(open, facts([run(0), stop(1000)]))).toEqual([0, 1000]);
    expect(ticks(open, facts([run(0), run(500)]))).toEqual([0, 500]);
    expect(ticks(open, facts([run(0)]))).toEqual([0, 6000]);
  });

  it('passes over a stop from a lower speed', () => {
    expect(ticks(afterStop, facts([run(0), stop(400)]))).toBeNull();
    // the second stop is given at 1 m/s: the first is the one that counts
    expect(ticks(afterStop, facts([run(0), stop(1000), run(2500), stop(2900)]))).toEqual([
      1000, 1700,
    ]);
  });

  it('counts a stop that was broken off as not done', () => {
    expect(ticks(afterStop, facts([run(0), stop(1000), run(1699)]))).toBeNull();
    expect(ticks(afterStop, facts([run(0), stop(1000), run(1700)]))).toEqual([1000, 1700]);
  });

  const restarts: readonly (readonly [why: string, at: number, found: boolean])[] = [
    ['11.99 s after the stop: too soon', 2199, false],
    ['12 s after it', 2200, true],
    ['20 s after it', 3000, true],
    ['20.01 s after it: too late', 3001, false],
  ];
  for (const [why, at, found] of restarts)
    it(`${found ? 'takes' : 'does not take'} a restart ${why}`, () => {
      const given = facts([run(0), stop(1000), run(at)]);

      expect(ticks(restart, given)).toEqual(found ? [at, at + 1100] : null);
    });

  it('takes the first restart after the stop, not a better one', () => {
    const given = facts([run(0), stop(1000), run(1900), stop(2000), run(2500)]);

    expect(ticks(restart, given)).toBeNull();
  });

  it('wants the restart run up', () => {
    expect(ticks(restart, facts([run(0), stop(1000), run(2500), stop(3299)]))).toBeNull();
    expect(ticks(restart, facts([run(0), stop(1000), run(2500)]))).toEqual([2500, 3600]);
  });

  it('knows no restart without one, and nothing in an empty run', () => {
    expect(ticks(restart, facts([run(0), stop(1000)]))).toBeNull();
    expect(ticks(restart, facts([]))).toBeNull();
  });

  it('does not see a command that has not acted yet', () => {
    const rows = aTrace(1000, {lineMps: () => 2});

    expect(ticks(afterStop, facts([stop(1000)], {rows}))).toBeNull();
  });

  it('finds the phases by their count', () => {
    const phases = ['standstill', 'running', 'stopping', 'standstill', 'running'] as const;
    const rows = aTrace(500, {phase: (row) => PHASES.indexOf(phases[Math.floor(row / 100)]!)});
    const given = facts([], {rows});

    expect(ticks({kind: 'phase', phase: 'running', nth: 0}, given)).toEqual([100, 200]);
    expect(ticks({kind: 'phase', phase: 'running', nth: 1}, given)).toEqual([400, 500]);
    expect(ticks({kind: 'phase', phase: 'running', nth: 2}, given)).toBeNull();
    expect(ticks({kind: 'phase', phase: 'manual', nth: 0}, given)).toBeNull();
  });

  it('tells a window that the end of the run cut', () => {
    const cut = (window: Window, endedEarly: boolean): boolean | undefined =>
      spanOf(
        window,
        facts([run(0), stop(1000)], {
          rows: aTrace(1300, {lineMps: () => 2, phase: () => PHASES.indexOf('running')}),
          endedEarly,
        }),
      )?.isCut;

    expect(cut({kind: 'times', fromS: 5, toS: 13}, true)).toBeFalse();
    expect(cut({kind: 'times', fromS: 5, toS: 14}, true)).toBeTrue();
    expect(cut({kind: 'times', fromS: 5, toS: 14}, false)).toBeFalse();
    expect(cut({kind: 'phase', phase: 'running', nth: 0}, true)).toBeTrue();
    expect(cut(afterStop, true)).toBeTrue();
    expect(cut(afterStop, false)).toBeUndefined(); // too short: not done
    expect(cut({kind: 'commands', from: {command: 'run', nth: 0}}, true)).toBeFalse();
  });
});

describe('commandsOf', () => {
  it('puts the programme of a tick before the log, each at the tick the engine acts in', () => {
    // 0.07/0.01 is a little more than 7 in floating point; the engine acts in tick 7
    const scenario = aScenario({
      line: [
        {atS: 12, command: 'stop', rampS: 2},
        {atS: 0.07, command: 'run', speedMps: 2, rampS: 5},
      ],
    });
    const log: LogEntry[] = [
      {n: 1, tick: 1200, kind: 'line', line: {command: 'fastStop', rampS: 1}},
      {n: 2, tick: 1300, kind: 'set', set: {kp: 0.2}},
      {n: 3, tick: 1900, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 5}},
    ];

    expect(commandsOf(scenario, log, 0.01)).toEqual([
      {tick: 7, command: 'run'},
      {tick: 1200, command: 'stop'},
      {tick: 1200, command: 'fastStop'},
      {tick: 1900, command: 'run'},
    ]);
  });
});
