import {type Scenario} from '../scenario/scenario';

/** Most parts a plant step may be divided into. */
export const MOST_PARTS = 16;

/** Steepest fall of the grip 1/(1 + z²) over z: 3·√3/8. */
const STEEPEST_GRIP = 0.649519052838329;

/** How fast a plant can be at a modulus, over every radius from the core to the largest. */
export interface Pace {
  /** Upper bound of the fastest rate [1/s]. */
  readonly rate: number;
  /** Upper bound of the frequency of a vibration [rad/s]. */
  readonly vibration: number;
}

/** Roll and dancer hang on the same web, so their stiffness per mass simply adds up. */
export function paceOf(scenario: Scenario, modulusPa: number, largestRadiusM: number): Pace {
  const {web, roll, span, brake, sensing} = scenario;
  const area = web.widthM * web.thicknessM;
  const elastic = (modulusPa * area) / span.lengthM; // [N/m]
  const stiffness = elastic + ((web.maxwellModulusPa ?? 0) * area) / span.lengthM; // [N/m]
  const leastInertia = roll.coreInertiaKgM2;
  const perMass =
    quickestRadius(scenario, largestRadiusM) + (sensing.kind === 'dancer' ? 4 / sensing.massKg : 0); // [1/kg]

  const grip =
    (brake.maxTorqueNm * ((brake.breakaway ?? 1) - 1) * STEEPEST_GRIP) /
    ((brake.breakawayRadps ?? 0.5) * leastInertia);
  const damping =
    elastic * (web.lossTimeS ?? 0) * perMass +
    (sensing.kind === 'dancer' ? sensing.dampingNsPerM / sensing.massKg : 0) +
    (roll.viscousNmS ?? 0) / leastInertia +
    grip; // [1/s]
  const spring = stiffness * perMass; // [1/s²]

  const spread = (damping * damping) / 4 - spring;
  const vibration = Math.sqrt(spring);
  const mechanical = spread > 0 ? damping / 2 + Math.sqrt(spread) : vibration;
  return {rate: Math.max(mechanical, brake.conductanceWPerK / brake.capacityJPerK), vibration};
}

/** Into how many equal parts a plant step must be divided so that rate × part <= 1; may exceed MOST_PARTS. */
export function neededParts(plantStepS: number, {rate}: Pace): number {
  return Math.max(1, ceiling(plantStepS * rate));
}

/** The whole number at or above `value`, to within rounding. */
export function ceiling(value: number): number {
  return -Math.floor(-(value - 1e-9));
}

/** Greatest R²/J(R) [1/kg] between core and `largestRadiusM`: where the roll answers quickest. */
function quickestRadius({web, roll}: Scenario, largestRadiusM: number): number {
  const perFourth = 0.5 * 3.141592653589793 * web.densityKgM3 * web.widthM;
  const core = roll.coreRadiusM;
  const coreFourth = core * core * core * core;
  const rest = roll.coreInertiaKgM2 - perFourth * coreFourth;
  const best = rest > 0 ? Math.sqrt(Math.sqrt(rest / perFourth)) : 0;
  const radius = Math.min(Math.max(best, core), Math.max(core, largestRadiusM));
  const square = radius * radius;
  return square / (rest + perFourth * square * square);
}
