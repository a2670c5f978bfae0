import { readFile, writeFile } from 'node:fs/promises'
import { PDFDocument } from 'pdf-lib'

/** Writes a scan whose every page shows two pages of another scan side by side (from 0; null: nothing), as a copier with a larger glass makes it. */
export async function aTwoUpScan(file: string, scan: string, pairs: readonly (readonly [number | null, number | null])[]): Promise<void> {
  const from = await PDFDocument.load(await readFile(scan))
  const to = await PDFDocument.create()
  const { width, height } = from.getPage(0).getSize()
  for (const pair of pairs) {
    const page = to.addPage([2 * width, height])
    for (const [k, index] of pair.entries()) {
      if (index === null) continue
      const [embedded] = await to.embedPdf(from, [index])
      page.drawPage(embedded!, { x: k * width, y: 0 })
    }
  }
  await writeFile(file, await to.save())
}
