/** Modified Bessel function of the first kind, order 0, by its power series; to double precision up to x = 700. */
export function besselI0(x: number): number {
  const quarterSquare = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; k < 1000 && term > 1e-17 * sum; k++) {
    term *= quarterSquare / (k * k);
    sum += term;
  }
  return sum;
}
