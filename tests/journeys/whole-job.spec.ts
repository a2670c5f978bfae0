import { mkdtempSync, readFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Page } from '@playwright/test'
import { classSetPath, readTruth } from '@/seeds/class-set-files'
import { expect, expectAccessible, realAddress as school, signInAs, test } from './fixtures'
import { mailTo } from './mail'
import { markByApi } from './mark-by-api'
import { checkPdf, imageHashes, imageObjects, pageCount, textOf } from './outside'

// One class set from an empty school to the student's own file: what a teacher does in an evening, on real scans.
const set = 'everyday'
const truth = readTruth(set)
const password = 'seven slow herons'
const teacher = { given: 'Ruth', family: 'Adeyemi', email: 'ruth@kestrelbay.example', roles: ['teacher'] }
const moderator = { given: 'Karin', family: 'Lindqvist', email: 'karin@kestrelbay.example', roles: ['moderator', 'marker'] }
const student = { number: '8144', email: 'ibrahim-souza.8144@example.org' }

test.setTimeout(600_000)

test('a class set goes from the copier to the students', async ({ browser }) => {
  const desk = await (await browser.newContext({ acceptDownloads: true })).newPage()
  await test.step('the first admin, and two people by invitation', async () => {
    await beFirstAdmin(desk)
    for (const person of [teacher, moderator]) await invite(desk, person)
    await signOut(desk)
  })
  await test.step('a class from its list', async () => {
    await signInAs(desk, teacher.email, password, school)
    await bringInClass(desk)
  })
  const paperId = await test.step('the paper from its file', () => makePaper(desk))
  await test.step('the sheaf, read by the worker', () => scanSheaf(desk, paperId))
  await test.step('names and who was away', () => sortSheaf(desk, paperId))
  const questions = await test.step('marking by key and by mouse, the rest as the desk saves it', () => markPaper(desk, paperId))
  await test.step('a moderator second-marks a sample blind', async () => {
    await drawSample(desk, paperId)
    const other = await (await browser.newContext()).newPage()
    await signInAs(other, moderator.email, password, school)
    await secondMark(other, paperId, questions)
    await agree(desk, paperId)
    await other.context().close()
  })
  await test.step('a grade scale, the clerical check, the release', async () => {
    await setGrades(desk, paperId)
    await handBack(desk, paperId)
  })
  await test.step('the student reads and downloads their own script and no other', async () => {
    const child = await (await browser.newContext({ acceptDownloads: true })).newPage()
    await readOwnScript(child)
    await child.context().close()
  })
})

async function beFirstAdmin(page: Page): Promise<void> {
  const { setUpCode } = JSON.parse(readFileSync(path.join(import.meta.dirname, '../results/real/secrets.json'), 'utf8')) as { setUpCode: string }
  await page.goto(school)
  await expect(page).toHaveURL(/first-admin/)
  await expectAccessible(page)
  for (const [label, value] of [['Set-up code', setUpCode], ['Given name', 'Ada'], ['Family name', 'Whitcombe'], ['E-mail', 'ada@kestrelbay.example'], ['Password', password]] as const) await page.getByLabel(label, { exact: true }).fill(value)
  await page.getByRole('button', { name: 'Make this account' }).click()
  await expect(page).not.toHaveURL(/first-admin/)
  if (page.url().includes('sign-in')) await signInAs(page, 'ada@kestrelbay.example', password, school)
}

async function invite(page: Page, person: typeof teacher): Promise<void> {
  await page.goto(`${school}/people`)
  await page.getByRole('button', { name: 'Add a person' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByLabel('Given name').fill(person.given)
  await dialog.getByLabel('Family name').fill(person.family)
  await dialog.getByLabel('E-mail').fill(person.email)
  for (const role of person.roles) await dialog.getByRole('checkbox', { name: new RegExp(`^${role}`) }).check()
  await dialog.getByRole('button', { name: 'Add' }).click()
  await expect(dialog).toBeHidden()
  await expectAccessible(page)
  await choosePassword(page, person.email)
}

/** Follows the link of a mail in a browser of its own and sets a password. */
async function choosePassword(page: Page, email: string): Promise<void> {
  const { link } = await mailTo(email, /new-password/)
  const own = await page.context().browser()!.newContext()
  const door = await own.newPage()
  await door.goto(link)
  await expectAccessible(door)
  await door.getByLabel('Password').fill(password)
  await door.getByRole('button', { name: 'Set this password' }).click()
  await expect(door.getByRole('button', { name: 'Set this password' })).toBeHidden()
  await own.close()
}

async function signOut(page: Page): Promise<void> {
  await page.context().clearCookies()
}

async function bringInClass(page: Page): Promise<void> {
  await page.goto(`${school}/classes`)
  await page.getByRole('button', { name: 'Add a class' }).click()
  await page.getByRole('dialog').getByLabel('Name').fill('8K')
  await page.getByRole('dialog').getByRole('button', { name: 'Add' }).click()
  await page.getByRole('link', { name: 'Bring in a class list' }).click()
  await page.locator('input[type=file]').setInputFiles(classSetPath(set, 'roster.csv'))
  await page.getByRole('button', { name: /Bring in 30 lines/ }).click()
  await expectAccessible(page)
  await page.getByRole('link', { name: 'To the class' }).click()
  await expect(page.getByRole('heading', { name: '30 students' })).toBeVisible()
  await page.getByRole('button', { name: 'Give accounts' }).click()
  await page.getByRole('button', { name: 'Give them out' }).click()
  await expect(page.getByText(/links are on the way/)).toBeVisible()
}

async function makePaper(page: Page): Promise<string> {
  await page.goto(`${school}/papers/new`)
  await page.getByLabel('Class').selectOption({ label: '8K, 30 students' })
  await page.getByLabel('PDF of the test as it is printed').setInputFiles(classSetPath(set, 'paper.pdf'))
  await page.getByLabel('paper.json, if the paper was set before').setInputFiles(classSetPath(set, 'paper.json'))
  await expectAccessible(page)
  await page.getByRole('button', { name: 'Make the paper' }).click()
  await page.waitForURL(/\/papers\/[^/]+\/set/)
  await expect(page.getByText('11 questions, 20 marks')).toBeVisible()
  await expectAccessible(page)
  return /papers\/([^/]+)/.exec(page.url())![1]!
}

async function scanSheaf(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/scan`)
  await page.getByLabel('The sheaf, as a PDF').setInputFiles(classSetPath(set, 'scan.pdf'))
  await expect(page.getByText('59 leaves read')).toBeVisible({ timeout: 180_000 })
  await expect(page.getByText('in 29 scripts')).toBeVisible()
  await expectAccessible(page)
}

/** Reads each name box as a person would (truth says what is written there): takes the suggestion when it is right, looks it up when not. */
async function sortSheaf(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/sort`)
  await expect(page.getByRole('heading', { name: /^(Names to confirm|Certain names)/ }).first()).toBeVisible()
  await expectAccessible(page)
  const written = [...new Set(truth.pages.flatMap(({ candidate_number: number }) => number ?? []))]
  const names = page.getByRole('region', { name: 'Names to confirm' })
  const certain = page.getByRole('region', { name: 'Certain names' })
  const of = (script: number) => page.getByRole('button', { name: `Look at script ${script}`, exact: true })
  for (const [k, number] of written.entries()) {
    const row = names.getByRole('row').filter({ has: of(k + 1) })
    if (!(await row.isVisible())) {
      await expect(certain.getByRole('listitem').filter({ has: of(k + 1) }).getByText(number)).toBeVisible()
      continue
    }
    const yes = row.getByRole('button', { name: new RegExp(`^Yes, .* ${number}$`) })
    if (await yes.isVisible()) await page.keyboard.press('y')
    else {
      await row.getByRole('button', { name: /other|Say whose/ }).click()
      await page.getByLabel('Name or candidate number').fill(number)
      await page.keyboard.press('Enter')
    }
    await expect(row).toBeHidden()
  }
  if (await certain.isVisible()) {
    await expectAccessible(page)
    await certain.getByRole('button', { name: /^Confirm \d+ certain name/ }).click()
  }
  await expect(page.getByText('29 scripts, every one with a name')).toBeVisible()
  // The one student without a script was away that day. The mark is the server's answer, not the click's.
  const absent = page.getByRole('radiogroup', { name: /8132/ }).getByLabel('absent')
  await absent.click()
  await expect(absent).toBeChecked()
}

async function markPaper(page: Page, paperId: string): Promise<{ id: string; label: string }[]> {
  const answer = await page.request.get(`${school}/api/papers/${paperId}/mark-book`)
  const book = (await answer.json()) as { questions: { id: string; label: string }[] }
  await page.goto(`${school}/papers/${paperId}/mark/${book.questions[0]!.id}`)
  const points = page.getByRole('group', { name: 'Mark points' })
  await expect(points).toBeVisible()
  await expectAccessible(page)
  // By key alone: both points and on; a part of a point; nothing written; nought.
  for (const keys of [['a', 's'], ['a'], ['r'], ['0']]) {
    for (const key of keys) await page.keyboard.press(key)
    await page.keyboard.press('Enter')
  }
  // By mouse: a point's key, a tick from the tray set down on the answer, taken back.
  await points.getByRole('button').first().click()
  await page.getByRole('button', { name: /^Ring, key O/ }).click()
  const canvas = page.locator('canvas').first()
  await canvas.click({ position: { x: 300, y: 60 } })
  await page.keyboard.press('Escape')
  await page.keyboard.press('Enter')
  await expect(page.getByText(/5 of 29 marked/)).toBeVisible()
  for (const question of book.questions) {
    await markByApi(page.request, { address: school, paperId, questionId: question.id, round: 'first', mark: (n, maximum) => (n % 9 === 4 ? null : n % 5 === 0 ? maximum - 1 : maximum) })
  }
  await page.goto(`${school}/papers/${paperId}`)
  await expect(page.getByRole('rowheader', { name: /Abdi/ })).toBeVisible()
  await expectAccessible(page)
  return book.questions
}

async function drawSample(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/second-mark`)
  await page.getByLabel(/^Scripts/).fill('5')
  await page.getByRole('button', { name: 'Draw the sample' }).click()
  await expect(page.getByText(/0 of \d read/).first()).toBeVisible()
  await expectAccessible(page)
}

async function secondMark(page: Page, paperId: string, questions: readonly { id: string; label: string }[]): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/second-mark`)
  await expectAccessible(page)
  await page.goto(`${school}/papers/${paperId}/mark/${questions[0]!.id}?round=second`)
  await expect(page.getByText(/0 of \d+ marked/)).toBeVisible()
  await page.keyboard.press('a')
  await page.keyboard.press('Enter')
  await expect(page.getByText(/1 of \d+ marked/)).toBeVisible()
  for (const question of questions) {
    await markByApi(page.request, { address: school, paperId, questionId: question.id, round: 'second', mark: (n, maximum) => Math.max(0, maximum - (n === 1 ? 2 : 0)) })
  }
}

/** Decides every answer outside the tolerance: the first by an agreed mark, settled at the desk as it was copied; the next two by either mark. */
async function agree(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/second-mark`)
  await expectAccessible(page)
  const open = page.getByRole('link', { name: /^Compare .* of script/ })
  const links = await open.evaluateAll((all) => all.map((link) => (link as HTMLAnchorElement).href))
  expect(links.length).toBeGreaterThan(0)
  for (const [k, href] of links.entries()) {
    await page.goto(href)
    if (k === 0) await expectAccessible(page)
    if (k === 0) await settleAgreed(page)
    await page.getByLabel('Reason').selectOption({ index: 1 })
    await page.getByRole('button', { name: k === 0 ? /^Agree \d|^Agree ½/ : k === 1 ? /^Second mark stands/ : /^First mark stands/ }).click()
    await expect(page.getByText(/^Decided: /)).toBeVisible()
  }
  await page.goto(`${school}/papers/${paperId}/second-mark`)
  await page.getByRole('button', { name: /^Close the second/ }).click()
}

async function settleAgreed(page: Page): Promise<void> {
  await page.getByLabel('Reason').selectOption({ index: 1 })
  await page.getByRole('button', { name: 'Agree another mark' }).click()
  await page.waitForURL(/round=agreed/)
  await expect(page.getByText('not settled', { exact: true })).toBeVisible()
  await page.keyboard.press('Enter')
  await page.getByRole('link', { name: 'Back to the two marks' }).click()
  await expect(page.getByRole('button', { name: /^Agree/ })).toBeVisible()
}

async function setGrades(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/grades`)
  await page.getByRole('button', { name: /8 to 1|eight/i }).first().click()
  await expectAccessible(page)
  await page.getByRole('button', { name: /^(Save|Keep)/ }).click()
}

async function handBack(page: Page, paperId: string): Promise<void> {
  await page.goto(`${school}/papers/${paperId}/hand-back`)
  await expect(page.getByRole('heading', { name: 'Clerical check' })).toBeVisible()
  await expectAccessible(page)
  const sign = page.getByRole('button', { name: /^(Sign|Keep back)/ })
  while ((await sign.count()) > 0) {
    const before = await sign.count()
    await sign.first().click()
    await page.getByLabel('Reason').fill('Looked at it: the sheet was never handed in.')
    await page.getByRole('dialog').getByRole('button', { name: /^(Sign|Keep back)$/ }).click()
    await expect.poll(() => sign.count()).toBeLessThan(before)
  }
  await page.getByRole('button', { name: /^Hand back \d+ scripts/ }).click()
  await page.getByRole('alertdialog').getByRole('button', { name: /^Hand back \d+ scripts/ }).click()
  await expect(page.getByRole('heading', { name: 'What was handed back' })).toBeVisible({ timeout: 120_000 })
  await expect(page.getByText(/handed back/i).first()).toBeVisible()
  await expectAccessible(page)
}

async function readOwnScript(page: Page): Promise<void> {
  await mailTo(student.email, /handed back|marked script|my-scripts/i)
  await choosePassword(page, student.email)
  await signInAs(page, student.email, password, school)
  await expect(page).toHaveURL(/my-scripts/)
  await expectAccessible(page)
  await page.getByRole('link', { name: 'Percentages, ratio and area' }).click()
  await expect(page.getByRole('heading', { name: 'Ibrahim Souza' })).toBeVisible()
  await expectAccessible(page)
  const id = /my-scripts\/([^/?]+)/.exec(page.url())![1]!
  const download = page.waitForEvent('download')
  await page.getByRole('link', { name: 'Download as PDF' }).click()
  const file = path.join(mkdtempSync(path.join(tmpdir(), 'sheafmark-returned-')), 'own.pdf')
  await (await download).saveAs(file)
  checkReturned(file)
  await refusesOthers(page, id)
}

/** Poppler and qpdf on the student's file: whole, its own pages with the sheaf's bytes, and nobody else's. */
function checkReturned(file: string): void {
  checkPdf(file)
  expect(pageCount(file)).toBe(3)
  expect(textOf(file, 1)).toMatch(/Ibrahim Souza/)
  expect(textOf(file, 1)).toMatch(/of 20[\s\S]*grade \d/)
  const pages = truth.pages.filter((page) => page.candidate_number === student.number).map(({ index }) => index + 1)
  const sheaf = classSetPath(set, 'scan.pdf')
  expect(imageHashes(file, 2, 3)).toEqual(pages.flatMap((page) => imageHashes(sheaf, page, page)))
  expect(imageObjects(file)).toBe(2)
}

async function refusesOthers(page: Page, own: string): Promise<void> {
  expect((await page.request.get(`${school}/api/returned/${own}/pdf`)).status()).toBe(200)
  const other = own.replace(/^./, (first) => (first === '0' ? '1' : '0'))
  expect((await page.request.get(`${school}/api/returned/${other}/pdf`)).status()).toBe(404)
  expect((await page.request.get(`${school}/people`, { maxRedirects: 0 })).status()).not.toBe(200)
}
