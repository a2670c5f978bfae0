const tiny = 1e-300

/** Natural logarithm of the gamma function for x > 0: Stirling's series after stepping up to where it is exact to the last digits. */
function logGamma(x: number): number {
  let [at, stepped] = [x, 0]
  for (; at < 15; at++) stepped += Math.log(at)
  const square = 1 / (at * at)
  const series = (1 / 12 - square * (1 / 360 - square * (1 / 1260 - square / 1680))) / at
  return (at - 0.5) * Math.log(at) - at + Math.log(2 * Math.PI) / 2 + series - stepped
}

/** The k-th coefficient of the continued fraction (Abramowitz and Stegun 26.5.8). */
function coefficient(k: number, x: number, a: number, b: number): number {
  const m = Math.floor(k / 2)
  if (k % 2 === 0) return (m * (b - m) * x) / ((a + k - 1) * (a + k))
  return (-(a + m) * (a + b + m) * x) / ((a + k - 1) * (a + k))
}

/** The continued fraction from the front, by the method of Lentz. */
function fraction(x: number, a: number, b: number): number {
  let [value, up, down] = [1, 1, 0]
  for (let k = 1; k <= 10_000; k++) {
    const term = coefficient(k, x, a, b)
    down = 1 / (1 + term * down || tiny)
    up = 1 + term / up || tiny
    value *= up * down
    if (Math.abs(up * down - 1) < 1e-15) break
  }
  return value
}

/**
 * The share of a beta distribution with parameters `a` and `b` that lies below `x`, 0 to 1 (the regularised incomplete beta
 * function, Abramowitz and Stegun 26.5.1). The distributions of t and of F are read from it.
 */
export function betaShare(x: number, a: number, b: number): number {
  if (x <= 0) return 0
  if (x >= 1) return 1
  if (x > (a + 1) / (a + b + 2)) return 1 - betaShare(1 - x, b, a)
  const front = Math.exp(a * Math.log(x) + b * Math.log1p(-x) + logGamma(a + b) - logGamma(a) - logGamma(b))
  return front / a / fraction(x, a, b)
}
