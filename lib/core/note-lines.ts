import { widthOf } from './text-widths'

/** The widest line of a note, in points. */
export const noteWidth = 160
export const noteSize = 10.5
export const noteLeading = 12.5

/**
 * A note's lines as they are drawn: at most `noteWidth` points wide, broken at spaces, at the person's own line ends, and inside a word
 * only where it is wider than a line. An empty note has no lines.
 */
export function noteLines(text: string): string[] {
  return text.trim() === '' ? [] : text.trim().split(/\r\n|\r|\n/).flatMap(wrapped)
}

function wrapped(paragraph: string): string[] {
  const lines: string[] = []
  let line = ''
  for (const word of paragraph.split(/\s+/).flatMap(pieces)) {
    const longer = line === '' ? word : `${line} ${word}`
    if (line !== '' && !fits(longer)) lines.push(line)
    line = line !== '' && !fits(longer) ? word : longer
  }
  return [...lines, line]
}

/** Cuts a word that is wider than a line. */
function pieces(word: string): string[] {
  const cut: string[] = []
  let piece = ''
  for (const letter of word) {
    if (piece !== '' && !fits(piece + letter)) {
      cut.push(piece)
      piece = ''
    }
    piece += letter
  }
  return [...cut, piece]
}

function fits(line: string): boolean {
  return widthOf(line, 'note', noteSize) <= noteWidth
}
