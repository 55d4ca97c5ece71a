import {type ApiFailure} from '../../platform/api-failure';
import {aFailure} from '../test-support/attempt-server';
import {aWhile} from '../test-support/kept-here';
import {Beat} from './beat';

describe('Beat', () => {
  let posted: number[];
  let refusal: ApiFailure | null;
  let isRunning: boolean;
  let changed: ApiFailure[];
  let beat: Beat;

  beforeEach(() => {
    jasmine.clock().install();
    posted = [];
    refusal = null;
    isRunning = true;
    changed = [];
    beat = new Beat({
      post: (tick) => {
        posted.push(tick);
        return refusal === null ? Promise.resolve({nextBeatS: 3}) : Promise.reject(refusal);
      },
      tick: () => 42,
      isRunning: () => isRunning,
      writerChanged: (failure) => changed.push(failure),
    });
  });

  afterEach(() => {
    beat.close();
    jasmine.clock().uninstall();
  });

  it('beats again when the server wishes', async () => {
    await beat.now();
    jasmine.clock().tick(2999);
    expect(posted).toEqual([42]);

    jasmine.clock().tick(1);
    expect(posted).toEqual([42, 42]);
    await aWhile();
  });

  it('is silent while time stands', async () => {
    await beat.now();
    isRunning = false;
    jasmine.clock().tick(60_000);
    expect(posted.length).toBe(1);

    isRunning = true;
    jasmine.clock().tick(3000);
    expect(posted.length).toBe(2);
    await aWhile();
  });

  it('goes on every ten seconds when a beat is lost', async () => {
    refusal = aFailure('unavailable');
    await beat.now();

    jasmine.clock().tick(10_000);

    expect(posted.length).toBe(2);
    expect(changed).toEqual([]);
    await aWhile();
  });

  it('tells that another device writes, and ends', async () => {
    refusal = aFailure('writer-changed');
    await beat.now();

    jasmine.clock().tick(60_000);

    expect(changed).toEqual([refusal]);
    expect(posted.length).toBe(1);
  });
});
