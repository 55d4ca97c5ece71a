import {type Scenario, SCENARIO_FORMAT} from '#sim-core/index';

/** A stand to begin with. */
export interface SetUp {
  readonly key: string;
  readonly title: string;
  readonly summary: string;
  /** Where its values come from, for those who want to know. */
  readonly source: string;
  /** Roll radii behind the presses [m]. */
  readonly radii: {readonly small: number; readonly half: number; readonly full: number};
  /** What the line usually runs at: speed [m/s], ramp up and down [s]. */
  readonly job: {
    readonly speedMps: number;
    readonly rampS: number;
    readonly stopS: number;
    /** Stop ramp to begin with when the first lesson wants a loop to show [s]. */
    readonly firstStopS?: number;
  };
  readonly scenario: Scenario;
}

export type RollSize = keyof SetUp['radii'];

/** Parts of a scenario that a set-up gives; the rest is the same for all. */
export type StandParts = Pick<
  Scenario,
  'name' | 'web' | 'span' | 'brake' | 'sensing' | 'controller'
> & {
  readonly roll: Omit<Scenario['roll'], 'radiusM'>;
};

/** A stand at rest with its half roll: the holding brake holds the job's tension, which is what lies on the web. */
export function standing(parts: StandParts, halfM: number): Scenario {
  const {roll, controller, name} = parts;
  const bare: Scenario = {
    ...parts,
    format: SCENARIO_FORMAT,
    name,
    durationS: 3600,
    seed: 1,
    initialTensionN: 0.75 * controller.setPointN,
    lineRoundS: 1,
    roll: {...roll, radiusM: halfM},
    line: [],
    actions: [],
  };
  return withRadius(bare, halfM);
}

/** The stand with a roll of another radius, its holding brake set so that it can hold the job's tension at rest. */
export function withRadius(scenario: Scenario, radiusM: number): Scenario {
  const {brake, controller} = scenario;
  const standstillPct = Math.min(100, Math.ceil(outputFor(brake, controller.setPointN * radiusM)));
  return {
    ...scenario,
    roll: {...scenario.roll, radiusM},
    controller: {...controller, standstillPct},
  };
}

/** Output [%] at which the cold brake gives this torque [N·m], from its curve. */
function outputFor(brake: Scenario['brake'], torqueNm: number): number {
  const residualNm = brake.residualTorqueNm ?? 0;
  const share = Math.max(0, (torqueNm - residualNm) / (brake.maxTorqueNm - residualNm));
  const curve = brake.curve ?? [
    [0, 0],
    [100, 1],
  ];
  for (let i = 1; i < curve.length; i++) {
    const [x0, y0] = curve[i - 1]!;
    const [x1, y1] = curve[i]!;
    if (share <= y1) return y1 > y0 ? x0 + ((x1 - x0) * (share - y0)) / (y1 - y0) : x0;
  }
  return 100;
}
