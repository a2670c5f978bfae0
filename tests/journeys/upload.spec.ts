import { execFileSync } from 'node:child_process'
import { createHash, randomBytes } from 'node:crypto'
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Page, Request } from '@playwright/test'
import { classSetPath } from '@/seeds/class-set-files'
import { demoPassword } from '@/seeds/demo-people'
import { expect, expectAccessible, signInAs, test } from './fixtures'

// The paper of the demo school that waits for its sheaf, over a line that breaks.
const set = 'one-page'
const piece = 8 * 1024 * 1024
const folder = mkdtempSync(path.join(tmpdir(), 'sheaf-'))
const isPiece = (request: Request) => request.method() === 'PATCH'
const offsetOf = (request: Request) => Number(request.headers()['upload-offset'])

test.setTimeout(300_000)

test('a sheaf arrives over a line that breaks, and goes on after a reload', async ({ page, context }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  await openWaitingPaper(page)
  await test.step('the scanned pile to download is that of this paper', async () => {
    await expectAccessible(page)
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'Download a scanned pile of this paper' }).click()])
    expect(sha256(readFileSync(await download.path()))).toBe(sha256(readFileSync(classSetPath(set, 'scan.pdf'))))
  })
  await test.step('files that cannot be a sheaf are told why', () => offerFaulty(page))

  const sheaf = thickSheaf('thick.pdf')
  const sent: number[] = []
  page.on('request', (request) => { if (isPiece(request)) sent.push(offsetOf(request)) })
  page.on('dialog', (dialog) => void dialog.accept())
  await test.step('cut off half way, it says so and goes on by itself', async () => {
    let reachable = true
    await page.route('**/sheaves/upload/**', async (route, request) => {
      if (reachable && isPiece(request) && offsetOf(request) === piece) {
        reachable = false
        await context.setOffline(true)
      }
      return reachable ? route.continue() : route.abort('internetdisconnected')
    })
    await choose(page, sheaf)
    await expect(page.getByText('The line is down. What has arrived is kept')).toBeVisible()
    await expectAccessible(page)
    await holdPiece(page, 2 * piece)
    const held = page.waitForRequest((request) => isPiece(request) && offsetOf(request) === 2 * piece)
    await context.setOffline(false)
    await held
    await expect(page.getByText('The line is down')).toBeHidden()
    expect(sent.filter((offset) => offset === 0), 'the first piece was sent once').toHaveLength(1)
  })
  await test.step('after a reload the same file goes on where it stopped', async () => {
    await page.reload()
    await page.unrouteAll({ behavior: 'ignoreErrors' })
    await expect(page.getByText('thick.pdf did not arrive whole. Choose the same file again: it goes on where it stopped.')).toBeVisible()
    sent.length = 0
    await choose(page, sheaf)
    await expect(page.getByRole('heading', { name: /thick\.pdf/ })).toBeVisible({ timeout: 60_000 })
    expect(sent[0]).toBe(2 * piece)
  })
  await test.step('the very same file again adds nothing', async () => {
    await choose(page, sheaf)
    await expect(page.getByRole('alert').filter({ hasText: 'This very file is here already. Nothing was added.' })).toBeVisible({ timeout: 60_000 })
  })
  await test.step('the pile is read', async () => {
    await expect(page.getByText(/^\d+ leaves read$/)).toBeVisible({ timeout: 180_000 })
    await expect(page.getByRole('link', { name: 'Download a scanned pile of this paper' })).toHaveCount(0)
  })
})

async function openWaitingPaper(page: Page): Promise<void> {
  await page.goto('/')
  await page.getByRole('link', { name: /^Scan the sheaf: Quick quiz, to try the scan/ }).click()
  await expect(page.getByRole('heading', { name: 'Nothing scanned yet' })).toBeVisible()
}

async function choose(page: Page, file: string): Promise<void> {
  await page.getByLabel('The sheaf, as a PDF').setInputFiles(file)
}

async function offerFaulty(page: Page): Promise<void> {
  const words = path.join(folder, 'words.pdf')
  writeFileSync(words, 'Dear parents and carers, the boat leaves at nine.\n')
  const locked = path.join(folder, 'locked.pdf')
  execFileSync('qpdf', ['--encrypt', 'heron', 'slow heron', '256', '--', classSetPath(set, 'paper.pdf'), locked])
  for (const [file, sentence] of [[words, 'This is neither a PDF nor a picture (JPEG, PNG, TIFF).'], [locked, 'This PDF asks for a password. Save a copy without one and choose that copy.']] as const) {
    await choose(page, file)
    await expect(page.getByRole('alert').filter({ hasText: sentence })).toBeVisible({ timeout: 60_000 })
  }
}

/** Never answers the piece from `offset` on: what is on its way when the page is left. */
async function holdPiece(page: Page, offset: number): Promise<void> {
  await page.unrouteAll({ behavior: 'ignoreErrors' })
  await page.route('**/sheaves/upload/**', (route, request) => (isPiece(request) && offsetOf(request) === offset ? undefined : route.continue()))
}

/** The scanned pile with so much attached to it that it goes in four pieces. */
function thickSheaf(name: string): string {
  const ballast = path.join(folder, 'ballast.bin')
  writeFileSync(ballast, randomBytes(3 * piece))
  const file = path.join(folder, name)
  execFileSync('qpdf', [classSetPath(set, 'scan.pdf'), '--add-attachment', ballast, '--', file])
  return file
}

function sha256(bytes: Buffer): string {
  return createHash('sha256').update(bytes).digest('hex')
}
