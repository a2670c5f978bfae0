import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { PDFDocument, PDFName, PDFRawStream } from 'pdf-lib'
import { describe, expect, it } from 'vitest'
import { drawStamp } from '@/lib/core/drawing'
import { compose, mmPerPoint, toPixels, turning, type Turn } from '@/lib/core/paper-space'
import { buildReturnedScript, loadSheaf } from '@/lib/handing-back/returned-script'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { aQuestion, aScriptPage, aStampAt, aSummary, everyday, truthPages } from '@/tests/make/a-script-to-return'
import { aSheaf, laidOnSide, shareResources, turned, withBaggage, wrapInForms } from '@/tests/make/a-sheaf'
import { asFile, assertClean, codedImages, fontLines, greenInk, imageCount, objectsOf, pageCountOf, wordsOf } from '@/tests/make/pdf-tools'
import { halves } from '@/lib/core/marks'

const builtAt = new Date('2026-03-18T12:00:00Z')
const leaves = truthPages()
const pagesOf = (candidate: string) => leaves.filter((page) => page.candidate_number === candidate)
const upright = pagesOf('8144')[0]!
const upsideDown = leaves.find((page) => page.rotation === 180)!
const mmPerPixel = 25.4 / 200

async function returned(sheaf: PDFDocument, pages: readonly ScriptPage[], summary = aSummary()): Promise<string> {
  return asFile(await buildReturnedScript(new Map([['everyday', await loadSheaf(await sheaf.save())]]), { summary, pages, builtAt }))
}

describe('a returned script', () => {
  it('is the summary and then the student’s own pages, clean, with their images byte for byte', async () => {
    const sheafFile = join(everyday, 'scan.pdf')
    const sheaf = await loadSheaf(readFileSync(sheafFile))
    const pages = pagesOf('8144').map((page) => aScriptPage(page))
    const file = asFile(await buildReturnedScript(new Map([['everyday', sheaf]]), { summary: aSummary(), pages, builtAt }))
    assertClean(file)
    expect(pageCountOf(file)).toBe(3)
    const own = pagesOf('8144').flatMap(({ index }) => codedImages(sheafFile, index + 1, index + 1))
    expect(own).toHaveLength(2)
    expect(codedImages(file)).toEqual(own)
    expect(imageCount(file)).toBe(2)
  })

  it('is the same file when it is built again', async () => {
    const sheaves = new Map([['everyday', await loadSheaf(readFileSync(join(everyday, 'scan.pdf')))]])
    const script = { summary: aSummary(), pages: pagesOf('8144').map((page) => aScriptPage(page)), builtAt }
    const first = await buildReturnedScript(sheaves, script)
    expect(Buffer.from(await buildReturnedScript(sheaves, script)).equals(Buffer.from(first))).toBe(true)
  })

  it('names itself, its language and its pages for readers who cannot see', async () => {
    const file = await returned(await aSheaf([upright.index]), [aScriptPage(upright, { index: 0 })])
    const pdf = await PDFDocument.load(readFileSync(file), { updateMetadata: false })
    expect(pdf.getTitle()).toBe('Percentages, ratio and area, Ibrahim Souza')
    const catalog = pdf.catalog.toString()
    expect(catalog).toContain('/Lang (en-GB)')
    expect(catalog).toContain('/Marked true')
    expect(objectsOf(file).join('')).toContain('/DisplayDocTitle":true')
    expect(objectsOf(file).some((object) => object.includes('"/S":"/Figure"') && object.includes('Marking: Tick, one mark.'))).toBe(true)
  })

  it('refuses a picture that shows two pages, an unknown sheaf and a page the sheaf has not', async () => {
    const sheaf = await aSheaf([0])
    await expect(returned(sheaf, [aScriptPage(upright, { index: 0, half: 1 })])).rejects.toMatchObject({ code: 'page_shared' })
    await expect(returned(sheaf, [aScriptPage(upright, { index: 0, sheaf: 'other' })])).rejects.toMatchObject({ code: 'sheaf_missing' })
    await expect(returned(sheaf, [aScriptPage(upright, { index: 1 })])).rejects.toMatchObject({ code: 'not_found' })
  })
})

describe('nothing of another student leaves the sheaf', () => {
  it.each([
    ['one list of resources for all pages', (pdf: PDFDocument) => shareResources(pdf, 'shared')],
    ['resources inherited from the page tree', (pdf: PDFDocument) => shareResources(pdf, 'inherited')],
    ['forms that share one list', wrapInForms],
  ])('with %s', async (_, prepare) => {
    const sheaf = await withBaggage(await aSheaf([0, 1, 2, 3, 4, 5]))
    prepare(sheaf)
    const sheafFile = asFile(await sheaf.save())
    expect(imageCount(sheafFile)).toBe(6)
    expect(objectsOf(sheafFile).join('')).toContain('secret-of-the-sheaf')

    const file = await returned(sheaf, [aScriptPage(leaves[2]!, { index: 2 }), aScriptPage(leaves[3]!, { index: 3 })])
    assertClean(file)
    expect(imageCount(file)).toBe(2)
    const own = [2, 3].map((index) => codedImages(join(everyday, 'scan.pdf'), leaves[index]!.index + 1, leaves[index]!.index + 1)[0]!)
    expect(codedImages(file)).toEqual(own)
    const objects = objectsOf(file).join('\n')
    for (const word of ['secret-of-the-sheaf', '/JavaScript', '/EmbeddedFile', '/Metadata', '/PieceInfo', '/Annot', '/AA', '/OpenAction', '/Filespec']) expect(objects).not.toContain(word)
    expect(readFileSync(file).includes('secret-of-the-sheaf')).toBe(false)
    expect(objectsOf(file).filter((object) => /"\/Type":"\/Page"/.test(object))).toHaveLength(3)
  })
})

describe('a stamp lands where it was pressed', () => {
  const cases: readonly (readonly [string, typeof upright, (pdf: PDFDocument) => PDFDocument])[] = [
    ['an upright, skewed page', upright, (pdf) => pdf],
    ['a page scanned upside down', upsideDown, (pdf) => pdf],
    ['a page with /Rotate 90', upright, (pdf) => turned(pdf, 90)],
    ['an upside-down page with /Rotate 270', upsideDown, (pdf) => turned(pdf, 270)],
    ['a page whose image lies on its side', upright, laidOnSide],
    ['an image within a form', upright, wrapInForms],
  ]
  it.each(cases)('on %s, and the page reads upright', async (_, leaf, prepare) => {
    const at = { x: 431, y: 287 }
    const inks = drawStamp(aStampAt(at.x, at.y, { kind: 'cross', worth: 0 }))
    const file = await returned(prepare(await aSheaf([leaf.index])), [aScriptPage(leaf, { index: 0, drawings: [{ pen: 'first', inks }] })])
    const ink = greenInk(file, 2)
    // The picture at 200 dpi is the stored image turned upright, whatever the file did to it.
    expect([ink.width, ink.height]).toEqual([leaf.width_px, leaf.height_px])
    const expected = toPixels(compose(turning(leaf.rotation as Turn, leaf.width_px, leaf.height_px), leaf.homography), at)
    expect(Math.abs((ink.left + ink.right) / 2 - expected.x) * mmPerPixel).toBeLessThan(0.3)
    expect(Math.abs((ink.top + ink.bottom) / 2 - expected.y) * mmPerPixel).toBeLessThan(0.3)
  })

  it.each([['upright', upright], ['upside down', upsideDown]] as const)('and a tick stands the right way up and in its size on a page %s', async (_, leaf) => {
    const file = await returned(await aSheaf([leaf.index]), [aScriptPage(leaf, { index: 0 })])
    const ink = greenInk(file, 2)
    expect(ink.lowestX).toBeLessThan((ink.left + ink.right) / 2)
    expect((ink.right - ink.left) * mmPerPixel).toBeCloseTo(18.5 * mmPerPoint, 0)
  })

  it('on a page of several strips, whose stored image is the page itself', async () => {
    const sheaf = await stripSheaf()
    const image = { width: 1000, height: 1400 }
    const homography = [[2, 0, 10], [0, 2, 20], [0, 0, 1]] as const
    const file = await returned(sheaf, [aScriptPage(upright, { index: 0, image, homography, drawings: [{ pen: 'first', inks: drawStamp(aStampAt(100, 50, { kind: 'cross', worth: 0 })) }] })])
    expect(imageCount(file)).toBe(2)
    const ink = greenInk(file, 2)
    // 500 x 700 points at 200 dpi; (100, 50) on paper is pixel (210, 120), so point (105, 60).
    expect((ink.left + ink.right) / 2 / (200 / 72)).toBeCloseTo(105, 0)
    expect((ink.top + ink.bottom) / 2 / (200 / 72)).toBeCloseTo(60, 0)
  })
})

describe('the summary', () => {
  it('says every mark, comment and total, in letters of any face', async () => {
    const summary = aSummary({
      student: 'Zoë Łukaş-Şen Παπαδοπούλου',
      questions: [aQuestion('1a', [{ says: 'Uses √(x²) ≤ 5', earned: halves(1), worth: halves(2) }], 3, ['5 − 3 × ½, see 中 and ⅓'])],
      adjustments: [{ says: 'Adjusted: misprint in 4', by: halves(1) }],
      ticks: halves(1),
      total: halves(2),
    })
    const file = await returned(await aSheaf([upright.index]), [aScriptPage(upright, { index: 0 })], summary)
    const words = wordsOf(file, 1)
    for (const part of ['Zoë Łukaş-Şen Παπαδοπούλου', 'Uses √(x²) ≤ 5', 'in part', '5 − 3 × ½, see 中 and ⅓', 'The sum of the ticks', '+½', 'grade 5', 'of 20, 53%', 'What to do next', 'How to read the marks', '1 of 2']) {
      expect(words).toContain(part)
    }
    expect(words).toMatch(/1a .*½ +of 1½/)
    expect(fontLines(file).every((line) => /yes yes yes/.test(line))).toBe(true)
  })

  it('goes on to further sheets and counts them', async () => {
    const questions = Array.from({ length: 25 }, (_, k) => aQuestion(`${k + 1}`, [{ says: 'Correct answer', earned: halves(2), worth: halves(2) }], 2, k % 2 ? [] : ['look again at the second line of your working']))
    const file = await returned(await aSheaf([upright.index]), [aScriptPage(upright, { index: 0 })], aSummary({ questions }))
    expect(pageCountOf(file)).toBe(3)
    expect(wordsOf(file, 1)).toContain('1 of 3')
    const second = wordsOf(file, 2)
    expect(second).toContain('2 of 3')
    expect(second).toContain('what earned it')
    expect(second).toContain('How to read the marks')
  })

  it('takes any text, however long or odd, and letters no face has still read as themselves', async () => {
    const odd = `${'W'.repeat(300)} \u0000\u0007 \u{1F600} \u202E ${'long '.repeat(200)}`
    const file = await returned(await aSheaf([upright.index]), [aScriptPage(upright, { index: 0, drawings: [{ pen: 'second', inks: drawStamp(aStampAt(50, 100, { kind: 'note', worth: 0, text: odd.slice(0, 600) })) }] })], aSummary({ title: odd, student: odd, about: odd, next: [odd], gradeSays: '', asking: odd }))
    assertClean(file)
    expect(wordsOf(file, 1)).toContain('😀')
  })
})

/** One page of two images one above the other, as some copiers cut a page. */
async function stripSheaf(): Promise<PDFDocument> {
  const pdf = await PDFDocument.create()
  const page = pdf.addPage([500, 700])
  const strip = (grey: number) => pdf.context.register(PDFRawStream.of(pdf.context.obj({ Type: 'XObject', Subtype: 'Image', Width: 10, Height: 7, BitsPerComponent: 8, ColorSpace: 'DeviceGray', Length: 70 }), new Uint8Array(70).fill(grey)))
  page.node.set(PDFName.of('Resources'), pdf.context.obj({ XObject: { A: strip(250), B: strip(240) } }))
  page.node.set(PDFName.of('Contents'), pdf.context.register(pdf.context.stream('q 500 0 0 350 0 350 cm /A Do Q q 500 0 0 350 0 0 cm /B Do Q')))
  return pdf
}
