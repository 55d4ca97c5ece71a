import {type ControllerParams, type Scenario, withDefaults} from '#sim-core/index';

/** Keys that plain.c does not know, with the value at which it may be left out; null: always. */
const LEFT_OUT: Readonly<Record<string, unknown>> = {
  format: null,
  name: null,
  'web.stretchLimitPct': null, // only reported, as is the next
  'brake.limitC': null,
  'web.maxwellModulusPa': 0,
  'web.maxwellTimeS': null,
  'span.rollerRadiusM': null,
  'span.rollerRunoutM': 0,
  'controller.mode': 'automatic',
  'controller.manualPct': null,
  'controller.radiusSource': 'true',
  'controller.radiusEnteredM': null,
  'controller.caliperEnteredM': null,
  'controller.antiWindup': 'conditional',
  'controller.trackingS': null,
  'controller.bumpless': true,
  'controller.outRatePctPerS': 0,
  'controller.outStepPct': 0,
};

/** A checked document as the flat text that plain.c reads, every default written out. Throws when it can't run there. */
export function documentText(scenario: Scenario): string {
  const {web, roll, span, brake, sensing, controller, line, actions, ...top} =
    withDefaults(scenario);
  const {curve = [], ...drive} = brake;
  const {kind, ...sensor} = sensing;
  const parts = {web, roll, span, brake: drive, sensing: sensor, controller: settings(controller)};
  const lines = [
    ...keyLines('', top),
    ...Object.entries(parts).flatMap(([name, part]) => keyLines(`${name}.`, part)),
    `sensing.isDancer ${kind === 'dancer' ? 1 : 0}`,
    `curve ${curve.length} ${curve.flat().join(' ')}`,
    ...byTime(line).map((each) => {
      const speedMps = each.command === 'run' ? each.speedMps : 0;
      return `line ${each.atS} ${each.command} ${speedMps} ${each.rampS}`;
    }),
    ...byTime(actions).flatMap((action) => {
      if (!('set' in action)) throw new Error('plain.c knows no disturbances.');
      return keyLines('controller.', action.set).map((each) => `set ${action.atS} ${each}`);
    }),
  ];
  return `${lines.join('\n')}\n`;
}

/** Optional keys that take their value from another one. */
function settings(controller: ControllerParams): object {
  const {stopHoldS, stopHoldGain, fastStopHoldS, fastStopGain} = controller;
  return {
    ...controller,
    fastStopHoldS: fastStopHoldS ?? stopHoldS,
    fastStopGain: fastStopGain ?? stopHoldGain,
  };
}

function keyLines(before: string, part: object): string[] {
  return Object.entries(part).flatMap(([name, value]: [string, unknown]) => {
    const key = `${before}${name}`;
    if (value === null || value === undefined) return [];
    if (key in LEFT_OUT) {
      if (LEFT_OUT[key] === null || LEFT_OUT[key] === value) return [];
      throw new Error(`plain.c does not know ${key} ${JSON.stringify(value)}.`);
    }
    if (typeof value === 'number') return [`${key} ${value}`];
    if (typeof value === 'boolean') return [`${key} ${value ? 1 : 0}`];
    throw new Error(`plain.c does not know ${key}.`);
  });
}

function byTime<T extends {readonly atS: number}>(list: readonly T[]): T[] {
  return [...list].sort((a, b) => a.atS - b.atS);
}
