import { sayMark, type HalfMarks } from '@/lib/core/marks'
import { penColour } from '@/lib/core/ink'
import { flowPoints, drawPoints, type PointLine } from './summary-points'
import { ink, type Style } from './sheet'
import type { QuestionResult, Summary } from './summary'
import { frame, leading, plain, small, type SummarySheets } from './summary-sheets'

/** Where the table's columns lie, in points. `wholeEnd` is where whole figures end and the half hangs. */
type Columns = Readonly<{ bodyLeft: number; bodyRight: number; marginLeft: number; wholeEnd: number; ofLeft: number }>
/** A row ready to be drawn: its words broken into lines. */
type Row = Readonly<{ label: string; points: readonly PointLine[]; comments: readonly string[]; says: string[]; mark: HalfMarks | null; signed: boolean; goesOn: boolean; of: string; strong: boolean; height: number }>

const figure: Style = { face: 'sans-strong', size: 11.25, colour: ink.text }
const label: Style = { face: 'book', size: 11.25, colour: ink.text }
const padding = 3.75

/** What earned each mark, question by question, then the sum; goes on to further sheets under the same head. */
export function drawTable(sheets: SummarySheets, summary: Summary): void {
  const columns = columnsFor(sheets, summary)
  const rows = [...summary.questions.flatMap((question) => broken(questionRow(sheets, question, columns))), ...sumRows(sheets, summary, columns)]
  sheets.structure.within('Table', () => {
    let top = drawHeads(sheets, columns)
    rows.forEach((row, k) => {
      // The sum never stands alone on a sheet.
      const needed = row.height + (rows[k + 1]?.strong ? rows.slice(k + 1).reduce((sum, next) => sum + next.height, 0) : 0)
      if (sheets.y + needed > frame.bottom && sheets.y > top + 20) {
        drawMargin(sheets, columns, top)
        sheets.turn()
        top = drawHeads(sheets, columns)
      }
      drawRow(sheets, row, columns, summary)
    })
    drawMargin(sheets, columns, top)
  })
}

function columnsFor({ type }: SummarySheets, { questions, total, ticks, maximum }: Summary): Columns {
  const widest = (words: string[], face: Style['face'], size: number): number => Math.max(...words.map((word) => type.width(word, face, size)))
  const labels = Math.min(90, widest(['', ...questions.map((question) => question.label)], 'book', label.size))
  const marks = [total, ticks, ...questions.map((question) => question.mark ?? ticks)]
  const whole = Math.max(1.35 * figure.size, widest(marks.map((mark) => sayMark(mark).replace('½', '')), 'sans-strong', figure.size))
  const of = widest([maximum, ...questions.map((question) => question.maximum)].map((mark) => `of ${sayMark(mark)}`), 'sans', small.size)
  const ofLeft = frame.right - of
  const wholeEnd = ofLeft - 5.25 - 0.92 * figure.size
  const marginLeft = wholeEnd - whole - 13.5
  return { bodyLeft: frame.left + Math.max(33, labels + 9), bodyRight: marginLeft - 10, marginLeft, wholeEnd, ofLeft }
}

function questionRow({ type }: SummarySheets, question: QuestionResult, columns: Columns): Row {
  const room = columns.bodyRight - columns.bodyLeft
  const points = flowPoints(type, question.points, room)
  const says = question.remark === null ? [] : type.lines(question.remark, 'sans', plain.size, room)
  const comments = question.comments.flatMap((comment) => comment.split('\n')).flatMap((comment) => type.lines(comment, 'book-italic', plain.size, room))
  const count = Math.max(1, points.length + says.length + comments.length)
  return { label: question.label, points, comments, says, mark: question.mark, signed: false, goesOn: false, of: `of ${sayMark(question.maximum)}`, strong: false, height: count * leading + 2 * padding }
}

/** A row with more comments than a sheet holds goes on in rows without label and mark. */
function broken(row: Row): Row[] {
  const most = Math.max(5, 35 - row.points.length - row.says.length)
  if (row.comments.length <= most) return [row]
  const rest = row.comments.slice(most)
  const first = { ...row, comments: row.comments.slice(0, most), height: row.height - rest.length * leading }
  return [first, ...broken({ ...row, label: '', points: [], says: [], comments: rest, goesOn: true, height: rest.length * leading + 2 * padding })]
}

/** The sum of the ticks; where something was adjusted, each adjustment and what comes of it. */
function sumRows({ type }: SummarySheets, { ticks, adjustments, total, maximum }: Summary, columns: Columns): Row[] {
  const row = (words: string, mark: HalfMarks, of: string, signed = false): Row => {
    const says = type.lines(words, 'sans-strong', plain.size, columns.bodyRight - columns.bodyLeft)
    return { label: '', points: [], comments: [], says, mark, signed, goesOn: false, of, strong: true, height: says.length * leading + 2 * padding }
  }
  const of = `of ${sayMark(maximum)}`
  const sum = row('The sum of the ticks on the pages that follow', ticks, adjustments.length === 0 ? of : '')
  return adjustments.length === 0 ? [sum] : [sum, ...adjustments.map(({ says, by }) => row(says, by, '', true)), row('Total', total, of)]
}

/** Column heads; returns where the margin rule begins. */
function drawHeads(sheets: SummarySheets, columns: Columns): number {
  const { sheet, structure } = sheets
  const top = sheets.y
  structure.within('TR', () => {
    structure.within('TH', () => sheet.line('part', frame.left, top + 10.5, small))
    structure.within('TH', () => sheet.line('what earned it', columns.bodyLeft, top + 10.5, small))
    structure.within('TH', () => sheet.line('mark', columns.marginLeft + 13.5, top + 10.5, small))
  })
  sheets.y = top + 15
  sheet.rule(frame.left, sheets.y, frame.right, sheets.y, ink.text)
  return top
}

/** The double rule that parts off the right margin, down to where the table is filled. */
function drawMargin({ sheet, y }: SummarySheets, { marginLeft }: Columns, top: number): void {
  for (const x of [marginLeft, marginLeft + 1.7]) sheet.rule(x, top, x, y, ink.edge)
}

function drawRow(sheets: SummarySheets, row: Row, columns: Columns, summary: Summary): void {
  const { sheet, structure } = sheets
  const first = sheets.y + padding + 10.9
  let y = first
  structure.within('TR', () => {
    structure.within('TD', () => sheet.line(row.label, frame.left, first + 0.4, label))
    structure.within('TD', () => {
      drawPoints(sheet, row.points, columns.bodyLeft, y, summary.pen)
      y += row.points.length * leading
      const style: Style = row.strong ? { ...plain, face: 'sans-strong' } : { ...plain, colour: ink.soft }
      for (const line of row.says) y = drawn(() => sheet.line(line, columns.bodyLeft, y, style), y)
      for (const line of row.comments) y = drawn(() => sheet.line(line, columns.bodyLeft, y, { face: 'book-italic', size: plain.size, colour: penColour[summary.pen] }), y)
    })
    structure.within('TD', () => !row.goesOn && drawMark(sheets, row, columns, first, row.strong ? ink.text : penColour[summary.pen]))
  })
  sheets.y += row.height
  if (!row.strong) sheet.rule(frame.left, sheets.y, frame.right, sheets.y, ink.rule)
}

function drawn(draw: () => void, y: number): number {
  draw()
  return y + leading
}

/** Whole figures end in one line and the half hangs after them. */
function drawMark({ sheet }: SummarySheets, { mark, signed, of }: Row, { wholeEnd, ofLeft }: Columns, baseline: number, hex: string): void {
  const style = { ...figure, colour: hex }
  if (mark === null) sheet.line('–', wholeEnd, baseline, style, 'end')
  else {
    sheet.line((signed && mark > 0 ? '+' : '') + sayMark(mark).replace('½', ''), wholeEnd, baseline, style, 'end')
    if (mark % 2 !== 0) sheet.line('½', wholeEnd + 0.06 * style.size, baseline, style)
  }
  if (of !== '') sheet.line(of, ofLeft, baseline, small)
}
