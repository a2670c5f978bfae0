import { createHash } from 'node:crypto'

/**
 * A fair order of responses, drawn by a seed: the same seed gives the same order again, and a response that comes later (a late script) falls in somewhere without moving the
 * others against each other.
 */
export function fairOrder(responseIds: readonly string[], seed: string): string[] {
  const draw = new Map(responseIds.map((id) => [id, createHash('sha256').update(`${seed} ${id}`).digest('hex')]))
  return [...responseIds].sort((a, b) => (draw.get(a)! < draw.get(b)! ? -1 : 1))
}
