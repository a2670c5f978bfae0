import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { PDFDict, PDFDocument, PDFName, degrees, type PDFRef } from 'pdf-lib'
import { everyday } from './a-script-to-return'

/** Some pages of the everyday sheaf as a sheaf of their own, with everything in it that must not come out again. */
export async function aSheaf(pages: readonly number[]): Promise<PDFDocument> {
  const pdf = await PDFDocument.create()
  const source = await PDFDocument.load(readFileSync(join(everyday, 'scan.pdf')), { updateMetadata: false })
  for (const page of await pdf.copyPages(source, [...pages])) pdf.addPage(page)
  return pdf
}

/** Puts attachments, scripts, metadata, notes and actions of all kinds into a sheaf. */
export async function withBaggage(pdf: PDFDocument): Promise<PDFDocument> {
  const { context } = pdf
  const metadata = context.register(context.stream('<x:xmpmeta>secret-of-the-sheaf</x:xmpmeta>', { Type: 'Metadata', Subtype: 'XML' }))
  pdf.setTitle('secret-of-the-sheaf')
  pdf.setAuthor('secret-of-the-sheaf')
  pdf.addJavaScript('hello', 'app.alert("secret-of-the-sheaf")')
  await pdf.attach(Buffer.from('secret-of-the-sheaf'), 'secret-of-the-sheaf.txt')
  pdf.catalog.set(PDFName.of('Metadata'), metadata)
  for (const page of pdf.getPages()) {
    const action = { S: 'JavaScript', JS: context.obj('secret-of-the-sheaf') }
    const others = pdf.getPages().map((other) => other.ref)
    page.node.set(PDFName.of('Metadata'), metadata)
    page.node.set(PDFName.of('PieceInfo'), context.obj({ Scanner: { Private: metadata } }))
    page.node.set(PDFName.of('AA'), context.obj({ O: action }))
    page.node.set(PDFName.of('Annots'), context.obj([{ Type: 'Annot', Subtype: 'Link', Rect: [0, 0, 9, 9], A: action, P: others }]))
    const [image] = imagesOf(page.node.Resources()!)
    const dict = context.lookup(image) as unknown as { dict: PDFDict }
    dict.dict.set(PDFName.of('Metadata'), metadata)
    dict.dict.set(PDFName.of('PieceInfo'), context.obj({ Scanner: { Private: others } }))
  }
  return pdf
}

/** All pages name their image in one list of resources: one object that every page points to, or the page tree's. */
export function shareResources(pdf: PDFDocument, where: 'shared' | 'inherited'): PDFDocument {
  const { context } = pdf
  const images = pdf.getPages().map((page) => imagesOf(page.node.Resources()!)[0]!)
  const all = context.register(context.obj({ XObject: Object.fromEntries(images.map((ref, k) => [`Image${k}`, ref])) }))
  pdf.getPages().forEach((page, k) => {
    const { width, height } = page.getSize()
    page.node.set(PDFName.of('Contents'), context.register(context.stream(`q ${width} 0 0 ${height} 0 0 cm /Image${k} Do Q`)))
    if (where === 'shared') page.node.set(PDFName.of('Resources'), all)
    else page.node.delete(PDFName.of('Resources'))
  })
  if (where === 'inherited') pdf.catalog.Pages().set(PDFName.of('Resources'), all)
  return pdf
}

/** The image stands in a form that looks for it in a list of all images, as some copiers write it. */
export function wrapInForms(pdf: PDFDocument): PDFDocument {
  const { context } = pdf
  const images = pdf.getPages().map((page) => imagesOf(page.node.Resources()!)[0]!)
  const all = context.register(context.obj({ XObject: Object.fromEntries(images.map((ref, k) => [`Image${k}`, ref])) }))
  pdf.getPages().forEach((page, k) => {
    const { width, height } = page.getSize()
    const form = context.register(context.stream(`q ${width} 0 0 ${height} 0 0 cm /Image${k} Do Q`, { Type: 'XObject', Subtype: 'Form', BBox: [0, 0, width, height], Resources: all }))
    page.node.set(PDFName.of('Contents'), context.register(context.stream('/Page Do')))
    page.node.set(PDFName.of('Resources'), context.obj({ XObject: { Page: form } }))
  })
  return pdf
}

/** Pages that the file shows turned, their images as they were. */
export function turned(pdf: PDFDocument, angle: 90 | 180 | 270): PDFDocument {
  for (const page of pdf.getPages()) page.setRotation(degrees(angle))
  return pdf
}

/** Pages whose image is laid on its side by the matrix, on a page of the other shape whose corner is not the origin. */
export function laidOnSide(pdf: PDFDocument): PDFDocument {
  for (const page of pdf.getPages()) {
    const { width, height } = page.getSize()
    const [name] = (page.node.Resources()!.lookup(PDFName.of('XObject')) as PDFDict).keys()
    page.node.set(PDFName.of('MediaBox'), pdf.context.obj([100, 50, 100 + height, 50 + width]))
    page.node.set(PDFName.of('Contents'), pdf.context.register(pdf.context.stream(`1 0 0 1 100 50 cm q 0 ${width} -${height} 0 ${height} 0 cm ${name} Do`)))
  }
  return pdf
}

function imagesOf(resources: PDFDict): PDFRef[] {
  const objects = resources.lookup(PDFName.of('XObject')) as PDFDict
  return objects.entries().map(([, ref]) => ref as PDFRef)
}
