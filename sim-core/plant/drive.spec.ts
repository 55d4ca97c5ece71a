import {type BrakeParams} from '../scenario/scenario';
import {Drive} from './drive';

const BRAKE: BrakeParams = {maxTorqueNm: 90, lagS: 0, capacityJPerK: 1, conductanceWPerK: 1};

function aDrive(parts: Partial<BrakeParams>): Drive {
  const brake = {...BRAKE, ...parts};
  const drive = new Drive(
    new Float64Array(Drive.size(brake.deadTimeS ?? 0, 0.001, 10)),
    brake,
    0.001,
    10,
  );
  drive.reset(20, brake);
  return drive;
}

/** Command of the late part of each tick for these outputs. */
function follow(drive: Drive, outputs: readonly number[]): number[] {
  return outputs.map((output, tick) => {
    drive.command(tick, output);
    return drive.late(tick);
  });
}

describe('Drive', () => {
  it('passes the output on when it has nothing to add', () => {
    expect(follow(aDrive({}), [20, 50, 10])).toEqual([20, 50, 10]);
  });

  it('follows within its play', () => {
    expect(follow(aDrive({playPct: 4}), [20, 21, 25, 24, 22, 20])).toEqual([
      20, 20, 23, 23, 23, 22,
    ]);
  });

  it('sticks until the output has moved far enough, then jumps', () => {
    expect(follow(aDrive({stickPct: 3}), [20, 22, 23, 23.5, 21, 20])).toEqual([
      20, 20, 20, 23.5, 23.5, 20,
    ]);
  });

  it('loses its share of the supply', () => {
    const drive = aDrive({});
    drive.supply = 0.5;

    expect(follow(drive, [40])).toEqual([20]);
  });

  it('delays by whole plant steps, before t = 0 with the standstill output', () => {
    const drive = aDrive({deadTimeS: 0.0234}); // 23 steps: two ticks and three steps
    const late = follow(drive, [50, 60, 70, 80]);

    expect(drive.changesAtStep).toBe(3);
    expect(late).toEqual([20, 20, 50, 60]);
    expect(drive.early(3)).toBe(50);
  });
});
