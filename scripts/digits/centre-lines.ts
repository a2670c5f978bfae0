/** How finely a sample is looked at to find the path of the pen: samples' pixels are that many wide. */
const finer = 3
const wide = 28 * finer

/** Points along the path of the pen, x then y, in the sample's own pixels. */
export type CentreLines = Float32Array

/** Where the pen went to write a digit: its ink thinned to lines of one point (Zhang and Suen 1984), at three times the sample's density. */
export function centreLines(ink: Uint8Array): CentreLines {
  const on = thinned(enlarged(ink))
  const points: number[] = []
  on.forEach((v, k) => { if (v) points.push(((k % wide) + 0.5) / finer, (Math.floor(k / wide) + 0.5) / finer) })
  return Float32Array.from(points)
}

function enlarged(ink: Uint8Array): Uint8Array {
  const at = (x: number, y: number) => (x < 0 || y < 0 || x > 27 || y > 27 ? 0 : ink[y * 28 + x]!)
  return Uint8Array.from({ length: wide * wide }, (_, k) => {
    const x = ((k % wide) + 0.5) / finer - 0.5
    const y = (Math.floor(k / wide) + 0.5) / finer - 0.5
    const [m, n] = [Math.floor(x), Math.floor(y)]
    const [p, q] = [x - m, y - n]
    const v = (at(m, n) * (1 - p) + at(m + 1, n) * p) * (1 - q) + (at(m, n + 1) * (1 - p) + at(m + 1, n + 1) * p) * q
    return v > 105 ? 1 : 0
  })
}

function thinned(on: Uint8Array): Uint8Array {
  for (let changed = true; changed; ) {
    changed = false
    for (const turn of [0, 1]) {
      const gone: number[] = []
      for (let k = wide + 1; k < on.length - wide - 1; k++) if (on[k] && isRim(on, k, turn)) gone.push(k)
      for (const k of gone) on[k] = 0
      changed ||= gone.length > 0
    }
  }
  return on
}

/** Whether a point may go: on the rim, not the end of a line, and nothing falls apart without it. */
function isRim(on: Uint8Array, k: number, turn: number): boolean {
  const round = [on[k - wide]!, on[k - wide + 1]!, on[k + 1]!, on[k + wide + 1]!, on[k + wide]!, on[k + wide - 1]!, on[k - 1]!, on[k - wide - 1]!]
  const beside = round.reduce((sum, v) => sum + v, 0)
  if (beside < 2 || beside > 6) return false
  const steps = round.filter((v, i) => !v && round[(i + 1) % 8]).length
  if (steps !== 1) return false
  const [north, , east, , south, , west] = round
  return turn === 0 ? !(north && east && south) && !(east && south && west) : !(north && east && west) && !(north && south && west)
}
