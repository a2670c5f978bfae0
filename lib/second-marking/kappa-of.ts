import type { Figure } from '@/lib/core/moderation-figures'

/** How far two marks are apart: nought for the same mark. */
export type Apart = (a: number, b: number) => number

/** The usual distances: any difference alike, by the difference, by its square. */
export const apartBy = {
  plain: (a, b) => (a === b ? 0 : 1),
  linear: (a, b) => Math.abs(a - b),
  quadratic: (a, b) => (a - b) ** 2,
} as const satisfies Record<string, Apart>

export type Kappa = Readonly<{ kappa: Figure; standardError: number | null }>

/** Each value with how often it is there, from the smallest up. */
function counted(values: readonly number[]): (readonly [value: number, times: number])[] {
  const times = new Map<number, number>()
  for (const value of values) times.set(value, (times.get(value) ?? 0) + 1)
  return [...times].sort(([a], [b]) => a - b)
}

/**
 * Cohen's kappa of pairs of marks, weighted by `apart`: 1 - distance seen / distance by chance, and its standard error by Fleiss,
 * Cohen and Everitt 1969 (check-values: kappa-*). Marks are in steps of one scale, nought to the maximum: the weight of a pair is 1 - |i - j|/(k - 1) or its square
 * over all k possible marks, and as k - 1 divides what was seen and what chance gives alike, only the distances themselves remain; marks nobody gave keep
 * their place in them. Not defined under three pairs, or when chance alone agrees everywhere.
 */
export function kappaOf(pairs: readonly (readonly [first: number, second: number])[], apart: Apart): Kappa {
  const n = pairs.length
  if (n < 3) return { kappa: { value: null, why: n === 0 ? 'no_pairs' : 'too_few' }, standardError: null }
  const [rows, columns] = [counted(pairs.map(([first]) => first)), counted(pairs.map(([, second]) => second))]
  const seen = pairs.reduce((sum, [first, second]) => sum + apart(first, second), 0) / n
  const fromRow = (first: number) => columns.reduce((sum, [second, times]) => sum + times * apart(first, second), 0) / n
  const fromColumn = (second: number) => rows.reduce((sum, [first, times]) => sum + times * apart(first, second), 0) / n
  const chance = rows.reduce((sum, [first, times]) => sum + times * columns.reduce((inner, [second, also]) => inner + also * apart(first, second), 0), 0) / n / n
  if (chance === 0) return { kappa: { value: null, why: 'no_spread' }, standardError: null }
  const share = seen / chance
  const spread = [...pairs].sort(([a, b], [c, d]) => a - c || b - d).reduce((sum, [first, second]) => sum + (apart(first, second) - (fromRow(first) + fromColumn(second)) * share) ** 2, 0) / n
  return { kappa: { value: 1 - share, why: null }, standardError: Math.sqrt(Math.max(0, spread - seen * seen) / n) / chance }
}
