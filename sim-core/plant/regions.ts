import {LEAST_FADE} from './brake';
import {DRAG_FULL_MPS, type Equations, LOOSENS} from './equations';
import * as now from './evaluation';
import * as at from './plant-state';

/** Where a state lies among the places at which the equations bend, one bit each. */
const TAUT = 1;
const PULLING = 2;
const ROLL_PULLED = 4;
const TURNED_BACK = 8; // sliding, and the speed has changed its sign
const BROKEN_LOOSE = 16; // held, and the web pulls harder than the brake holds
const FADING = 32;
const FADED = 64;
const CREEPING = 128;
const FORWARD = 256;
const PAST_STOP = 512; // beyond a stop, or at one and drawn inward
const WEB_BROKEN = 1024;
const ROLL_EMPTY = 2048;
const PIECE_OF_CURVE = 4096; // counted in the bits above

/** Bits at which tension, speed or mode jump; at the others a slope bends. */
export const JUMPS = TAUT | TURNED_BACK | BROKEN_LOOSE | PAST_STOP | WEB_BROKEN | ROLL_EMPTY;

/** Bits of where the last evaluation lies; a step between two that differ has crossed a bend. */
export function regionOf(equations: Equations, y: Float64Array): number {
  const {now: n} = equations;
  let bits = (n[now.CURVE_PIECE]! + 1) * PIECE_OF_CURVE;
  if (n[now.STRAIN_NOW]! > 0) bits |= TAUT;
  if (n[now.RAW]! > 0) bits |= PULLING;
  if (n[now.ROLL_TENSION]! > 0) bits |= ROLL_PULLED;
  if (n[now.SLIDING] === 0) {
    if (Math.abs(n[now.PULL]!) > n[now.DRAG]! * LOOSENS) bits |= BROKEN_LOOSE;
  } else if (y[at.OMEGA]! * n[now.SLIDING]! < 0) bits |= TURNED_BACK;
  if (n[now.FADE]! < 1) bits |= n[now.FADE] === LEAST_FADE ? FADED : FADING;
  if (n[now.SPEED]! > 0) bits |= FORWARD;
  if (n[now.SPEED]! < DRAG_FULL_MPS) bits |= CREEPING;
  if (n[now.TENSION_NOW]! > n[now.BREAK_N]!) bits |= WEB_BROKEN;
  if (y[at.WOUND]! <= 0) bits |= ROLL_EMPTY;
  if (equations.hasDancer && isPastStop(equations, y)) bits |= PAST_STOP;
  return bits;
}

/**
 * Whether the only bend crossed is that of a roll which the web has just loosened, by less than the margin: a brake
 * that fades slowly crosses it within rounding, and looking closer would find nothing.
 */
export function isJustLoose({now: n}: Equations, bends: number): boolean {
  return bends === BROKEN_LOOSE && Math.abs(n[now.PULL]!) <= n[now.DRAG]! * (1 + 2 * (LOOSENS - 1));
}

/** What a state does that has come past a bend: a roll that turned back rests, a dancer lies at its stop. */
export function rest(equations: Equations, y: Float64Array): void {
  const {now: n} = equations;
  if (y[at.OMEGA]! * n[now.SLIDING]! < 0) y[at.OMEGA] = 0;
  if (!equations.hasDancer) return;
  const p = y[at.DANCER]!;
  if (p >= 0 && p <= n[now.TRAVEL]!) return;
  y[at.DANCER] = p < 0 ? 0 : n[now.TRAVEL]!;
  y[at.DANCER_SPEED] = 0;
}

/** Whether the web has parted or the roll has run out at the last evaluation. */
export function endOf(equations: Equations, y: Float64Array): 'webBroke' | 'rollEmpty' | null {
  if (equations.now[now.TENSION_NOW]! > equations.now[now.BREAK_N]!) return 'webBroke';
  return y[at.WOUND]! <= 0 ? 'rollEmpty' : null;
}

function isPastStop({now: n}: Equations, y: Float64Array): boolean {
  if (n[now.STOP] !== 0) return n[now.DANCER_PULL]! * n[now.STOP]! < 0;
  const p = y[at.DANCER]!;
  return p < 0 || p > n[now.TRAVEL]!;
}
