/** A complex number, for responses at one frequency. */
export type Complex = { re: number; im: number };

export const real = (re: number): Complex => ({ re, im: 0 });

export const plus = (a: Complex, b: Complex): Complex => ({ re: a.re + b.re, im: a.im + b.im });

export const minus = (a: Complex, b: Complex): Complex => ({ re: a.re - b.re, im: a.im - b.im });

export const times = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});

export const over = (a: Complex, b: Complex): Complex => {
  const norm = squaredMagnitude(b);
  return { re: (a.re * b.re + a.im * b.im) / norm, im: (a.im * b.re - a.re * b.im) / norm };
};

export const squaredMagnitude = ({ re, im }: Complex): number => re * re + im * im;
