import {type Scenario} from '#sim-core/index';
import {type FrameSource} from '../frame-loop';
import {PlantHost} from '../plant/plant-host';
import {type PlantLink} from '../plant/plant-link';

/** A plant without a worker: the same host, asked directly. */
export function plantHere(): PlantLink {
  const host = new PlantHost();
  return {
    // a copy, as between page and worker
    ask: (message) => Promise.resolve(structuredClone(host.answer(structuredClone(message)))),
    close: () => undefined,
  };
}

/** Frames and a clock that a spec moves by hand. */
export class FramesByHand implements FrameSource {
  private nowMs = 0;
  private readonly callbacks = new Map<number, () => void>();
  private made = 0;

  now(): number {
    return this.nowMs;
  }

  request(callback: () => void): number {
    this.callbacks.set(++this.made, callback);
    return this.made;
  }

  cancel(handle: number): void {
    this.callbacks.delete(handle);
  }

  /** Lets time pass and shows one frame; waits until what it asked for is done. */
  async pass(ms: number): Promise<void> {
    this.nowMs += ms;
    const due = [...this.callbacks.values()];
    this.callbacks.clear();
    for (const callback of due) callback();
    await new Promise((resolve) => setTimeout(resolve));
  }
}

/** A small paper stand at its own equilibrium; breaks at 600 N. */
export function aStand(controller: Partial<Scenario['controller']> = {}): Scenario {
  return {
    format: 'evenspan.scenario/1',
    name: 'Stand of the specs',
    durationS: 600,
    seed: 7,
    initialTensionN: 150,
    lineRoundS: 1,
    web: {
      widthM: 1,
      thicknessM: 100e-6,
      modulusPa: 4e9,
      densityKgM3: 800,
      breakNPerM: 600,
      lossTimeS: 0.005,
    },
    roll: {coreRadiusM: 0.05, radiusM: 0.25, coreInertiaKgM2: 0.4, woundTensionN: 100},
    span: {lengthM: 2},
    brake: {maxTorqueNm: 250, lagS: 0.2, capacityJPerK: 5000, conductanceWPerK: 6.67},
    sensing: {kind: 'loadCell', rangeN: 500, filterS: 0.1, noiseN: 0.5},
    controller: {
      kp: 0.2,
      tiS: 0.5,
      setPointN: 200,
      startRampS: 4,
      startFraction: 0.7,
      standstillPct: 20,
      stopHoldS: 6,
      stopHoldGain: 1,
      ...controller,
    },
    line: [],
    actions: [],
  };
}
