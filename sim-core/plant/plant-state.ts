/**
 * Places in the plant's part of the state. Those before INTEGRATED are integrated, but for DRIVE, whose lag is
 * followed exactly; a stand without dancer, roller run-out and relaxing web needs only those before DANCER.
 */
export const OMEGA = 0; // roll speed [rad/s]
export const THETA = 1; // roll angle [rad], 0 … 2π at each tick
export const WOUND = 2; // relaxed length on the roll [m]
export const LENGTH = 3; // relaxed web length in the span [m]
export const HEAT = 4; // brake temperature [°C]
export const FILTER = 5; // sensor's filter [N]
export const DRIVE = 6; // brake drive x [%]
export const DANCER = 7; // dancer position [m]
export const DANCER_SPEED = 8; // [m/s]
export const ROLLER = 9; // angle of the roller with run-out [rad]
export const RELAXED = 10; // strain of the dashpot in the web's Maxwell branch
export const INTEGRATED = 11;

export const TENSION = 11; // at the end of the last tick [N]
export const STRAIN = 12; // at the end of the last tick
export const MODULUS = 13; // [Pa]
export const ECCENTRICITY = 14; // [m]
export const OVAL = 15; // [m]
export const ZERO = 16; // [N]
export const SPAN_PCT = 17; // [%]
export const LOAD = 18; // known load on the roller [N]
export const LOADED = 19; // 1 while it hangs
export const RIPPLE = 20; // [m/s]
export const RIPPLE_HZ = 21; // [Hz]
export const LARGEST = 22; // largest radius so far [m]
export const PLANT_SIZE = 23;
