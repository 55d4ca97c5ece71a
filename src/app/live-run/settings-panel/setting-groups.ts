/** Groups of the settings panel, in the order of the screen. */
export const SETTING_GROUPS = [
  {
    title: 'Loop',
    keys: ['setPointN', 'kp', 'tiS', 'tdS', 'setPointRateNps', 'outMinPct', 'outMaxPct'],
  },
  {title: 'Starting', keys: ['startRampS', 'startFraction']},
  {title: 'Stopping', keys: ['stopHoldGain', 'stopHoldS']},
  {title: 'Standstill', keys: ['standstillPct']},
  {title: 'Sensor', keys: ['inputFilterS', 'zeroAdjustN', 'spanAdjustPct']},
  {title: 'Diameter', keys: ['radiusCompensation', 'radiusRefM', 'inertiaAssistPct']},
] as const;

/** The three that a first visit shows. */
export const FIRST_KEYS: readonly string[] = ['setPointN', 'kp', 'tiS'];
