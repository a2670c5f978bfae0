import { PDFiumLibrary } from '@hyzyla/pdfium'
import { AppError } from '@/lib/core/errors'

/** The engine's own calls that are used here; the wrapper package keeps them behind its classes. */
type Calls = {
  _FPDF_LoadMemDocument(bytes: number, size: number, password: number): number
  _FPDF_GetLastError(): number
  _FPDF_CloseDocument(document: number): void
  _FPDF_GetPageCount(document: number): number
  _FPDF_LoadPage(document: number, index: number): number
  _FPDF_ClosePage(page: number): void
  _FPDF_GetPageBoundingBox(page: number, rect: number): number
  _FPDFPage_GetRotation(page: number): number
  _FPDFPage_CountObjects(page: number): number
  _FPDFPage_GetObject(page: number, index: number): number
  _FPDFPageObj_GetType(object: number): number
  _FPDFPageObj_GetMatrix(object: number, matrix: number): number
  _FPDFFormObj_CountObjects(form: number): number
  _FPDFFormObj_GetObject(form: number, index: number): number
  _FPDFImageObj_GetBitmap(object: number): number
  _FPDFImageObj_GetImagePixelSize(object: number, width: number, height: number): number
  _FPDFBitmap_CreateEx(width: number, height: number, format: number, first: number, stride: number): number
  _FPDFBitmap_FillRect(bitmap: number, left: number, top: number, width: number, height: number, colour: number): void
  _FPDFBitmap_Destroy(bitmap: number): void
  _FPDF_RenderPageBitmapWithMatrix(bitmap: number, page: number, matrix: number, clip: number, flags: number): void
  wasmExports: { malloc(size: number): number; free(at: number): void; memory: WebAssembly.Memory }
  HEAPU8: Uint8Array
}
export type Pdfium = Calls

/** The engine may take this much memory: a page of the most pixels, its picture, and what stands between. */
const mostBytes = 900 << 20
/** An engine that has grown beyond this is let go of: its memory never shrinks. */
const mostKept = 192 << 20
const blockBytes = 65536

let loading: Promise<Calls> | null = null
/** The PDF engine, loaded once a thread. */
export function pdfium(): Promise<Pdfium> {
  loading ??= PDFiumLibrary.init().then((library) => limited((library as unknown as { module: Calls }).module))
  return loading
}

/** Takes a fresh engine for what follows. */
export function resetPdfium(): void {
  loading = null
}

function limited(engine: Calls): Calls {
  const { memory } = engine.wasmExports
  const grow = memory.grow.bind(memory)
  memory.grow = (blocks) => {
    if (memory.buffer.byteLength + blocks * blockBytes > mostBytes) throw new RangeError('a page takes too much memory')
    return grow(blocks)
  }
  return engine
}

const wrongPassword = 4

/** A document in the engine's memory. Close it after use. */
export type OpenDocument = Readonly<{ engine: Pdfium; document: number; close: () => void }>

/** Opens a document from its bytes, in one or more pieces. Throws file_encrypted when it asks for a password, file_damaged when it cannot be read. */
export async function openDocument(bytes: Uint8Array | readonly Uint8Array[]): Promise<OpenDocument> {
  const parts = bytes instanceof Uint8Array ? [bytes] : bytes
  const size = parts.reduce((total, part) => total + part.length, 0)
  const engine = await pdfium()
  const at = engine.wasmExports.malloc(size)
  if (!at) throw new AppError('file_too_large')
  let to = at
  for (const part of parts) {
    engine.HEAPU8.set(part, to)
    to += part.length
  }
  const document = loaded(engine, at, size)
  const close = () => {
    // an engine that gave up does not let itself be tidied either
    try {
      engine._FPDF_CloseDocument(document)
      engine.wasmExports.free(at)
    } catch {
      resetPdfium()
    }
    if (engine.HEAPU8.length > mostKept) resetPdfium()
  }
  return { engine, document, close }
}

function loaded(engine: Pdfium, at: number, size: number): number {
  try {
    const document = engine._FPDF_LoadMemDocument(at, size, 0)
    if (document) return document
  } catch {
    resetPdfium()
    throw new AppError('file_damaged')
  }
  const error = engine._FPDF_GetLastError()
  engine.wasmExports.free(at)
  throw new AppError(error === wrongPassword ? 'file_encrypted' : 'file_damaged')
}

/** Lends `floats` 32-bit numbers of the engine's memory to `work`, which gets their address and a reader. */
export function withFloats<T>(engine: Pdfium, values: readonly number[], work: (at: number, read: () => number[]) => T): T {
  const at = engine.wasmExports.malloc(values.length * 4)
  const view = () => new DataView(engine.HEAPU8.buffer, at, values.length * 4)
  values.forEach((value, k) => view().setFloat32(k * 4, value, true))
  try {
    return work(at, () => values.map((_, k) => view().getFloat32(k * 4, true)))
  } finally {
    engine.wasmExports.free(at)
  }
}
