import {settingsFaults} from '../scenario/cross-rules';
import {type Fault} from '../scenario/faults';
import {actFaults, stiffnessFaults} from '../scenario/read-act';
import {join} from '../scenario/read-field';
import {type Scenario} from '../scenario/scenario';
import {changed, type Settings} from '../scenario/settings';
import {type Act} from './log';
import {type Change, type Due} from './schedule';

/** What an act will meet. */
export interface Ahead {
  readonly scenario: Scenario;
  readonly tick: number;
  readonly settings: Settings;
  readonly modulusPa: number;
  readonly largestRadiusM: number;
  /** Acts taken for the same tick before this one. */
  readonly pending: readonly Act[];
  /** What the document still does. */
  readonly later: readonly Due<Change>[];
}

/**
 * Faults of an act: its own, and those it would make with the settings and the plant it meets, now and in
 * everything the document still does. So whatever was lived can be written as one document.
 */
export function faultsAhead(act: Act, at: string, ahead: Ahead): Fault[] {
  const own = actFaults(at, act, ahead.scenario);
  if (own.length > 0 || 'line' in act) return own;
  const faults = 'set' in act ? settingsAhead(act, at, ahead) : stiffnessAhead(act, at, ahead);
  return faults;
}

/** Changes up to and with the act, then those after it. */
function inOrder(act: Change, {pending, later, tick}: Ahead): [Change[], Change[]] {
  const before = later.filter((due) => due.tick <= tick).map((due) => due.what);
  const after = later.filter((due) => due.tick > tick).map((due) => due.what);
  const same = pending.filter((one): one is Change => !('line' in one));
  return [[...before, ...same, act], after];
}

function settingsAhead(act: Change, at: string, ahead: Ahead): Fault[] {
  const [now, after] = inOrder(act, ahead);
  const plantStepS = ahead.scenario.plantStepS ?? 0.001;
  let settings = ahead.settings;
  for (const change of now) if ('set' in change) settings = changed(settings, change.set);
  const faults = settingsFaults(join(at, 'set'), settings, plantStepS);
  for (const change of after) {
    if (faults.length > 0) break;
    if (!('set' in change)) continue;
    settings = changed(settings, change.set);
    faults.push(...settingsFaults(join(at, 'set'), settings, plantStepS));
  }
  return faults;
}

function stiffnessAhead(act: Change, at: string, ahead: Ahead): Fault[] {
  const [now, after] = inOrder(act, ahead);
  let {modulusPa, largestRadiusM} = ahead;
  const meet = (change: Change): void => {
    if (!('disturb' in change)) return;
    modulusPa = change.disturb.modulusPa ?? modulusPa;
    largestRadiusM = Math.max(largestRadiusM, change.disturb.radiusM ?? 0);
  };
  const check = (): Fault[] =>
    stiffnessFaults(join(at, 'disturb'), ahead.scenario, modulusPa, largestRadiusM);
  now.forEach(meet);
  const faults = check();
  for (const change of after) {
    if (faults.length > 0) break;
    meet(change);
    faults.push(...check());
  }
  return faults;
}
