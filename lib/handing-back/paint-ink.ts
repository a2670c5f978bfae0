import type { FontRole } from '@/lib/core/text-widths'
import { penColour, type Ink, type LineInk, type TextInk } from '@/lib/core/ink'
import { toPixels, type Homography, type PaperPoint } from '@/lib/core/paper-space'
import type { Pen, StampKind } from '@/lib/core/stamp'
import type { Face } from '@/lib/typesetting/font-files'
import { actualText, colour, num, place } from '@/lib/typesetting/operators'
import type { Shapes } from './shapes'
import type { Typesetter } from '@/lib/typesetting/typesetter'

/** What a drawing is, for a copy whose marking other programs list: a stamp by its id, a question's ring or a page's sum. */
export type Drawn = Readonly<{ id: string; kind: StampKind | 'question-mark' | 'page-total'; label: string | null; says: string; text: string }>
/** Ink of one pen, in paper points. */
export type Drawing = Readonly<{ pen: Pen; inks: readonly Ink[]; of?: Drawn }>

const faceOf: Readonly<Record<FontRole, Face>> = { note: 'book-italic', code: 'sans-bold', worth: 'sans-bold', figure: 'sans-strong' }

/** What ink is painted with: the type and the outlines of one file. */
export type Painting = Readonly<{ type: Typesetter; shapes: Shapes }>

/**
 * Drawings as PDF operators. `toPage` takes paper points to the page's user space; every point of a shape goes through it, type and line
 * widths follow it where they stand, so that a turned, skewed or /Rotate page needs nothing of its own.
 */
export function paintInk(drawings: readonly Drawing[], toPage: Homography, { type, shapes }: Painting): string {
  return drawings.map(({ pen, inks }) => `q ${colour(penColour[pen], 'both')} 1 j ${inks.map((ink) => paint(ink, toPage, type, shapes)).join('\n')} Q`).join('\n')
}

function paint(ink: Ink, toPage: Homography, type: Typesetter, shapes: Shapes): string {
  if (ink.kind === 'text') return paintText(ink, toPage, type)
  if (ink.shape) return `q ${laid(ink.shape.at, toPage).map(num4).join(' ')} cm /${shapes.nameOf(ink, ink.shape.data)} Do Q`
  const path = ink.path.map(([letter, ...numbers]) => step(letter, numbers, toPage)).join(' ')
  return ink.kind === 'filled' ? `${path} f` : `${lineState(ink, toPage)} ${path} S`
}

/** What lays something drawn about the origin, y down, at a point of the paper: over the size of a stamp a scan is as good as straight. */
function laid(at: PaperPoint, toPage: Homography): number[] {
  const { x, y } = toPixels(toPage, at)
  return [...near(toPage, at), x, y]
}

/** A matrix turns and stretches: a thousandth would show over the width of a ring. */
const num4 = (value: number): string => String(Math.round(value * 10_000) / 10_000 || 0)

const operatorOf = { M: 'm', L: 'l', C: 'c', Z: 'h' } as const

function step(letter: keyof typeof operatorOf, numbers: readonly number[], toPage: Homography): string {
  const mapped: string[] = []
  for (let k = 0; k + 1 < numbers.length; k += 2) {
    const { x, y } = toPixels(toPage, { x: numbers[k]!, y: numbers[k + 1]! })
    mapped.push(place(x), place(y))
  }
  return [...mapped, operatorOf[letter]].join(' ')
}

function lineState({ width, dash, path }: LineInk, toPage: Homography): string {
  const first = path[0]
  const [a, b, c, d] = near(toPage, first && first[0] !== 'Z' ? { x: first[1], y: first[2] } : { x: 0, y: 0 })
  const scale = Math.sqrt(Math.abs(a * d - b * c))
  const dashes = dash ? `[${num(dash[0] * scale)} ${num(dash[1] * scale)}] 0 d 0 J` : '[] 0 d 1 J'
  return `${num(width * scale)} w ${dashes}`
}

/** Type stands on the page as the paper does there: its own frame, y up, is turned by what the map does beside its anchor. */
function paintText({ text, at, font, size, spacing, anchor }: TextInk, toPage: Homography, type: Typesetter): string {
  const runs = type.runs(text, faceOf[font])
  const width = runs.reduce((sum, run) => sum + run.width, 0) * size + spacing * [...text].length
  let x = at.x - (anchor === 'start' ? 0 : anchor === 'middle' ? width / 2 : width)
  const parts: string[] = []
  for (const { font: name, codes, width, means } of runs) {
    const from = { x, y: at.y }
    const { x: e, y: f } = toPixels(toPage, from)
    const [a, b, c, d] = near(toPage, from)
    const shown = `${[a, b, -c, -d, e, f].map(num).join(' ')} Tm /${name} ${num(size)} Tf ${num(spacing)} Tc <${codes}> Tj`
    parts.push(actualText(means, shown))
    x += width * size + spacing * (codes.length / 4)
  }
  return `BT ${parts.join(' ')} ET`
}

/** How the map changes near a point: where one point right (a, b) and one point down (c, d) lead, in user space. */
function near(map: Homography, at: PaperPoint): readonly [number, number, number, number] {
  const here = toPixels(map, at)
  const right = toPixels(map, { x: at.x + 1, y: at.y })
  const down = toPixels(map, { x: at.x, y: at.y + 1 })
  return [right.x - here.x, right.y - here.y, down.x - here.x, down.y - here.y]
}
