import { AppError } from '@/lib/core/errors'
import type { FileWindow } from '@/lib/reading/pdf/file-window'

/** The fields of one page of a TIFF, by tag; and where the next page's begin, 0 for the last. */
export type TiffDirectory = Readonly<{ fields: ReadonlyMap<number, readonly number[]>; next: number }>
/** Byte order and size of a TIFF's numbers. */
export type TiffForm = Readonly<{ little: boolean; big: boolean }>

/** Bytes of each type of field (TIFF 6.0, and BigTIFF's from 16 on). */
const sizes: Readonly<Record<number, number>> = { 1: 1, 2: 1, 3: 2, 4: 4, 5: 8, 6: 1, 7: 1, 8: 2, 9: 4, 10: 8, 11: 4, 12: 8, 13: 4, 16: 8, 17: 8, 18: 8 }
const mostValues = 200_000
const mostFields = 1000

/** The form of a TIFF and where its first page's fields begin. Throws file_damaged. */
export function openTiff(file: FileWindow): { form: TiffForm; first: number } {
  const head = file.read(0, 16)
  if (head.length < 16) throw new AppError('file_damaged')
  const little = head[0] === 0x49
  const big = (little ? head.readUInt16LE(2) : head.readUInt16BE(2)) === 43
  const form = { little, big }
  return { form, first: big ? whole(head, 8, 8, form) : whole(head, 4, 4, form) }
}

/** Reads one page's fields; numbers only, fractions as numbers. Throws file_damaged. */
export function readDirectory(file: FileWindow, form: TiffForm, at: number): TiffDirectory {
  const { big } = form
  const count = whole(file.read(at, 8), 0, big ? 8 : 2, form)
  const step = big ? 20 : 12
  const start = at + (big ? 8 : 2)
  const bytes = file.read(start, Math.min(count, mostFields) * step + 8)
  if (at <= 0 || count > mostFields || bytes.length < count * step) throw new AppError('file_damaged')
  const fields = new Map<number, readonly number[]>()
  for (let k = 0; k < count; k++) fields.set(whole(bytes, k * step, 2, form), valuesOf(file, form, bytes, k * step))
  const tail = count * step
  const next = bytes.length >= tail + (big ? 8 : 4) ? whole(bytes, tail, big ? 8 : 4, form) : 0
  return { fields, next }
}

function valuesOf(file: FileWindow, form: TiffForm, bytes: Buffer, at: number): number[] {
  const type = whole(bytes, at + 2, 2, form)
  const count = Math.min(mostValues, whole(bytes, at + 4, form.big ? 8 : 4, form))
  const size = sizes[type]
  if (!size) return []
  const place = at + (form.big ? 12 : 8)
  const room = form.big ? 8 : 4
  const data = size * count <= room ? bytes.subarray(place, place + room) : file.read(whole(bytes, place, room, form), size * count)
  const values: number[] = []
  for (let k = 0; k < count && (k + 1) * size <= data.length; k++)
    values.push(type === 5 || type === 10 ? whole(data, k * 8, 4, form) / (whole(data, k * 8 + 4, 4, form) || 1) : whole(data, k * size, size, form))
  return values
}

function whole(bytes: Buffer, at: number, size: number, { little }: TiffForm): number {
  if (at + size > bytes.length) throw new AppError('file_damaged')
  if (size === 8) return Number(little ? bytes.readBigUInt64LE(at) : bytes.readBigUInt64BE(at))
  return little ? bytes.readUIntLE(at, size) : bytes.readUIntBE(at, size)
}
