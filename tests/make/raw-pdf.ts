/** An object of a hand-made PDF: its text, or a stream with the rest of its dictionary. Object 1 is the catalog. */
export type RawObject = string | Readonly<{ dict: string; data: Uint8Array }>

/** Writes a PDF byte by byte, with a plain table of its objects; `before` puts bytes in front of all. */
export function rawPdf(objects: readonly RawObject[], trailer = '/Root 1 0 R'): Buffer {
  const parts: Buffer[] = [Buffer.from('%PDF-1.5\n%\xe2\xe3\xcf\xd3\n', 'latin1')]
  let size = parts[0]!.length
  const starts: number[] = []
  const add = (part: Buffer) => {
    parts.push(part)
    size += part.length
  }
  objects.forEach((object, k) => {
    starts.push(size)
    add(rawObject(object, k + 1))
  })
  const table = starts.map((at) => `${String(at).padStart(10, '0')} 00000 n \n`).join('')
  add(Buffer.from(`xref\n0 ${objects.length + 1}\n0000000000 65535 f \n${table}trailer\n<</Size ${objects.length + 1} ${trailer}>>\nstartxref\n${size}\n%%EOF\n`, 'latin1'))
  return Buffer.concat(parts)
}

function rawObject(object: RawObject, number: number): Buffer {
  const head = Buffer.from(`${number} 0 obj\n`)
  const end = Buffer.from('\nendobj\n')
  if (typeof object === 'string') return Buffer.concat([head, Buffer.from(object, 'latin1'), end])
  return Buffer.concat([head, Buffer.from(`<<${object.dict} /Length ${object.data.length}>>\nstream\n`, 'latin1'), object.data, Buffer.from('\nendstream'), end])
}

/** A document of one page: catalog, tree and page, then `rest` as objects 4, 5 and so on; 4 is the content. */
export function onePage(page: string, content: string | Uint8Array, rest: readonly RawObject[] = []): Buffer {
  return rawPdf(['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Count 1/Kids[3 0 R]>>', `<</Type/Page/Parent 2 0 R/Contents 4 0 R ${page}>>`, { dict: '', data: Buffer.from(content) }, ...rest])
}
