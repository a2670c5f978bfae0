import type { FileWindow } from './file-window'
import { parseAt } from './read-object'
import { isDict } from './value'
import { XrefTable } from './xref-table'

const overlap = 1024
const space = /[\0\t\n\f\r ]/

/** What going through a whole file finds: where each object begins (the last one of a number holds), and which are object streams. */
export type ScannedObjects = Readonly<{ table: XrefTable; objectStreams: readonly number[] }>

/** Finds a file's objects without its table, by the words that begin them. Only a block of the file is in memory at a time. */
export function scanObjects(file: FileWindow): ScannedObjects {
  const table = new XrefTable()
  const streams = new Set<number>()
  const trailers: number[] = []
  file.forEachBlock(0, overlap, (block, at) => {
    const end = Math.min(block.length, (1 << 20) + overlap / 2)
    const from = at === 0 ? 0 : overlap / 2
    for (let k = block.indexOf('obj', from); k >= 0 && k < end; k = block.indexOf('obj', k + 3)) {
      const found = headBefore(block, k)
      if (!found) continue
      table.replace(found.number, { at: at + found.at, generation: found.generation })
      const head = block.toString('latin1', k + 3, k + 400).split('endobj')[0]!
      if (/\/ObjStm\b/.test(head)) streams.add(found.number)
      else streams.delete(found.number)
      if (/\/XRef\b/.test(head)) trailers.push(at + k + 3)
    }
    for (let k = block.indexOf('trailer', from); k >= 0 && k < end; k = block.indexOf('trailer', k + 7)) trailers.push(at + k + 7)
  })
  for (const at of trailers.slice(-50).reverse()) addTrailer(file, at, table)
  return { table, objectStreams: [...streams] }
}

/** The number and generation that stand before an `obj` at `k`; null when they do not. */
function headBefore(block: Buffer, k: number): { number: number; generation: number; at: number } | null {
  const from = Math.max(0, k - 24)
  const text = block.toString('latin1', from, k)
  const found = /(^|[^0-9])(\d{1,8})[\0\t\n\f\r ]+(\d{1,5})[\0\t\n\f\r ]*$/.exec(text)
  if (!found || (found[1] === '' && from > 0)) return null
  if (found[1] && !space.test(found[1]) && !/[bjmf>]/.test(found[1])) return null
  return { number: Number(found[2]), generation: Number(found[3]), at: from + found.index + found[1]!.length }
}

function addTrailer(file: FileWindow, at: number, table: XrefTable): void {
  try {
    const trailer = parseAt(file, at, (parser) => parser.value())
    if (isDict(trailer)) table.addTrailer(trailer)
  } catch {
    // one of several, or none: pages are found without it
  }
}
