/** Format mark of a scenario document; anything that changes its meaning counts up. */
export const SCENARIO_FORMAT = 'evenspan.scenario/1';

/** Web between roll and nip. */
export interface WebParams {
  /** Web width [m], > 0. */
  readonly widthM: number;
  /** Web thickness [m], > 0. */
  readonly thicknessM: number;
  /** Modulus in the machine direction [Pa], > 0. */
  readonly modulusPa: number;
  /** Density [kg/m³], > 0. */
  readonly densityKgM3: number;
  /** Strength per width [N/m], > 0; more tension parts the web. */
  readonly breakNPerM: number;
  /** Loss time of the web's damping [s], >= 0. */
  readonly lossTimeS?: number;
  /** Strain above which the web stays stretched [%]; none when left out. */
  readonly stretchLimitPct?: number;
  /** Modulus of a Maxwell branch beside the elastic web [Pa], >= 0; 0: the web does not relax. */
  readonly maxwellModulusPa?: number;
  /** Relaxation time of that branch [s], > 0. */
  readonly maxwellTimeS?: number;
}

/** Unwinding roll and its shaft. */
export interface RollParams {
  /** Core radius [m], > 0. */
  readonly coreRadiusM: number;
  /** Roll radius at t = 0 [m], >= coreRadiusM. */
  readonly radiusM: number;
  /** Inertia of core, shaft and chucks [kg·m²], > 0. */
  readonly coreInertiaKgM2: number;
  /** Tension the roll was wound with [N], >= 0. */
  readonly woundTensionN: number;
  /** Eccentricity, once per turn [m], >= 0. */
  readonly eccentricityM?: number;
  /** Ovality, twice per turn [m], >= 0. */
  readonly ovalM?: number;
  /** Coulomb friction of the bearings [N·m], >= 0. */
  readonly coulombNm?: number;
  /** Viscous drag of the bearings [N·m·s], >= 0. */
  readonly viscousNmS?: number;
}

/** Free span between roll and nip. */
export interface SpanParams {
  /** Web path between roll and nip [m], > 0. */
  readonly lengthM: number;
  /** Tension lost in the idlers [N], >= 0. */
  readonly idlerDragN?: number;
  /** Inertia of the idlers, as mass at their surface [kg], >= 0. */
  readonly idlerMassKg?: number;
  /** Radius of the roller whose run-out is modelled [m], > 0. */
  readonly rollerRadiusM?: number;
  /** Run-out of that roller [m], >= 0. */
  readonly rollerRunoutM?: number;
}

/** Brake on the roll's shaft. */
export interface BrakeParams {
  /** Torque at full drive [N·m], > 0. */
  readonly maxTorqueNm: number;
  /** Torque left at zero drive [N·m], >= 0. */
  readonly residualTorqueNm?: number;
  /** First-order lag of the drive [s], 0 or at least two plant steps. */
  readonly lagS: number;
  /** Lag while the drive rises [s], as lagS when left out. */
  readonly lagUpS?: number;
  /** Lag while the drive falls [s], as lagS when left out. */
  readonly lagDownS?: number;
  /** Dead time of the drive [s], >= 0. */
  readonly deadTimeS?: number;
  /** Play between output and drive [%], >= 0. */
  readonly playPct?: number;
  /** Movement below which the drive sticks [%], >= 0. */
  readonly stickPct?: number;
  /** Grip at rest as a multiple of the sliding torque, >= 1. */
  readonly breakaway?: number;
  /** Speed over which that extra grip fades [rad/s], > 0. */
  readonly breakawayRadps?: number;
  /** Share of torque over drive: points [drive %, share 0…1], drive rising from 0 to 100. */
  readonly curve?: readonly (readonly [number, number])[];
  /** Heat capacity [J/K], > 0. */
  readonly capacityJPerK: number;
  /** Heat given off per kelvin above ambient [W/K], > 0. */
  readonly conductanceWPerK: number;
  /** Ambient temperature [°C]. */
  readonly ambientC?: number;
  /** Torque lost per kelvin above fadeStartC [1/K], >= 0. */
  readonly fadePerK?: number;
  /** Temperature where fade begins [°C]. */
  readonly fadeStartC?: number;
  /** Temperature limit of the brake [°C]. */
  readonly limitC?: number;
}

/** Load-cell roller. */
export interface LoadCellParams {
  readonly kind: 'loadCell';
  /** Range of web tension [N], > 0. */
  readonly rangeN: number;
  /** Filter time constant [s], 0 or at least two plant steps. */
  readonly filterS: number;
  /** Standard deviation of the noise [N], >= 0. */
  readonly noiseN?: number;
  /** Zero offset [N]. */
  readonly zeroN?: number;
  /** Reading per tension [%]: 100 is right, 50 one dead cell, −100 reversed. */
  readonly spanPct?: number;
}

/** Dancer roller. */
export interface DancerParams {
  readonly kind: 'dancer';
  /** Travel between the stops [m], > 0. */
  readonly travelM: number;
  /** Moving mass [kg], > 0. */
  readonly massKg: number;
  /** Damping [N·s/m], >= 0. */
  readonly dampingNsPerM: number;
}

/** All controller keys; those of `LiveSettings` may change while the line runs. */
export interface ControllerParams extends LiveSettings {
  readonly kp: number;
  readonly tiS: number;
  readonly setPointN: number;
  readonly startRampS: number;
  readonly startFraction: number;
  readonly standstillPct: number;
  readonly stopHoldS: number;
  readonly stopHoldGain: number;
  /** Sample period [s], > 0; can't be set live. */
  readonly sampleS?: number;
}

/** Controller keys that a `set` may change; `null` takes an optional one off. */
export interface LiveSettings {
  /** Proportional gain [% output per % of range]. */
  readonly kp?: number;
  /** Integral time [s], 0 = no integral part. */
  readonly tiS?: number;
  /** Derivative time [s], 0 = no derivative part. */
  readonly tdS?: number;
  /** Derivative filter: Tf = Td/N. */
  readonly derivativeN?: number;
  /** Weight of the set point in the proportional part, 0…1. */
  readonly setPointWeight?: number;
  /** Lowest output [%]. */
  readonly outMinPct?: number;
  /** Highest output [%]. */
  readonly outMaxPct?: number;
  /** Tension set point [N]. */
  readonly setPointN?: number;
  readonly mode?: 'automatic' | 'manual';
  /** Output in manual [%]. */
  readonly manualPct?: number;
  /** Start ramp [s]. */
  readonly startRampS?: number;
  /** Share of the set point the start ramp begins at, 0…1. */
  readonly startFraction?: number;
  /** Holding brake: output at standstill [%]. */
  readonly standstillPct?: number;
  /** Stop-hold: boost time [s]; 0 keeps the loop on until the line stands. */
  readonly stopHoldS?: number;
  /** Stop-hold: boost × of the output at the stop command. */
  readonly stopHoldGain?: number;
  readonly radiusCompensation?: boolean;
  /** Radius at which the compensated gain equals kp [m]. */
  readonly radiusRefM?: number | null;
  readonly inertiaAssistPct?: number;
  /** Greatest rate of the set point [N/s], 0 = at once. */
  readonly setPointRateNps?: number;
  readonly startOutputPct?: number | null;
  readonly closeAboveN?: number;
  readonly startHoldS?: number;
  readonly fastStopGain?: number | null;
  readonly fastStopHoldS?: number | null;
  /** Points [radius m, factor on kp]. */
  readonly gainByRadius?: readonly (readonly [number, number])[] | null;
  readonly radiusSource?: 'true' | 'counted' | 'ratio';
  readonly radiusEnteredM?: number | null;
  readonly caliperEnteredM?: number;
  readonly zeroAdjustN?: number;
  readonly spanAdjustPct?: number;
  readonly inputSign?: 1 | -1;
  readonly inputFilterS?: number;
  readonly antiWindup?: 'conditional' | 'backCalculation' | 'none';
  readonly trackingS?: number | null;
  readonly bumpless?: boolean;
  /** Greatest rate of the PID's output [% per s], 0 = none. */
  readonly outRatePctPerS?: number;
  /** Resolution of the output [%]: the brake gets whole multiples of it; 0 = none. */
  readonly outStepPct?: number;
}

/** Command to the line's drive. `speedMps` [m/s] only with `run`; `rampS` [s]. */
export type LineCommand =
  | {readonly command: 'run'; readonly speedMps: number; readonly rampS: number}
  | {readonly command: 'stop' | 'fastStop'; readonly rampS: number};

/** Plant values that a disturbance may replace while the line runs (model: Disturbances). */
export interface Disturbance {
  readonly modulusPa?: number;
  readonly eccentricityM?: number;
  readonly ovalM?: number;
  readonly zeroN?: number;
  readonly spanPct?: number;
  readonly supply?: number;
  /** Known load hung on the roller with the web off [N]; null takes it off. */
  readonly knownLoadN?: number | null;
  readonly rippleMps?: number;
  readonly rippleHz?: number;
  /** A roll change to this radius [m]. */
  readonly radiusM?: number;
}

/** What a scenario does by itself, at its time [s]. */
export type ScenarioAction =
  | {readonly atS: number; readonly set: LiveSettings}
  | {readonly atS: number; readonly disturb: Disturbance};

/** One scenario document (SI), as in docs of the model: plant, controller, line programme, actions. */
export interface Scenario {
  readonly format: typeof SCENARIO_FORMAT;
  readonly name: string;
  /** Length of a run to the end [s], > 0. */
  readonly durationS: number;
  /** Seed of the noise, a whole number 0…2³²−1. */
  readonly seed: number;
  readonly initialTensionN: number;
  readonly lineRoundS?: number;
  readonly plantStepS?: number;
  readonly web: WebParams;
  readonly roll: RollParams;
  readonly span: SpanParams;
  readonly brake: BrakeParams;
  readonly sensing: LoadCellParams | DancerParams;
  readonly controller: ControllerParams;
  readonly line: readonly (LineCommand & {readonly atS: number})[];
  readonly actions: readonly ScenarioAction[];
}
