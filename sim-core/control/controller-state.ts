/** Places in the controller's part of the state. */
export const HAS_INPUT = 0;
export const LAST_Y = 1; // [%]
export const CLOSED = 2; // 1 when the last output came from the PID
export const RUN_AT = 3; // tick of the run command
export const RAMP_AT = 4; // tick at which the start ramp began
export const RAMPING = 5; // 1 once it has
export const STOP_AT = 6; // tick of the first stop command
export const STOP_IS_FAST = 7;
export const STOP_OUTPUT = 8; // output at that command [%]
export const LIMIT = 9; // −1, 1: the PID's output is at its lower, upper limit; else 0
export const APPLIED = 10; // output in force as the brake gets it [%]

/** From here on the places that go into a run's fingerprint. */
export const PRINTED = 11;
export const PHASE = 11; // number of the phase, in the order of PHASES
export const INPUT = 12; // filtered input y_f [N]
export const INTEGRAL = 13; // [%]
export const DERIVATIVE = 14; // d [% of range per s]
export const SET_POINT = 15; // set point now [N]
export const RADIUS = 16; // radius the controller believes [m]
export const OUTPUT = 17; // output in force, before its resolution [%]
export const CONTROLLER_SIZE = 18;
