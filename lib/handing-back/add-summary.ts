import { sayMark } from '@/lib/core/marks'
import { ringOfMark } from '@/lib/core/ring-of-mark'
import { ink, sheetSize, type Sheet, type SheetFile, type Style } from './sheet'
import type { Summary } from './summary'
import { drawColumns } from './draw-columns'
import { SummarySheets, frame, leading, small, soft } from './summary-sheets'
import { drawTable } from './draw-table'

/** Draws the summary and returns how many sheets it took. `following` is how many pages of the script come after it. */
export function addSummary(file: SheetFile, summary: Summary, following: number): number {
  const sheets = new SummarySheets(file)
  drawHead(sheets, summary)
  drawWho(sheets, summary)
  drawTable(sheets, summary)
  drawColumns(sheets, summary)
  sheets.sheets.forEach((sheet, k) => drawFoot(sheet, summary, k, sheets.sheets.length + following))
  return sheets.sheets.length
}

const title: Style = { face: 'book', size: 19.5, colour: ink.text }
const ringScale = 52.5 / 44

function drawHead(sheets: SummarySheets, summary: Summary): void {
  const { sheet, structure, type } = sheets
  const result: Style = { face: 'book', size: 13.5, colour: ink.text }
  const share = summary.percent === null ? '' : `, ${summary.percent}%`
  const says = [`of ${sayMark(summary.maximum)}${share}`, ...(summary.grade === null ? [] : [`grade ${summary.grade}`])]
  const column = Math.max(...says.map((line) => type.width(line, 'book', 13.5)))
  const ringLeft = frame.right - column - 11 - 52.5
  const lines = type.lines(summary.title, 'book', title.size, ringLeft - 16 - frame.left)
  const height = Math.max(24 * lines.length + leading, 18 * says.length, 36)
  const top = sheets.y + height
  structure.within('H1', () => lines.forEach((line, k) => sheet.line(line, frame.left, top - leading - 24 * (lines.length - 1 - k) - 6, title)))
  structure.within('P', () => type.lines(summary.where, 'sans', soft.size, ringLeft - 16 - frame.left).slice(0, 1).forEach((line) => sheet.line(line, frame.left, top - 3, soft)))
  structure.within('P', () => {
    const drawing = { pen: summary.pen, inks: ringOfMark(summary.total, summary.pen, { x: 0, y: 0 }) }
    sheet.stamps([drawing], ringLeft, top - Math.max(18 * says.length, 36) / 2 - 18, ringScale, `total ${sayMark(summary.total)}`)
    says.forEach((line, k) => sheet.line(line, frame.right, top - 18 * (says.length - 1 - k) - 4, result, 'end'))
  })
  sheets.y = top + 9
  sheet.rule(frame.left, sheets.y, frame.right, sheets.y, ink.text)
}

function drawWho(sheets: SummarySheets, { student, candidateNumber, about }: Summary): void {
  const { sheet, structure, type } = sheets
  const name: Style = { face: 'sans-strong', size: 11.25, colour: ink.text }
  const number = candidateNumber === '' ? '' : `, candidate ${candidateNumber}`
  const numberWidth = type.width(number, 'sans', soft.size)
  const names = type.lines(student, 'sans-strong', name.size, frame.right - frame.left - numberWidth)
  let y = sheets.y + 7.5 + 11
  structure.within('P', () =>
    names.forEach((line, k) => {
      const width = sheet.line(line, frame.left, y + 16 * k, name)
      if (k === names.length - 1) sheet.line(number, frame.left + width, y + 16 * k, soft)
    }),
  )
  y += 16 * (names.length - 1)
  const lastName = type.width(names.at(-1) ?? '', 'sans-strong', name.size) + numberWidth
  const beside = type.width(about, 'sans', soft.size) <= frame.right - frame.left - lastName - 20
  structure.within('P', () => {
    if (beside) sheet.line(about, frame.right, y, soft, 'end')
    else for (const line of type.lines(about, 'sans', soft.size, frame.right - frame.left)) sheet.line(line, frame.left, (y += leading), soft)
  })
  sheets.y = y + 4 + 13.5
}

function drawFoot(sheet: Sheet, summary: Summary, k: number, pages: number): void {
  const y = sheetSize.height - 27
  sheet.rule(frame.left, y - 17, frame.right, y - 17, ink.rule)
  const says = k === 0 ? (summary.copies ?? 'The pages that follow are your own pages, unchanged, with the marking drawn over them.') : summary.student
  const [first = ''] = sheet.type.lines(says, 'sans', small.size, frame.right - frame.left - 60)
  sheet.aside(first, frame.left, y - 3, small)
  sheet.aside(`${k + 1} of ${pages}`, frame.right, y - 3, small, 'end')
  sheet.finish()
}
