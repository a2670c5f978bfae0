import { demoPassword } from '@/seeds/demo-people'
import { expect, signInAs, test } from './fixtures'
import { aSmallPaper, pile, scan, twoUpSheaf } from './small-pile'

// A folded paper laid open on the copier: each picture shows two pages.

test('a sheaf of A3 sheets is cut into its pages', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paper = await aSmallPaper(page, '10T')
  await scan(page, paper, await twoUpSheaf('open.pdf', pile.flatMap(({ leaves }) => leaves)))
  await expect(page.getByText('5 leaves read, 10 pages on them')).toBeVisible()
  await expect(page.getByText('in 5 scripts')).toBeVisible()
  await page.goto(`${paper}/sort`)
  await page.getByText(/^All scripts/).click()
  await page.getByRole('button', { name: 'Look at page 2 of script 2' }).click()
  await page.getByRole('button', { name: 'take this page out' }).click()
  await expect(page.getByRole('heading', { name: 'Right half of sheet 2' })).toBeVisible()
  await expect(page.getByText('left half of sheet 2, page 1 of')).toBeVisible()
  await page.keyboard.press('z')
  await expect(page.getByRole('heading', { name: 'Right half of sheet 2' })).toBeHidden()
})
