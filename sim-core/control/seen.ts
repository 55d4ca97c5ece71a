/** Places of what the controller sees in one tick; `run/` fills them in. */
export const TICK = 0;
export const SAMPLE_N = 1; // sample of the load cell [N]
export const DANCER_PCT = 2; // dancer position [% of travel]
export const RAN = 3; // 1: a run command came in this tick
export const STOPPED = 4; // first stop command of this tick that no later run took back, see below
export const STANDS = 5; // 1: the line stands
export const MEAN_RADIUS = 6; // true radius [m], as a sensor on the roll would give
export const OMEGA = 7; // roll speed [rad/s]
export const LINE_MPS = 8; // line speed without ripple [m/s]
export const LINE_SLOPE = 9; // and its slope from this tick on [m/s²]
// filled in by the controller itself, for the PID
export const Y = 10; // controlled variable [% of range or travel]
export const R = 11; // its set point
export const GAIN = 12; // gain in force [%/%]
export const COMPENSATION = 13; // factor of the radius compensation
export const ASSIST_PCT = 14; // output for the inertia of a slowing roll [%]
export const SENSE = 15; // 1: more output raises y (load cell); −1: a rising y asks for more (dancer)
export const SEEN_SIZE = 16;

/** Kinds of stop command. */
export const NO_STOP = 0;
export const STOP = 1;
export const FAST_STOP = 2;
