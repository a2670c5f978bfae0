import { createHash } from 'node:crypto'
import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** A file of these bytes in a folder of its own, for tools that read files. */
export function asFile(bytes: Uint8Array): string {
  const path = join(mkdtempSync(join(tmpdir(), 'sheafmark-pdf-')), 'file.pdf')
  writeFileSync(path, bytes)
  return path
}

function run(tool: string, ...args: string[]): string {
  return execFileSync(tool, args, { encoding: 'utf8', maxBuffer: 1e9, stdio: ['ignore', 'pipe', 'pipe'] })
}

/** Throws with qpdf's words when the file is not clean. */
export function assertClean(file: string): void {
  run('qpdf', '--check', file)
}

/** Every object in the file, as qpdf writes it in JSON. */
export function objectsOf(file: string): string[] {
  const { qpdf } = JSON.parse(run('qpdf', '--json', file)) as { qpdf: [unknown, Record<string, unknown>] }
  return Object.entries(qpdf[1]).filter(([name]) => name.startsWith('obj:')).map(([, value]) => JSON.stringify(value))
}

/** How many image objects lie in the file, drawn or not. */
export function imageCount(file: string): number {
  return objectsOf(file).filter((object) => object.includes('"/Subtype":"/Image"')).length
}

/** The pictures of a file, each as a JPEG file where it is coded so and as PNG otherwise. */
export function picturesOf(file: string, first = 1, last = 1000): Buffer[] {
  const folder = mkdtempSync(join(tmpdir(), 'sheafmark-images-'))
  run('pdfimages', '-j', '-png', '-f', String(first), '-l', String(last), file, join(folder, 'image'))
  return readdirSync(folder).sort().map((name) => readFileSync(join(folder, name)))
}

/** The image streams as they are coded in the file, page by page, each by its SHA-256. */
export function codedImages(file: string, first = 1, last = 1000): string[] {
  const folder = mkdtempSync(join(tmpdir(), 'sheafmark-images-'))
  run('pdfimages', '-all', '-f', String(first), '-l', String(last), file, join(folder, 'image'))
  return readdirSync(folder).sort().map((name) => createHash('sha256').update(readFileSync(join(folder, name))).digest('hex'))
}

export function wordsOf(file: string, page: number): string {
  return run('pdftotext', '-layout', '-f', String(page), '-l', String(page), file, '-')
}

export function fontLines(file: string): string[] {
  return run('pdffonts', file).split('\n').slice(2).filter((line) => line !== '')
}

/** Width and height of a file's first page in whole points. */
export function pageSizeOf(file: string): string {
  const [, width, height] = /Page size:\s+([\d.]+) x ([\d.]+)/.exec(run('pdfinfo', file))!
  return `${Math.round(Number(width))} x ${Math.round(Number(height))}`
}

/** The bookmarks of a file, outermost ones only. */
export function bookmarksOf(file: string): string[] {
  const { outlines } = JSON.parse(run('qpdf', '--json', '--json-key=outlines', file)) as { outlines: { title: string }[] }
  return outlines.map(({ title }) => title)
}

export function pageCountOf(file: string): number {
  return Number(run('qpdf', '--show-npages', file))
}

export type InkBox = { left: number; right: number; top: number; bottom: number; lowestX: number; width: number; height: number }

/** Where green ink lies on a page drawn at 200 dpi by poppler or mupdf, in pixels, and how large the picture is; edges are pixel edges. */
export function greenInk(file: string, page: number, by: 'poppler' | 'mupdf' = 'poppler'): InkBox {
  const folder = mkdtempSync(join(tmpdir(), 'sheafmark-drawn-'))
  if (by === 'poppler') run('pdftoppm', '-r', '200', '-f', String(page), '-l', String(page), '-singlefile', file, join(folder, 'page'))
  else run('mutool', 'draw', '-q', '-r', '200', '-c', 'rgb', '-o', join(folder, 'page.ppm'), file, String(page))
  const { data, width, height } = pixelsOf(readFileSync(join(folder, 'page.ppm')))
  const seen: { x: number; y: number }[] = []
  for (let k = 0; k < width * height; k++) {
    if (data[3 * k + 1]! - data[3 * k]! > 45) seen.push({ x: k % width, y: Math.floor(k / width) })
  }
  const xs = seen.map(({ x }) => x)
  const ys = seen.map(({ y }) => y)
  const bottom = Math.max(...ys)
  const lowest = seen.filter(({ y }) => y === bottom)
  const lowestX = lowest.reduce((total, { x }) => total + x, 0) / lowest.length
  return { left: Math.min(...xs), right: Math.max(...xs) + 1, top: Math.min(...ys), bottom: bottom + 1, lowestX, width, height }
}

export type ListedAnnotation = Readonly<{ type: string; author: string; contents: string; modified: number }>

/** The annotations of a page as mupdf lists them, dates in milliseconds. */
export function annotationsOf(file: string, page: number): ListedAnnotation[] {
  const script = join(mkdtempSync(join(tmpdir(), 'sheafmark-list-')), 'list.js')
  writeFileSync(script, `var page = new PDFDocument(scriptArgs[0]).loadPage(Number(scriptArgs[1]) - 1)
print(JSON.stringify(page.getAnnotations().map(function (one) { return { type: one.getType(), author: one.getAuthor(), contents: one.getContents(), modified: Number(one.getModificationDate()) } })))`)
  return JSON.parse(run('mutool', 'run', script, file, String(page))) as ListedAnnotation[]
}

/** The pixels of a PPM file: "P6", width, height, 255, then red, green, blue. */
function pixelsOf(ppm: Buffer): { data: Buffer; width: number; height: number } {
  const [head, width, height] = /^P6\s+(\d+)\s+(\d+)\s+255\s/.exec(ppm.toString('latin1', 0, 40))!
  return { data: ppm.subarray(head.length), width: Number(width), height: Number(height) }
}
