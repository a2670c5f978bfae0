import { betaShare } from './beta-share'

/** Where a share between 0 and 1 that only grows reaches `share`: by the chord, the end that stays weighing half as much each time it stays, and by halving where that is slow. */
function reached(share: number, shareAt: (x: number) => number): number {
  let [low, high, under, over] = [0, 1, -share, 1 - share]
  for (let k = 0; k < 200 && high - low > 1e-14 * high; k++) {
    const middle = k % 4 === 3 ? (low + high) / 2 : (low * over - high * under) / (over - under)
    const off = shareAt(middle) - share
    if (off === 0) return middle
    if (off < 0) [low, under, over] = [middle, off, over / 2]
    else [high, over, under] = [middle, off, under / 2]
    if (Math.abs(off) < 1e-14) return middle
  }
  return (low + high) / 2
}

/**
 * The value that a variable with the F distribution of `above` and `below` degrees of freedom (whole or not) stays under with
 * probability `share`, 0 < share < 1.
 */
export function fQuantile(share: number, above: number, below: number): number {
  const at = reached(share, (x) => betaShare(x, above / 2, below / 2))
  return (below * at) / (above * (1 - at))
}

/** The value that Student's t with `freedom` degrees of freedom stays under with probability `share`, from a half up: t squared is F(1, freedom). */
export function tQuantile(share: number, freedom: number): number {
  return Math.sqrt(fQuantile(2 * share - 1, 1, freedom))
}
