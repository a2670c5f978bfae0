import { PDFArray, PDFDict, PDFName, PDFRawStream, decodePDFRawStream, type PDFContext, type PDFObject } from 'pdf-lib'
import { readContent, type Operation } from './content-reader'

/** Which kind of resource an operator's name is looked up in (ISO 32000-1, table 33). */
const kindOf: Readonly<Record<string, string>> = { Do: 'XObject', gs: 'ExtGState', Tf: 'Font', cs: 'ColorSpace', CS: 'ColorSpace', BI: 'ColorSpace', scn: 'Pattern', SCN: 'Pattern', sh: 'Shading' }

/** The resources that a content stream really uses, by kind: what may go into a file that only one student gets. */
export function usedNames(content: Uint8Array): Map<string, Set<string>> {
  const used = new Map<string, Set<string>>()
  for (const operation of readContent(content)) {
    const kind = kindOf[operation.operator]
    if (kind) used.set(kind, new Set([...(used.get(kind) ?? []), ...namesOf(operation)]))
  }
  return used
}

function namesOf({ operands }: Operation): string[] {
  return operands.flatMap((operand) => (operand !== null && typeof operand === 'object' ? [operand.name] : []))
}

/** Resources cut down to what the content uses, still objects of the source file; names that it lacks are left out. */
export function ownResources(content: Uint8Array, resources: PDFDict | undefined, context: PDFContext): PDFDict {
  const own = PDFDict.withContext(context)
  for (const [kind, names] of usedNames(content)) {
    const all = resources?.lookup(PDFName.of(kind))
    if (!(all instanceof PDFDict)) continue
    const kept = PDFDict.withContext(context)
    for (const name of names) {
      const key = PDFName.of(name)
      const value = all.get(key)
      if (value) kept.set(key, value)
    }
    if (kept.keys().length > 0) own.set(PDFName.of(kind), kept)
  }
  return own
}

/** A stream's bytes with its filters undone. Throws what pdf-lib throws on a filter it does not know. */
export function decoded(stream: PDFRawStream): Uint8Array {
  return decodePDFRawStream(stream).decode()
}

/** A page's content as one stream of bytes; pieces are told apart by a line end, as readers do. */
export function pageContent(contents: PDFObject | undefined): Uint8Array {
  const streams = contents instanceof PDFArray ? contents.asArray().map((_, k) => contents.lookup(k)) : [contents]
  const bytes = streams.flatMap((stream) => (stream instanceof PDFRawStream ? [decoded(stream), Uint8Array.of(10)] : []))
  return Buffer.concat(bytes)
}
