import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { expect, type Page } from '@playwright/test'
import { PDFDocument, PDFName, PDFRawStream, degrees } from 'pdf-lib'
import sharp from 'sharp'
import { classSetPath, readTruth } from '@/seeds/class-set-files'

// A few students of a class set as a class of their own, whose scripts are read within seconds.
const set = 'everyday'
const truth = readTruth(set)
const folder = mkdtempSync(path.join(tmpdir(), 'small-pile-'))

/** The first students whose two pages both lie in the pile: their numbers, and their leaves (from 0). */
export const pile = [...new Set(truth.pages.flatMap(({ candidate_number: number }) => number ?? []))].flatMap((number) => {
  const leaf = (page: number) => truth.pages.find((one) => one.kind === 'script' && one.candidate_number === number && one.paper_page === page)?.index
  const [first, second] = [leaf(1), leaf(2)]
  return first === undefined || second === undefined ? [] : [{ number, leaves: [first, second] as const }]
}).slice(0, 5)

/** These leaves of the pile as a sheaf of their own. `turned`: laid on the copier the other way up. `spoilt`: the place of a leaf whose picture is broken. */
export async function sheafOf(name: string, leaves: readonly number[], { turned = false, spoilt }: { turned?: boolean; spoilt?: number } = {}): Promise<string> {
  const pdf = await PDFDocument.create()
  const source = await PDFDocument.load(readFileSync(classSetPath(set, 'scan.pdf')), { updateMetadata: false })
  for (const page of await pdf.copyPages(source, [...leaves])) pdf.addPage(page)
  pdf.setTitle(name)
  if (turned) for (const page of pdf.getPages()) page.setRotation(degrees(180))
  if (spoilt !== undefined) spoil(pdf, spoilt)
  const file = path.join(folder, name)
  writeFileSync(file, await pdf.save())
  return file
}

/** Puts noise in the place of a page's picture, as a bad stick or a broken line does. */
function spoil(pdf: PDFDocument, place: number): void {
  const pictures = pdf.getPage(place).node.Resources()!.lookup(PDFName.of('XObject')) as unknown as { keys(): PDFName[]; lookup(name: PDFName): PDFRawStream; get(name: PDFName): never }
  const [name] = pictures.keys()
  const picture = pictures.lookup(name!)
  pdf.context.assign(pictures.get(name!), PDFRawStream.of(picture.dict, Uint8Array.from({ length: 4000 }, (_, k) => (k * 197 + 31) % 251)))
}

/** Sheets of A3 that show two of these leaves each, side by side in one picture, as a copier takes a folded paper laid open. */
export async function twoUpSheaf(name: string, leaves: readonly number[]): Promise<string> {
  const single = await sheafOf(`single ${name}`, leaves)
  const out = mkdtempSync(path.join(folder, 'pages-'))
  execFileSync('pdftoppm', ['-r', '150', '-gray', '-png', single, path.join(out, 'p')])
  const pages = readdirSync(out).sort().map((file) => path.join(out, file))
  const pdf = await PDFDocument.create()
  const [width, height] = [1240, 1754]
  for (let k = 0; k < pages.length; k += 2) {
    const halves = await Promise.all(pages.slice(k, k + 2).map((file) => sharp(file).resize(width, height, { fit: 'fill' }).toBuffer()))
    const picture = await sharp({ create: { width: 2 * width, height, channels: 3, background: '#ffffff' } }).composite(halves.map((input, side) => ({ input, left: side * width, top: 0 }))).grayscale().jpeg({ quality: 85 }).toBuffer()
    pdf.addPage([1190.55, 841.89]).drawImage(await pdf.embedJpg(picture), { x: 0, y: 0, width: 1190.55, height: 841.89 })
  }
  const file = path.join(folder, name)
  writeFileSync(file, await pdf.save())
  return file
}

/** A class of the pile's students and a paper that it sits; nothing scanned. Gives the paper's address. */
export async function aSmallPaper(page: Page, className: string, students: readonly string[] = pile.map(({ number }) => number)): Promise<string> {
  const [head, ...lines] = readFileSync(classSetPath(set, 'roster.csv'), 'utf8').trim().split(/\r?\n/)
  const list = lines.filter((line) => students.includes(line.split(',')[0]!))
  const roster = path.join(folder, `${className}.csv`)
  writeFileSync(roster, [head, ...list].join('\n'))
  await page.goto('/classes')
  await page.getByRole('button', { name: 'Add a class' }).click()
  await page.getByRole('dialog').getByLabel('Name').fill(className)
  await page.getByRole('dialog').getByRole('button', { name: 'Add' }).click()
  await page.getByRole('link', { name: 'Bring in a class list' }).click()
  await page.locator('input[type=file]').setInputFiles(roster)
  await page.getByRole('button', { name: new RegExp(`Bring in ${list.length} lines`) }).click()
  await page.getByRole('link', { name: 'To the class' }).waitFor()
  await page.goto('/papers/new')
  await page.getByLabel('Class').selectOption({ label: `${className}, ${list.length} students` })
  await page.getByLabel('PDF of the test as it is printed').setInputFiles(classSetPath(set, 'paper.pdf'))
  await page.getByLabel('paper.json, if the paper was set before').setInputFiles(classSetPath(set, 'paper.json'))
  await page.getByLabel('Title').fill(`Small pile of ${className}`)
  await page.getByRole('button', { name: 'Make the paper' }).click()
  await page.waitForURL(/\/papers\/[^/]+\/set/)
  return new URL(page.url()).pathname.replace(/\/set$/, '')
}

/** Sends a sheaf and waits until it is read. */
export async function scan(page: Page, paper: string, file: string): Promise<void> {
  await page.goto(`${paper}/scan`)
  await page.locator('input[type=file]').setInputFiles(file)
  await expect(page.getByRole('heading', { name: `${path.basename(file)} is read` })).toBeVisible({ timeout: 300_000 })
}
