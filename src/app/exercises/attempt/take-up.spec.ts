import {type LogEntry} from '#sim-core/index';
import {joinLogs} from './take-up';

const set = (n: number, kp = 0.2): LogEntry => ({n, tick: 10 * n, kind: 'set', set: {kp}});
const log = (entries: LogEntry[], throughTick = 0) => ({entries, throughTick});

describe('joinLogs', () => {
  it('adds to the server’s log what only this device has', () => {
    const joined = joinLogs({server: log([set(1)]), here: log([set(1), set(2)])});

    expect(joined?.entries).toEqual([set(1), set(2)]);
  });

  it('takes what only the server has', () => {
    const joined = joinLogs({server: log([set(1), set(2)]), here: log([set(1)])});

    expect(joined?.entries).toEqual([set(1), set(2)]);
  });

  it('joins by number: this device may have only the later part', () => {
    const joined = joinLogs({server: log([set(1), set(2)]), here: log([set(2), set(3)])});

    expect(joined?.entries).toEqual([set(1), set(2), set(3)]);
  });

  it('refuses the same number with another content', () => {
    expect(joinLogs({server: log([set(1, 0.3)]), here: log([set(1, 0.2)])})).toBeNull();
  });

  it('refuses a gap', () => {
    expect(joinLogs({server: log([set(1)]), here: log([set(3)])})).toBeNull();
  });

  it('does not mind the order of keys', () => {
    const server: LogEntry = {kind: 'set', tick: 10, n: 1, set: {tiS: 1, kp: 0.2}};
    const here: LogEntry = {n: 1, tick: 10, kind: 'set', set: {kp: 0.2, tiS: 1}};

    expect(joinLogs({server: log([server]), here: log([here])})).not.toBeNull();
  });

  it('goes on at the last tick that either side knows of', () => {
    expect(joinLogs({server: log([], 70), here: log([], 90)})?.throughTick).toBe(90);
    expect(joinLogs({server: log([], 70), here: log([set(9)].slice(1), 5)})?.throughTick).toBe(70);
    expect(joinLogs({server: log([set(1)], 0), here: log([], 5)})?.throughTick).toBe(10);
  });
});
