/**
 * Places in the numbers of one evaluation of the plant's equations. They lie in one typed array: numbers in
 * fields of objects or handed over as arguments would be boxed, and objects made from different documents
 * would have different layouts, in the innermost loop of the project.
 *
 * What the caller sets …
 */
export const CLOCK = 0; // seconds into the tick
export const DRIVE_PCT = 1; // brake drive at that moment [%]
export const LOADING = 2; // loading tension of the dancer [N]
export const SLIDING = 3; // 0: the brake holds the roll at rest; else the direction it slides in
export const STOP = 4; // 0: dancer free; −1, 1: at the lower, upper stop
export const TICK_S = 5; // start of the tick [s]
export const PIECE_START = 6; // start of the piece of the line's speed within the tick [s]
export const C0 = 7; // and its coefficients, v = c0 + c1·s + c2·s²
export const C1 = 8;
export const C2 = 9;
export const MOVES = 10; // 1 while the line moves: only then has the nip a ripple

// … what follows from the state and is renewed when it jumps …
export const STIFFNESS = 11; // EA [N]
export const PER_WOUND = 12; // 1/(1 + strain in the roll's outer lap)
export const OUT_OF_ROUND = 13; // 1 when the roll is

// … what an evaluation leaves …
export const TENSION_NOW = 14; // [N]
export const STRAIN_NOW = 15;
export const PULL = 16; // of the web on the roll [N·m]
export const DRAG = 17; // most that brake and bearings hold or drag [N·m]
export const DANCER_PULL = 18; // loading less tension on the dancer [N]; more moves it up
export const SPEED = 19; // of the nip [m/s]
export const RAW = 20; // tension before it is cut at zero [N]
export const ROLL_TENSION = 21; // tension at the roll before it is cut at zero [N]
export const CURVE_PIECE = 22; // piece of the brake's curve
export const FADE = 23; // share of its torque the brake keeps

// … and what the document fixes.
export const AREA = 24; // cross section of the web [m²]
export const LOSS_S = 25;
export const BREAK_N = 26;
export const WOUND_N = 27; // tension the roll was wound with [N]
export const CORE_SQUARE = 28; // core radius squared [m²]
export const PER_LENGTH = 29; // thickness/π [m]: R² = core² + this × wound length
export const INERTIA_AT_ZERO = 30; // J = this + INERTIA_PER_FOURTH·R⁴ [kg·m²]
export const INERTIA_PER_FOURTH = 31; // [kg/m²]
export const COULOMB = 32; // [N·m]
export const VISCOUS = 33; // [N·m·s]
export const SPAN_M = 34;
export const PER_SPAN = 35; // [1/m]
export const IDLER_N = 36;
export const IDLER_KG = 37;
export const RUNOUT = 38; // [m]
export const PER_ROLLER = 39; // [1/m]
export const RESIDUAL = 40; // torque at zero drive [N·m]
export const TORQUE_SPAN = 41; // torque the curve adds at most [N·m]
export const EXTRA_GRIP = 42; // breakaway − 1
export const PER_GRIP_SPEED = 43; // [s/rad]
export const FADE_PER_K = 44;
export const FADE_START = 45; // [°C]
export const PER_CAPACITY = 46; // [K/J]
export const CONDUCTANCE = 47; // [W/K]
export const AMBIENT = 48; // [°C]
export const PER_FILTER = 49; // [1/s], 0 without a filter
export const RANGE = 50; // of the load cell [N]
export const NOISE = 51; // [N]
export const TRAVEL = 52; // of the dancer [m]
export const PER_MASS = 53; // [1/kg]
export const DAMPING = 54; // [N·s/m]
export const MAXWELL_N = 55; // modulus of the Maxwell branch × cross section [N]
export const PER_MAXWELL = 56; // [1/s]
export const EVALUATION_SIZE = 57;
