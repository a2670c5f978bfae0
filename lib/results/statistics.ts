/** The mean, null of nothing. */
export function mean(values: readonly number[]): number | null {
  return values.length === 0 ? null : values.reduce((a, b) => a + b, 0) / values.length
}

/** The standard deviation of a sample (n − 1), null with fewer than two values. */
export function sdSample(values: readonly number[]): number | null {
  const middle = mean(values)
  if (middle === null || values.length < 2) return null
  return Math.sqrt(values.reduce((total, value) => total + (value - middle) ** 2, 0) / (values.length - 1))
}

/** The value below which `share` of the values lie, between two of them in proportion (R's type 7). Null of nothing. */
export function quantile(values: readonly number[], share: number): number | null {
  if (values.length === 0) return null
  const sorted = [...values].sort((a, b) => a - b)
  const at = (sorted.length - 1) * share
  const below = sorted[Math.floor(at)]!
  return below + (sorted[Math.ceil(at)]! - below) * (at - Math.floor(at))
}

/** Pearson's correlation, null when either list does not vary. */
export function correlation(a: readonly number[], b: readonly number[]): number | null {
  const [meanA, meanB] = [mean(a), mean(b)]
  if (meanA === null || meanB === null || a.length !== b.length) return null
  let [ab, aa, bb] = [0, 0, 0]
  for (const [k, value] of a.entries()) {
    const [da, dB] = [value - meanA, b[k]! - meanB]
    ab += da * dB
    aa += da * da
    bb += dB * dB
  }
  return aa === 0 || bb === 0 ? null : ab / Math.sqrt(aa * bb)
}
