import { readFileSync } from 'node:fs'
import type { Page } from '@playwright/test'
import { classSetPath } from '@/seeds/class-set-files'
import { demoPassword } from '@/seeds/demo-people'
import { aScannedPack, codesByZbar, drawnPages } from '@/tests/make/scanned-pack'
import { expect, expectAccessible, signInAs, test } from './fixtures'
import { checkPdf, imageObjects, pageCount, textOf } from './outside'

// A class whose papers are printed from here: the pile comes back shuffled, and every script finds its student by its code.
const set = 'one-page'

test.setTimeout(400_000)

test('papers printed with codes come back in any order', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paperId = await test.step('a paper with its blank PDF', () => makePaper(page))
  await test.step('the code is placed: by itself, by keys, and refused over print', () => placeCode(page, paperId))
  const { file, students } = await test.step('the pack is drawn, names everyone, and an outside reader reads its codes', () => printPack(page))
  await test.step('the pile comes back shuffled, some of it upside down', async () => {
    const shuffled = Array.from({ length: students }, (_, k) => ({ page: ((k * 11) % students) + 1, upsideDown: k % 4 === 1 }))
    expect(new Set(shuffled.map((sheet) => sheet.page)).size).toBe(students)
    await page.goto(`/papers/${paperId}/scan`)
    await page.getByLabel('The sheaf, as a PDF').setInputFiles(await aScannedPack(readFileSync(file), shuffled))
    await expect(page.getByText(`${students} leaves read`)).toBeVisible({ timeout: 240_000 })
  })
  await test.step('every script bears its name', async () => {
    await page.goto(`/papers/${paperId}/sort`)
    await expect(page.getByRole('heading', { name: 'All sorted' })).toBeVisible()
    await expect(page.getByText(`${students} scripts, every one with a name.`)).toBeVisible()
  })
})

async function makePaper(page: Page): Promise<string> {
  await page.goto('/papers/new')
  await page.getByLabel('Class').selectOption({ index: 1 })
  await page.getByLabel('PDF of the test as it is printed').setInputFiles(classSetPath(set, 'paper.pdf'))
  await page.getByLabel('paper.json, if the paper was set before').setInputFiles(classSetPath(set, 'paper.json'))
  await page.getByRole('button', { name: 'Make the paper' }).click()
  await page.waitForURL(/\/papers\/[^/]+\/set/)
  return /papers\/([^/]+)/.exec(page.url())![1]!
}

async function placeCode(page: Page, paperId: string): Promise<void> {
  await page.getByRole('link', { name: 'Print with codes' }).click()
  await page.waitForURL(`**/papers/${paperId}/print`)
  await expect(page.getByRole('button', { name: 'Make the PDF' })).toBeDisabled()
  await expectAccessible(page)
  await page.getByRole('button', { name: 'Find a free place' }).click()
  const code = page.getByRole('button', { name: /^The code of page 1, 20 mm square/ })
  await expect(code).toBeVisible()
  const found = await code.getAttribute('aria-label')
  await code.focus()
  // down onto the first answer space, and back up
  for (let k = 0; k < 8; k++) await page.keyboard.press('Shift+ArrowDown')
  await expect(page.getByRole('alert').filter({ hasText: 'Page 1: the code lies on an answer space' })).toBeVisible()
  await expect(page.getByRole('button', { name: 'Make the PDF' })).toBeDisabled()
  await expectAccessible(page)
  for (let k = 0; k < 8; k++) await page.keyboard.press('Shift+ArrowUp')
  await expect(page.getByRole('alert').filter({ hasText: 'the code lies' })).toBeHidden()
  await expect(page.getByRole('button', { name: found! })).toBeFocused()
  await page.reload()
  await expect(page.getByRole('button', { name: found! })).toBeVisible()
}

async function printPack(page: Page): Promise<{ file: string; students: number }> {
  const words = await page.getByText(/^\d+ scripts of 1 page/).textContent()
  const students = Number(/^\d+/.exec(words!)![0]) - 2
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Make the PDF' }).click()])
  expect(download.suggestedFilename()).toMatch(/\.pdf$/)
  const file = await download.path()
  checkPdf(file)
  expect(pageCount(file)).toBe(students + 2)
  expect(imageObjects(file), 'the paper is drawn, not pictured').toBe(0)
  expect(textOf(file, students + 1)).toContain('Spare 1')
  const tokens = drawnPages(readFileSync(file), 100).map(codesByZbar)
  expect(tokens.every((read) => read.length === 1 && /^[0-9A-Z]{16}$/.test(read[0]!))).toBe(true)
  expect(new Set(tokens.flat()).size).toBe(students + 2)
  await expect(page.getByText('Printed once, last on')).toBeVisible()
  return { file, students }
}
