import { demoPassword } from '@/seeds/demo-people'
import { expect, expectAccessible, signInAs, test } from './fixtures'
import { aSmallPaper, pile, scan, sheafOf } from './small-pile'

// A page came out badly and is put on the copier again after it was marked.

test('a new scan takes the place of the old one under the ticks', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paper = await aSmallPaper(page, '10R')
  await scan(page, paper, await sheafOf('first.pdf', pile.flatMap(({ leaves }) => leaves)))
  const openRun = async () => {
    await page.goto(`${paper}/mark`)
    await page.getByRole('link', { name: /1a/ }).first().click()
    await page.getByRole('group', { name: 'Mark points' }).waitFor()
  }
  await openRun()
  for (let n = 0; n < 5; n++) {
    await page.keyboard.press('a')
    await page.keyboard.press('Enter')
  }
  await expect(page.getByText(/5 of 5 marked/)).toBeVisible()
  await expect(page.getByRole('status').filter({ hasText: 'Saved' }).first()).toBeVisible()
  const book = `/api${paper}/mark-book`
  const marks = async () => JSON.stringify(((await (await page.request.get(book)).json()) as { rows: unknown }).rows)
  const before = await marks()

  await scan(page, paper, await sheafOf('again.pdf', [pile[2]!.leaves[0]], { turned: true }))
  expect(await marks()).toBe(before)
  await openRun()
  for (let n = 0; n < 5 && !(await page.getByText('This page was scanned again after it was marked').isVisible()); n++) await page.keyboard.press('ArrowDown')
  await expect(page.getByText('This page was scanned again after it was marked')).toBeVisible()
  await expectAccessible(page)
  await page.goto(`${paper}/sort`)
  await page.getByText(/^All scripts/).click()
  await expect(page.getByText('page 1 scanned again later')).toBeVisible()
})
