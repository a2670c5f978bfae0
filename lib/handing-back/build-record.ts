import { PDFDocument } from 'pdf-lib'
import type { ModerationRecord, RecordSection, RecordTable } from '@/lib/core/moderation-record'
import { Typesetter } from '@/lib/typesetting/typesetter'
import { describeFile } from '@/lib/typesetting/describe-file'
import { columnWidths } from './column-widths'
import { Shapes } from './shapes'
import { ink, sheetSize, type Sheet, type Style } from './sheet'
import { Structure } from './structure'
import { SummarySheets, frame, leading, plain, small, soft } from './summary-sheets'

const title: Style = { face: 'book', size: 19.5, colour: ink.text }
const heading: Style = { face: 'book', size: 13.5, colour: ink.text }
const cell: Style = { face: 'sans', size: 8.625, colour: ink.text }
const head: Style = { ...cell, colour: ink.soft }
const [cellLeading, padding] = [11.5, 3]
/** Between columns, and the most that spare room widens it to. */
const [leastGap, mostGap] = [8, 24]

/** A moderation record as a PDF, A4, tagged, with the same words as its page. `builtAt` is written into the file. */
export async function buildRecord(record: ModerationRecord, builtAt: Date): Promise<Uint8Array> {
  const pdf = await PDFDocument.create({ updateMetadata: false })
  describeFile(pdf, record.title, builtAt)
  const type = await Typesetter.for(pdf.context)
  const structure = new Structure()
  const sheets = new SummarySheets({ pdf, type, structure, shapes: new Shapes(pdf.context) })
  structure.within('H1', () => wrapped(sheets, record.title, title, 24))
  structure.within('P', () => wrapped(sheets, `${record.where}. As it stood on ${record.asOf}.`, soft, leading))
  for (const section of record.sections) drawSection(sheets, section)
  sheets.sheets.forEach((sheet, k) => drawFoot(sheet, record, k, sheets.sheets.length))
  structure.store(pdf)
  await type.embed()
  return pdf.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity })
}

/** Room for `height` points on this sheet, or the next one. */
function room(sheets: SummarySheets, height: number): void {
  if (sheets.y + height > frame.bottom) sheets.turn()
}

function wrapped(sheets: SummarySheets, words: string, style: Style, by: number): void {
  for (const line of sheets.type.lines(words, style.face, style.size, frame.right - frame.left)) {
    room(sheets, by)
    sheets.y += by
    sheets.sheet.line(line, frame.left, sheets.y - by / 4, style)
  }
}

function drawSection(sheets: SummarySheets, { heading: words, lines, table }: RecordSection): void {
  room(sheets, 80)
  sheets.y += 12
  sheets.structure.within('H2', () => wrapped(sheets, words, heading, 20))
  for (const line of lines) sheets.structure.within('P', () => wrapped(sheets, line, plain, leading))
  if (table && table.rows.length > 0) sheets.structure.within('Table', () => drawRows(sheets, table))
}

function drawRows(sheets: SummarySheets, { heads, rows, figures }: RecordTable): void {
  const widths = columnWidths([heads, ...rows].map((row) => row.map((words) => sheets.type.width(words, cell.face, cell.size))), frame.right - frame.left, leastGap)
  const spare = frame.right - frame.left - widths.reduce((a, b) => a + b, 0)
  const gap = Math.min(mostGap, spare / Math.max(1, widths.length - 1))
  const row = (cells: readonly string[], style: Style, tag: 'TH' | 'TD') => {
    const lines = cells.map((words, k) => sheets.type.lines(words, style.face, style.size, widths[k]! + 0.01))
    const height = Math.max(1, ...lines.map(({ length }) => length)) * cellLeading + 2 * padding
    if (sheets.y + height > frame.bottom) {
      sheets.turn()
      if (tag === 'TD') row(heads, head, 'TH')
    }
    sheets.structure.within('TR', () => {
      let left = frame.left
      lines.forEach((own, k) => {
        const [x, anchor] = figures && k > 0 ? [left + widths[k]!, 'end' as const] : [left, 'start' as const]
        sheets.structure.within(tag, () => own.forEach((line, n) => sheets.sheet.line(line, x, sheets.y + padding + cellLeading * (n + 0.8), style, anchor)))
        left += widths[k]! + gap
      })
    })
    sheets.y += height
    sheets.sheet.rule(frame.left, sheets.y, frame.right, sheets.y, tag === 'TH' ? ink.text : ink.rule)
  }
  sheets.y += 4
  row(heads, head, 'TH')
  for (const cells of rows) row(cells, cell, 'TD')
}

function drawFoot(sheet: Sheet, { title: words }: ModerationRecord, k: number, pages: number): void {
  const y = sheetSize.height - 30
  const [first = ''] = sheet.type.lines(words, 'sans', small.size, frame.right - frame.left - 60)
  sheet.aside(first, frame.left, y, small)
  sheet.aside(`${k + 1} of ${pages}`, frame.right, y, small, 'end')
  sheet.finish()
}
