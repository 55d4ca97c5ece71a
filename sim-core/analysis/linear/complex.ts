/** A complex number; of a frequency response: gain and phase. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export function complex(re: number, im = 0): Complex {
  return {re, im};
}

export function plus(a: Complex, b: Complex): Complex {
  return {re: a.re + b.re, im: a.im + b.im};
}

export function minus(a: Complex, b: Complex): Complex {
  return {re: a.re - b.re, im: a.im - b.im};
}

export function times(a: Complex, b: Complex): Complex {
  return {re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re};
}

export function over(a: Complex, b: Complex): Complex {
  const square = b.re * b.re + b.im * b.im;
  return {re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square};
}

export function magnitude({re, im}: Complex): number {
  return Math.hypot(re, im);
}

/** Angle [rad], −π … π. */
export function angle({re, im}: Complex): number {
  return Math.atan2(im, re);
}

/** e^(j·angle) of an angle [rad]: what a dead time does to a sine, with angle −ω·θ. */
export function turn(angleRad: number): Complex {
  return {re: Math.cos(angleRad), im: Math.sin(angleRad)};
}
