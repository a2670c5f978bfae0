import type { PDFDocumentProxy } from 'pdfjs-dist'

/** What the reader needs besides itself for scans in black and white or JPEG 2000, from this school's own machine. */
const decoders: Readonly<Record<string, string>> = {
  'jbig2.wasm': new URL('pdfjs-dist/wasm/jbig2.wasm', import.meta.url).toString(),
  'openjpeg.wasm': new URL('pdfjs-dist/wasm/openjpeg.wasm', import.meta.url).toString(),
  'qcms_bg.wasm': new URL('pdfjs-dist/wasm/qcms_bg.wasm', import.meta.url).toString(),
}

class OwnFiles {
  async fetch({ filename }: { filename: string }): Promise<Uint8Array> {
    const response = await fetch(decoders[filename] ?? filename)
    if (!response.ok) throw new Error(`no ${filename}`)
    return new Uint8Array(await response.arrayBuffer())
  }
}

/** Opens a PDF of our own origin in the browser. The reader is loaded here and not with the page: it is large, and browsers alone have what it needs. */
export async function openPdf(src: string): Promise<PDFDocumentProxy> {
  const reader = await import('pdfjs-dist/legacy/build/pdf.mjs')
  reader.GlobalWorkerOptions.workerSrc = new URL('pdfjs-dist/legacy/build/pdf.worker.min.mjs', import.meta.url).toString()
  return reader.getDocument({ url: src, BinaryDataFactory: OwnFiles, useWorkerFetch: false, wasmUrl: '/', isEvalSupported: false, enableXfa: false } as Parameters<typeof reader.getDocument>[0]).promise
}
