import { mkdir, readFile, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import Papa from 'papaparse'
import { AppError } from '@/lib/core/errors'
import type { PaperRect } from '@/lib/core/paper-space'
import { newToken } from '@/lib/infra/new-token'
import { assertCodePlace } from '@/lib/printing/code-place'
import { pageGround } from '@/lib/printing/page-ground'
import { buildPrintPack, packPages, type PackScript } from '@/lib/printing/print-pack'
import { suggestCodePlace } from '@/lib/printing/suggest-code-place'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { readPaperFile } from '@/lib/setting/read-paper-file'

// npm run -s print-pack -- --paper PAPER_DIR --roster roster.csv --out DIR [--spares 2] [--two-sided] [--class 10B] [--spot x,y,side]
// Writes pack.pdf, pages.csv (what stands on each page) and tokens.csv (what `ingest --codes` reads). Places are points from the top left.

const usage = 'usage: print-pack --paper PAPER_DIR --roster roster.csv --out DIR [--spares 2] [--two-sided] [--class NAME] [--spot x,y,side]'
type Row = { candidate_number: string; given_name: string; family_name: string }
const csv = (rows: readonly (readonly (string | number)[])[]) => `${Papa.unparse(rows as (string | number)[][], { newline: '\n' })}\n`

function spotOf(text: string | undefined): PaperRect | null {
  const [x, y, side] = text?.split(',').map(Number) ?? []
  return x === undefined || y === undefined || side === undefined ? null : { x, y, w: side, h: side }
}

async function main(): Promise<void> {
  const { values } = parseArgs({ options: { paper: { type: 'string' }, roster: { type: 'string' }, out: { type: 'string' }, spares: { type: 'string', default: '0' }, 'two-sided': { type: 'boolean', default: false }, class: { type: 'string', default: '' }, spot: { type: 'string' } } })
  if (!values.paper || !values.roster || !values.out) throw new Error(usage)
  const blank = await readFile(join(values.paper, 'paper.pdf'))
  const { title, setting } = readPaperFile(JSON.parse(await readFile(join(values.paper, 'paper.json'), 'utf8')))
  const roster = Papa.parse<Row>(await readFile(values.roster, 'utf8'), { header: true, skipEmptyLines: true }).data
  const drawn = await openBlankPaper(blank)
  const spaces = [...setting.questions.flatMap((question) => question.spaces), ...setting.boxes]
  const grounds = drawn.map((page) => pageGround(page, spaces.filter((space) => space.page === page.page).map(({ rect }) => rect)))
  const same = spotOf(values.spot)
  const places = grounds.map((ground) => {
    const rect = same ?? suggestCodePlace([ground])
    if (!rect) throw new Error(`page ${ground.page} has no free place for a code`)
    return assertCodePlace({ page: ground.page, rect }, ground)
  })
  const pages = drawn.map(({ page, widthPoints, heightPoints }) => ({ page, width: widthPoints, height: heightPoints }))
  const scripts: (PackScript & { number: string })[] = [
    ...roster.map((row) => ({ name: `${row.given_name} ${row.family_name}`, number: row.candidate_number, about: [row.candidate_number, values.class].filter(Boolean).join(' · '), tokens: pages.map(newToken) })),
    ...Array.from({ length: Number(values.spares) }, (_, k) => ({ name: `Spare ${k + 1}`, number: '', about: values.class, tokens: pages.map(newToken) })),
  ]
  const started = performance.now()
  const pdf = await buildPrintPack({ blank, pages, places, scripts, twoSided: values['two-sided'], title, builtAt: new Date() })
  const took = performance.now() - started
  await mkdir(values.out, { recursive: true })
  await writeFile(join(values.out, 'pack.pdf'), pdf)
  const printed = packPages(scripts.length, pages.length, values['two-sided'])
  await writeFile(join(values.out, 'pages.csv'), csv([['pdf_page', 'candidate_number', 'paper_page'], ...printed.flatMap((page, k) => (page ? [[k + 1, scripts[page.script]!.number || scripts[page.script]!.name.toLowerCase().replace(' ', '-'), page.paperPage]] : []))]))
  const tokens = scripts.flatMap((script, s) => script.tokens.map((token, k) => [token, s + 1, script.number, k + 1, places[k]!.rect.x, places[k]!.rect.y, places[k]!.rect.w]))
  await writeFile(join(values.out, 'tokens.csv'), csv([['token', 'script', 'candidate_number', 'paper_page', 'x', 'y', 'side'], ...tokens]))
  console.log(`${scripts.length} scripts of ${pages.length} pages in ${took.toFixed(0)} ms, ${(pdf.length / 1024).toFixed(0)} KB`)
}

main().catch((error: unknown) => {
  console.error(`print-pack: ${error instanceof AppError ? `${error.code} ${JSON.stringify(error.detail)}` : (error as Error).message}`)
  process.exitCode = 2
})
