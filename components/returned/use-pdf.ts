'use client'
import { useEffect, useState } from 'react'
import type { PDFDocumentProxy } from 'pdfjs-dist'
import { openPdf } from './open-pdf'

/** A returned script as the browser draws it. `firstPage` is where the student's own pages begin, after the summary. */
export type OpenedPdf = Readonly<{ state: 'loading' | 'failed' }> | Readonly<{ state: 'open'; document: PDFDocumentProxy; firstPage: number }>

/** Loads the student's own file once for all pictures of this screen. */
export function usePdf(src: string, pages: number): OpenedPdf {
  const [pdf, setPdf] = useState<OpenedPdf>({ state: 'loading' })
  useEffect(() => {
    let left = false
    const opening = openPdf(src)
    opening.then((document) => { if (!left) setPdf({ state: 'open', document, firstPage: document.numPages - pages + 1 }) }, () => { if (!left) setPdf({ state: 'failed' }) })
    return () => {
      left = true
      void opening.then((document) => document.loadingTask.destroy(), () => undefined)
    }
  }, [src, pages])
  return pdf
}
