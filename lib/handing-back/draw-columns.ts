import { drawTicks } from '@/lib/core/drawing'
import { filled, type Ink } from '@/lib/core/ink'
import { halves } from '@/lib/core/marks'
import { ringOfMark } from '@/lib/core/ring-of-mark'
import { crossShape, tickAnchor } from '@/lib/core/stamp-shapes'
import { ink, type Sheet, type Style } from './sheet'
import type { Branch } from './structure'
import type { Summary } from './summary'
import { frame, leading, plain, type SummarySheets } from './summary-sheets'

/** A piece of a column that is not broken over sheets. */
type Block = Readonly<{ height: number; draw: (sheet: Sheet, x: number, y: number) => void }>

const gutter = 24
const width = (frame.right - frame.left - gutter) / 2
const heading: Style = { face: 'book', size: 13.5, colour: ink.text }
const key: Style = { ...plain, size: 9.375 }

/** What to do next, how the grade came about and model solutions on the left; how to read the marks and how to ask on the right. */
export function drawColumns(sheets: SummarySheets, summary: Summary): void {
  const columns = [leftBlocks(sheets, summary), rightBlocks(sheets, summary)]
  if (sheets.y + 15 + Math.min(160, ...columns.map(heightOf)) > frame.bottom) sheets.turn()
  const start = { sheet: sheets.sheets.length - 1, y: sheets.y + 15 }
  columns.forEach((blocks, k) => {
    let { sheet, y } = start
    for (const block of blocks) {
      if (y + block.height > frame.bottom) {
        sheet += 1
        y = frame.top
        if (sheet === sheets.sheets.length) sheets.turn()
      }
      block.draw(sheets.sheets[sheet]!, frame.left + k * (width + gutter), y)
      y += block.height
    }
  })
}

function heightOf(blocks: readonly Block[]): number {
  return blocks.reduce((sum, block) => sum + block.height, 0)
}

function leftBlocks(sheets: SummarySheets, summary: Summary): Block[] {
  const solutions = summary.solutions.flatMap((line) => line.split('\n')).flatMap((line) => paragraph(sheets, line))
  const first = nextBlocks(sheets, summary)
  if (solutions.length === 0) return first
  return [...first, ...(first.length > 0 ? [{ height: 9, draw: () => undefined }] : []), head(sheets, 'Model solutions'), ...solutions]
}

function nextBlocks(sheets: SummarySheets, { next, gradeSays }: Summary): Block[] {
  const grade = paragraph(sheets, gradeSays)
  if (next.length === 0) return gradeSays === '' ? [] : [head(sheets, 'How the result came about'), ...grade]
  const gap = gradeSays === '' ? [] : [{ height: 6, draw: () => undefined }]
  return [head(sheets, 'What to do next'), ...next.flatMap((line, k) => paragraph(sheets, line, `${k + 1}.`)), ...gap, ...grade]
}

function rightBlocks(sheets: SummarySheets, summary: Summary): Block[] {
  const { pen, codes, asking, questions } = summary
  const tickAt = (worth: number): readonly Ink[] => drawTicks(tickAnchor, halves(worth))
  const sign = (inks: readonly Ink[], scale: number, up: number) => (sheet: Sheet, x: number, y: number) => sheet.stamps([{ pen, inks }], x, y - up, scale, '')
  const nothing = questions.some((question) => question.remark === 'nothing written')
  const ring = ringOfMark(halves(0), pen, { x: 0, y: 0 }).filter((ink) => ink.kind !== 'text')
  const word = (words: string, style: Style) => (sheet: Sheet, x: number, y: number) => void sheet.line(words, x, y, style)
  return [
    head(sheets, 'How to read the marks'),
    legend(sheets, 'one mark', sign(tickAt(2), 0.75, 12)),
    legend(sheets, 'half a mark', sign(tickAt(1).slice(0, 1), 0.75, 12)),
    legend(sheets, 'looked at, no mark', sign([filled(crossShape, { x: 0, y: 0 })], 0.75, 9)),
    legend(sheets, 'mark point not earned', (sheet, x, y) => sheet.circle(x + 3.6, y - 3.4, 2.7, '')),
    legend(sheets, 'the mark of a question, in the margin', sign(ring, 0.4, 9.2)),
    ...(nothing ? [legend(sheets, 'nothing written', word('nr', { face: 'book-italic', size: 9.375, colour: ink.text }))] : []),
    ...codes.map(({ code, means }) => legend(sheets, means, word(code, { ...key, face: 'sans-bold' }))),
    { height: 6, draw: () => undefined },
    ...paragraph(sheets, asking),
  ]
}

function head({ structure }: SummarySheets, words: string): Block {
  return {
    height: 27,
    draw: (sheet, x, y) => {
      structure.within('H2', () => sheet.line(words, x, y + 13, heading))
      sheet.rule(x, y + 21, x + width, y + 21, ink.rule)
    },
  }
}

/** Lines of a paragraph, one block each and one paragraph to a reader, with a number before the first where it is an item of a list. */
function paragraph({ type, structure }: SummarySheets, words: string, number = ''): Block[] {
  const indent = number === '' ? 0 : 15
  let element: Branch | null = null
  return type.lines(words, 'sans', plain.size, width - indent).map((line, k) => ({
    height: leading,
    draw: (sheet, x, y) => {
      element ??= structure.element('P')
      structure.inside(element, () => {
        if (k === 0 && number !== '') sheet.line(number, x + indent - 4, y + 10.9, plain, 'end')
        sheet.line(line, x + indent, y + 10.9, plain)
      })
    },
  }))
}

function legend({ type, structure }: SummarySheets, words: string, sign: (sheet: Sheet, x: number, y: number) => void): Block {
  const lines = type.lines(words, 'sans', key.size, width - 24)
  return {
    height: leading * lines.length,
    draw: (sheet, x, y) =>
      structure.within('P', () => {
        sign(sheet, x, y + 10.9)
        lines.forEach((line, k) => sheet.line(line, x + 24, y + 10.9 + leading * k, key))
      }),
  }
}
