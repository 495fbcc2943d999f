/** Bernoulli numbers B_2, B_4, … over k (k − 1), the coefficients of Stirling's series. */
const STIRLING = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];
/** From here on the series' last term is below half a unit of the sum. */
const LARGE = 12;

/** ln Γ(x), x > 0, to some units in the last place of the larger of it and 1.
 *  Source: DLMF 5.11.1, after raising x by 5.5.1. */
export function logGamma(x: number): number {
  let shift = 0;
  let y = x;
  while (y < LARGE) {
    shift += Math.log(y);
    y += 1;
  }
  let sum = 0;
  for (let k = STIRLING.length - 1; k >= 0; k -= 1) sum = sum / (y * y) + (STIRLING[k] as number);
  return (y - 1 / 2) * Math.log(y) - y + Math.log(2 * Math.PI) / 2 + sum / y - shift;
}
