import { toPixels, turnOf, type Homography, type PaperPoint } from '@/lib/core/paper-space'
import type { Candidate } from './coarse'
import type { Ready } from './register-leaf'
import type { Template } from './template'

/** Points to pixels of 25 dpi. */
const k = 25 / 72

/** Where a page lies by its code alone: the symbol's middle is where it was seen, and the page turns as the symbol does. */
export function placeByCode({ shrunk, levelled: { ink } }: Ready, template: Template, code: Homography, at: PaperPoint): Candidate {
  const seen = (point: PaperPoint) => {
    const { x, y } = toPixels(code, point)
    return { x: x / (shrunk.byX * 4), y: y / (shrunk.byY * 4) }
  }
  const middle = seen(at)
  const degrees = directionOf(seen, at)
  const [u, v] = unturned(middle.x - ink.width / 2, middle.y - ink.height / 2, degrees)
  const { ink25 } = template
  const dx = (u - at.x * k + ink25.width / 2) / 2
  const dy = (v - at.y * k + ink25.height / 2) / 2
  return { template, turn: turnOf(code, at), degrees, dx, dy, likeness: 1 }
}

/** The same place with the page turned a little further about its code: a small symbol does not tell the angle to a tenth of a degree. */
export function turnedAbout(place: Candidate, template: Template, at: PaperPoint, by: number): Candidate {
  const degrees = place.degrees + by
  const [x, y] = [at.x * k - template.ink25.width / 2, at.y * k - template.ink25.height / 2]
  // R(degrees) (p + d) has to stay where R(place.degrees) (p + d0) was: d = R(-by) (p + d0) - p.
  const [u, v] = unturned(x + place.dx * 2, y + place.dy * 2, by)
  return { ...place, degrees, dx: (u - x) / 2, dy: (v - y) / 2 }
}

/** How far the paper's x axis is turned clockwise at a point, by the longer lines through it. */
function directionOf(seen: (point: PaperPoint) => { x: number; y: number }, { x, y }: PaperPoint): number {
  const reach = 20
  const [left, right] = [seen({ x: x - reach, y }), seen({ x: x + reach, y })]
  const [top, bottom] = [seen({ x, y: y - reach }), seen({ x, y: y + reach })]
  const [a, b] = [right.x - left.x + (bottom.y - top.y), right.y - left.y - (bottom.x - top.x)]
  return (Math.atan2(b, a) * 180) / Math.PI
}

function unturned(x: number, y: number, degrees: number): [number, number] {
  const angle = (degrees * Math.PI) / 180
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  return [c * x + s * y, -s * x + c * y]
}
