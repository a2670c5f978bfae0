import { boundsOf, filled, line, runWidth, stepsOf, text, type Ink } from './ink'
import { sayMark, type HalfMarks } from './marks'
import { noteLeading, noteLines, noteSize } from './note-lines'
import type { PaperPoint, PaperRect } from './paper-space'
import { bowedLine, penLine, wavyLine } from './pen-lines'
import type { Stamp } from './stamp'
import { caretAnchor, caretShape, crossAnchor, crossShape, halfShape, ringShape, tickAnchor, tickShape } from './stamp-shapes'

/** The size of a ring or line pressed without being drawn out, in points. */
const ringSize = { w: 52, h: 30 }
const lineLength = 58
/** From one tick of a stamp to the next, and how many are drawn before a figure says the rest. */
const tickPitch = 13
const mostTicks = 3

/**
 * The ink of a stamp in paper points, in drawing order: the one description of its shape. What it is worth can be read off it: a tick or
 * half tick is drawn as many ticks as it is worth, any other stamp with a worth carries it as a small figure. Never throws.
 */
export function drawStamp(stamp: Stamp): readonly Ink[] {
  const at = { x: stamp.x, y: stamp.y }
  if (stamp.kind === 'tick' || stamp.kind === 'half') return drawTicks(at, stamp.worth)
  if (stamp.kind === 'mark') return typedMark(at, stamp.worth)
  if (stamp.kind === 'nought') return [figure('0', at, 13)]
  return withWorth(remark(stamp, at), stamp.worth)
}

/** The box round a stamp's ink in paper points, for hit tests; null when it has none (an empty note or pen line). */
export function boundsOfStamp(stamp: Stamp): PaperRect | null {
  return boundsOf(drawStamp(stamp))
}

/** Ticks and a half tick adding up to the worth, the first held at `at`; beyond three, one tick and its worth as a figure. */
export function drawTicks(at: PaperPoint, worth: HalfMarks): readonly Ink[] {
  const whole = Math.floor(worth / 2)
  if (worth === 0 || Math.ceil(worth / 2) > mostTicks) return [...tick(tickShape, at), worthBy(sayMark(worth), at)]
  const next = { x: at.x + whole * tickPitch, y: at.y }
  const full = Array.from({ length: whole }, (_, k) => tick(tickShape, { x: at.x + k * tickPitch, y: at.y })).flat()
  return worth % 2 === 0 ? full : [...full, ...tick(halfShape, next), worthBy('½', next)]
}

function tick(shape: string, at: PaperPoint): Ink[] {
  return [filled(shape, { x: at.x - tickAnchor.x, y: at.y - tickAnchor.y })]
}

/** The small bold figure at the foot of a tick: its left end at (18.6, 17) of the tick's frame. */
function worthBy(words: string, at: PaperPoint): Ink {
  return text(words, { x: at.x + 18.6 - tickAnchor.x, y: at.y + 17 - tickAnchor.y }, 'worth', 8)
}

/** A figure whose middle is `at`: capitals of the sans are two thirds of the size high. */
function figure(words: string, at: PaperPoint, size: number): Ink {
  return text(words, { x: at.x, y: at.y + size / 3 }, 'figure', size, 'middle')
}

/** A mark given as one figure, its middle at the anchor, with a bowed line under it so that it is not taken for writing. */
function typedMark(at: PaperPoint, worth: HalfMarks): Ink[] {
  const run = text(sayMark(worth), { x: at.x, y: at.y + 17 / 3 }, 'figure', 17, 'middle')
  const w = runWidth(run) + 6
  return [run, bowedLine({ x: at.x - w / 2, y: at.y + 11 }, w)]
}

/** The stamps that say something without being a mark, each held where its type or line begins. */
function remark(stamp: Stamp, at: PaperPoint): Ink[] {
  switch (stamp.kind) {
    case 'cross':
      return [filled(crossShape, { x: at.x - crossAnchor.x, y: at.y - crossAnchor.y })]
    case 'ring':
      return [line(stepsOf(ringShape, at, { x: stamp.w || ringSize.w, y: stamp.h || ringSize.h }))]
    case 'underline':
      return [bowedLine(at, stamp.w || lineLength)]
    case 'wavy':
      return [wavyLine(at, stamp.w || lineLength)]
    case 'caret':
      return caret(stamp.text, at)
    case 'seen':
      return [text('seen', at, 'note', noteSize), bowedLine({ x: at.x - 2, y: at.y + 4.5 }, 27)]
    case 'nothing-written':
      return [text('nr', at, 'note', noteSize, 'middle')]
    case 'code':
      return code(stamp.text, at)
    case 'pen':
      return penLine(stamp.path)
    default:
      return note(stamp.text, at)
  }
}

/** The missing words stand over the caret in note type, their first letter 14 points left of it, the last line 10 above it. */
function caret(words: string, at: PaperPoint): Ink[] {
  const corner = { x: at.x - caretAnchor.x, y: at.y - caretAnchor.y }
  const lift = 10 + (noteLines(words).length - 1) * noteLeading
  return [filled(caretShape, corner), ...note(words, { x: corner.x - 14, y: corner.y - lift })]
}

/** A text code: bold, a little open, on a thin line as long as itself. */
function code(words: string, at: PaperPoint): Ink[] {
  const run = text(words, at, 'code', 9, 'start', 0.18)
  const y = at.y + 2.4
  return words === '' ? [] : [run, line([['M', at.x, y], ['L', at.x + runWidth(run), y]], 0.8)]
}

function note(words: string, at: PaperPoint): Ink[] {
  return noteLines(words).map((words, k) => text(words, { x: at.x, y: at.y + k * noteLeading }, 'note', noteSize))
}

/** A ring, code or note that earned something says how much, after its end. */
function withWorth(inks: Ink[], worth: HalfMarks): Ink[] {
  const box = worth > 0 ? boundsOf(inks) : null
  return box ? [...inks, text(sayMark(worth), { x: box.x + box.w + 2, y: box.y + box.h }, 'worth', 8)] : inks
}
