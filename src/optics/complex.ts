/** Complex numbers for the few places that are not hot; the inner loops write their real and imaginary parts out. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const ONE: Complex = { re: 1, im: 0 };

export function complex(re: number, im = 0): Complex {
  return { re, im };
}

export function add(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

export function subtract(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

export function multiply(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

export function divide(a: Complex, b: Complex): Complex {
  const square = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square };
}

/** Principal square root (real part not negative). */
export function squareRoot(a: Complex): Complex {
  const modulus = Math.hypot(a.re, a.im);
  const re = Math.sqrt((modulus + a.re) / 2);
  // The sum form loses digits for negative a.re; the quotient keeps them.
  if (a.re >= 0) return { re, im: re === 0 ? 0 : a.im / (2 * re) };
  const im = Math.sqrt((modulus - a.re) / 2) * (a.im < 0 ? -1 : 1);
  return { re: a.im / (2 * im), im };
}

/** exp(i a). */
export function phase(a: Complex): Complex {
  const damping = Math.exp(-a.im);
  return { re: damping * Math.cos(a.re), im: damping * Math.sin(a.re) };
}

export function squaredModulus(a: Complex): number {
  return a.re * a.re + a.im * a.im;
}
