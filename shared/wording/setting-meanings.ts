import {fromPerson, type UnitSystem, written} from '../units';

/** What is needed to say what a value means on this stand. */
export interface StandFacts {
  /** Range of the sensor [N]. */
  readonly rangeN: number;
  /** Values of the other settings in force. */
  readonly settings: Readonly<Record<string, unknown>>;
}

type Meaning = (value: number, units: UnitSystem, facts: StandFacts) => string;

/** What a value of each setting means here, in one sentence or two under 25 words together. */
export const SETTING_MEANINGS: Readonly<Record<string, Meaning>> = {
  setPointN: (tensionN, units, {rangeN}) =>
    `What the controller is told to hold: ${Math.round((100 * tensionN) / rangeN)} % of the sensor’s range.`,
  kp: (gain, units, {rangeN}) => {
    const oneN = fromPerson('tension', 1, units); // 1 N or 1 lbf, as the person thinks
    const more = Number(((gain * 100 * oneN) / rangeN).toPrecision(2));
    return `${written('tension', oneN, units)} too low gives ${more} % more brake at once.`;
  },
  tiS: (timeS, units) =>
    timeS === 0
      ? 'Off: a small error stays for good.'
      : `Shorter is stronger. A lasting error adds the same push again every ${written('time', timeS, units)}.`,
  tdS: (timeS) =>
    timeS === 0
      ? 'Off, as on most load-cell stands.'
      : 'Reacts to how fast tension changes; also to noise.',
  setPointRateNps: (rateNps, units) =>
    rateNps === 0
      ? 'Off: a new set point counts at once.'
      : `A new set point is approached by ${written('tension', rateNps, units)} a second.`,
  outMinPct: () => 'The controller never gives less brake than this.',
  outMaxPct: () => 'The controller never gives more brake than this.',
  manualPct: () => 'Brake output while in manual: the controller does nothing.',
  startRampS: (timeS, units) =>
    timeS === 0
      ? 'Off: at a start the whole set point counts at once.'
      : `After a start the set point rises to its full value in ${written('time', timeS, units)}.`,
  startFraction: (share, units, {settings}) =>
    `After a start the set point begins at ${written('tension', share * Number(settings['setPointN']), units)}.`,
  stopHoldGain: (gain) =>
    gain === 1
      ? 'No boost: while stopping the brake stays as it was.'
      : `While stopping the brake gets ${gain.toFixed(2)} times what it had.`,
  stopHoldS: (timeS) =>
    timeS === 0
      ? 'Off: the loop stays on until the line stands.'
      : 'Counted from the stop command. Too long locks tension in.',
  standstillPct: () => 'Brake output while the line stands.',
  inputFilterS: (timeS) =>
    timeS === 0 ? 'Off: the reading is used as it comes.' : 'Calms the reading, and delays it.',
  inertiaAssistPct: (percent, units) =>
    percent === 0
      ? 'Off.'
      : `Gives ${written('percent', percent, units)} of the torque that slowing the roll needs; only while the line slows down.`,
  zeroAdjustN: () => 'Taken off every reading of the sensor.',
  spanAdjustPct: (percent) =>
    `Every reading is multiplied by ${Number((percent / 100).toPrecision(3))}.`,
  radiusRefM: () => 'At this diameter the gain is as set; a smaller roll gets less.',
  radiusEnteredM: () => 'What the controller is told. Enter it at every roll change.',
};
