import { PDFDocument, PDFName } from 'pdf-lib'
import type { Face } from '@/lib/typesetting/font-files'
import { num, packed } from '@/lib/typesetting/operators'
import { setLine } from '@/lib/typesetting/set-line'
import { Typesetter } from '@/lib/typesetting/typesetter'
import { describeFile } from '@/lib/typesetting/describe-file'

/** What a student needs to sign in for the first time. */
export type PrintedSlip = Readonly<{ name: string; userName: string; code: string }>
export type SlipSheets = Readonly<{ slips: readonly PrintedSlip[]; sheet: 'a4' | 'letter'; className: string; school: string; address: string; builtAt: Date }>

const sheetSizes = { a4: { width: 595.28, height: 841.89 }, letter: { width: 612, height: 792 } }
/** No printer reaches the edge of a sheet; a strip is high enough to be found in a pencil case. */
const margin = 34
const stripHeight = 96
/** Where a strip's figures begin, from its left. */
const figures = 300

/** Slips to print and cut: a strip a student across the sheet, a dashed line between two, as many as a sheet holds. */
export async function buildSlips({ slips, sheet, className, school, address, builtAt }: SlipSheets): Promise<Uint8Array> {
  const pdf = await PDFDocument.create({ updateMetadata: false })
  describeFile(pdf, `Sign-in slips, ${className}`, builtAt)
  const type = await Typesetter.for(pdf.context)
  const { width, height } = sheetSizes[sheet]
  const onSheet = Math.floor((height - 2 * margin) / stripHeight)
  for (let from = 0; from < slips.length; from += onSheet) {
    const strips = slips.slice(from, from + onSheet)
    const ink = strips.map((slip, k) => strip(slip, { className, school, address }, height - margin - k * stripHeight, width, type))
    const page = pdf.addPage([width, height])
    page.node.set(PDFName.of('Contents'), packed(pdf.context, [...ink, cuts(strips.length, width, height)].join('\n')))
    page.node.set(PDFName.of('Resources'), pdf.context.obj({ Font: type.resources() }))
  }
  await type.embed()
  return pdf.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity })
}

type Where = Pick<SlipSheets, 'className' | 'school' | 'address'>

/** One strip, its upper edge at `top` in user space. */
function strip({ name, userName, code }: PrintedSlip, { className, school, address }: Where, top: number, width: number, type: Typesetter): string {
  const room = figures - margin - 14
  const line = (words: string, face: Face, size: number, x: number, down: number): string => setLine(words, face, size, x, top - down, type)
  const [first = ''] = type.lines(name, 'book', 15, room)
  const how = type.lines(`Go to ${address}/new-password and type the code. It works once. Then choose a password; from then on sign in with your user name.`, 'sans', 9.5, room)
  return [
    line(first, 'book', 15, margin, 27), line(`${className}, ${school}`, 'sans', 9.5, margin, 42),
    ...how.slice(0, 3).map((words, k) => line(words, 'sans', 9.5, margin, 58 + 13 * k)),
    line('Code, once', 'sans', 9.5, figures, 27), ...fitted(code, figures + 70, 27, width, line, type),
    line('User name', 'sans', 9.5, figures, 55), ...fitted(userName, figures + 70, 55, width, line, type),
  ].join('\n')
}

/** A figure to be typed in, as large as it fits. */
function fitted(words: string, x: number, down: number, width: number, line: (words: string, face: Face, size: number, x: number, down: number) => string, type: Typesetter): string[] {
  const size = [16, 14, 12, 10, 8].find((size) => type.width(words, 'sans-strong', size) <= width - margin - x) ?? 6
  return [line(words, 'sans-strong', size, x, down)]
}

function cuts(strips: number, width: number, height: number): string {
  const at = Array.from({ length: strips }, (_, k) => num(height - margin - (k + 1) * stripHeight))
  return `q 0.5 G 0.6 w [4 3] 0 d ${at.map((y) => `0 ${y} m ${num(width)} ${y} l`).join(' ')} S Q`
}
