import { betaShare } from './beta-share'

/**
 * The value that a variable with the F distribution of `above` and `below` degrees of freedom (whole or not) stays under with
 * probability `share`, 0 < share < 1. Found by halving: the beta share only grows.
 */
export function fQuantile(share: number, above: number, below: number): number {
  let [low, high] = [0, 1]
  for (let k = 0; k < 200 && low < high; k++) {
    const middle = (low + high) / 2
    if (middle === low || middle === high) break
    if (betaShare(middle, above / 2, below / 2) < share) low = middle
    else high = middle
  }
  const at = (low + high) / 2
  return (below * at) / (above * (1 - at))
}

/** The value that Student's t with `freedom` degrees of freedom stays under with probability `share`, from a half up: t squared is F(1, freedom). */
export function tQuantile(share: number, freedom: number): number {
  return Math.sqrt(fQuantile(2 * share - 1, 1, freedom))
}
