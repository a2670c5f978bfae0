import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync } from 'node:fs'
import { createHash } from 'node:crypto'
import { tmpdir } from 'node:os'
import path from 'node:path'

// What other programs, not written by us, say of a file.

/** The text poppler finds on one page (from 1), or on all. */
export function textOf(pdf: string, page?: number): string {
  return execFileSync('pdftotext', [...(page ? ['-f', String(page), '-l', String(page)] : []), '-layout', pdf, '-'], { encoding: 'utf8' })
}

export function pageCount(pdf: string): number {
  return Number(execFileSync('qpdf', ['--show-npages', pdf], { encoding: 'utf8' }))
}

/** Throws what qpdf says when the file is damaged. */
export function checkPdf(pdf: string): void {
  execFileSync('qpdf', ['--check', pdf], { encoding: 'utf8' })
}

/** SHA-256 of each image of a page as it is stored, by poppler. */
export function imageHashes(pdf: string, from: number, to: number): string[] {
  const folder = mkdtempSync(path.join(tmpdir(), 'sheafmark-images-'))
  execFileSync('pdfimages', ['-all', '-f', String(from), '-l', String(to), pdf, path.join(folder, 'i')])
  return readdirSync(folder).sort().map((name) => createHash('sha256').update(readFileSync(path.join(folder, name))).digest('hex'))
}

/** How many image objects the whole file holds, whether a page shows them or not. */
export function imageObjects(pdf: string): number {
  const { qpdf } = JSON.parse(execFileSync('qpdf', ['--json', '--json-key=qpdf', pdf], { encoding: 'utf8', maxBuffer: 1 << 28 })) as { qpdf: [unknown, Record<string, { stream?: { dict?: Record<string, unknown> } }>] }
  return Object.values(qpdf[1]).filter((object) => object.stream?.dict?.['/Subtype'] === '/Image').length
}
