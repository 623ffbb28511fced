/** A complex number where one value at a time is worked on; points of a sweep stay in typed arrays. */
export interface Complex {
  readonly re: number;
  readonly im: number;
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

export function scale(a: Complex, factor: number): Complex {
  return { re: a.re * factor, im: a.im * factor };
}

export function divide(a: Complex, b: Complex): Complex {
  const inverse = 1 / (b.re * b.re + b.im * b.im);
  return {
    re: inverse * (a.re * b.re + a.im * b.im),
    im: inverse * (a.im * b.re - a.re * b.im),
  };
}

export function reciprocal(a: Complex): Complex {
  return divide({ re: 1, im: 0 }, a);
}

export function magnitude(a: Complex): number {
  return Math.sqrt(a.re * a.re + a.im * a.im);
}

/** e^a. */
export function exponential(a: Complex): Complex {
  const size = Math.exp(a.re);
  return { re: size * Math.cos(a.im), im: size * Math.sin(a.im) };
}
