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
  _FPDFImageObj_GetImagePixelSize(object: number, width: number, height: number): number
  _FPDFBitmap_CreateEx(width: number, height: number, format: number, first: number, stride: number): number
  _FPDFBitmap_FillRect(bitmap: number, left: number, top: number, width: number, height: number, colour: number): void
  _FPDFBitmap_Destroy(bitmap: number): void
  _FPDF_RenderPageBitmapWithMatrix(bitmap: number, page: number, matrix: number, clip: number, flags: number): void
  wasmExports: { malloc(size: number): number; free(at: number): void }
  HEAPU8: Uint8Array
}
export type Pdfium = Calls

let loading: Promise<Calls> | null = null
/** The PDF engine, loaded once a thread. */
export function pdfium(): Promise<Pdfium> {
  loading ??= PDFiumLibrary.init().then((library) => (library as unknown as { module: Calls }).module)
  return loading
}

const wrongPassword = 4

/** A document in the engine's memory. Close it after use. */
export type OpenDocument = Readonly<{ engine: Pdfium; document: number; close: () => void }>

/** Opens a document from its bytes. Throws file_encrypted when it asks for a password, file_damaged when it cannot be read. */
export async function openDocument(bytes: Uint8Array): Promise<OpenDocument> {
  const engine = await pdfium()
  const at = engine.wasmExports.malloc(bytes.length)
  if (!at) throw new AppError('file_too_large')
  engine.HEAPU8.set(bytes, at)
  const document = engine._FPDF_LoadMemDocument(at, bytes.length, 0)
  if (!document) {
    const error = engine._FPDF_GetLastError()
    engine.wasmExports.free(at)
    throw new AppError(error === wrongPassword ? 'file_encrypted' : 'file_damaged')
  }
  const close = () => {
    engine._FPDF_CloseDocument(document)
    engine.wasmExports.free(at)
  }
  return { engine, document, close }
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
