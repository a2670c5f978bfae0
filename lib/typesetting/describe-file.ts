import type { PDFDocument } from 'pdf-lib'

/** Names a file, its language (null when the words in it are not ours) and its maker. */
export function describeFile(pdf: PDFDocument, title: string, builtAt: Date, language: string | null = 'en-GB'): void {
  pdf.setTitle(title, { showInWindowTitleBar: true })
  if (language !== null) pdf.setLanguage(language)
  pdf.setCreator('Sheafmark')
  pdf.setProducer('Sheafmark')
  pdf.setCreationDate(builtAt)
  pdf.setModificationDate(builtAt)
}
