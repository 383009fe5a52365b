/** Coefficients of Lanczos' approximation with g = 607/128 (P. Godfrey's set; relative error about 1e-15). */
const lanczos = [
  0.9999999999999971, 57.15623566586292, -59.59796035547549, 14.136097974741746,
  -0.4919138160976202, 3.399464998481189e-5, 4.652362892704858e-5, -9.837447530487956e-5,
  0.0001580887032249125, -0.00021026444172410488, 0.00021743961811521265, -0.0001643181065367639,
  8.441822398385275e-5, -2.6190838401581408e-5, 3.6899182659531625e-6,
] as const;
const g = 607 / 128;

/** Natural logarithm of the gamma function; RangeError unless x > 0. */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`logGamma needs x > 0, not ${x}`);
  let sum = 0;
  for (const [k, coefficient] of lanczos.entries())
    sum += k === 0 ? coefficient : coefficient / (x + (k - 1));
  const t = x + g - 0.5;
  return (x - 0.5) * Math.log(t) - t + Math.log(Math.sqrt(2 * Math.PI) * sum);
}
