import { demoPassword } from '@/seeds/demo-people'
import { expect, expectAccessible, signInAs, test } from './fixtures'
import { aSmallPaper, pile, scan, sheafOf } from './small-pile'

// A page of the file is broken: it is named, the others are kept, and its sheet can be scanned again.

test('a damaged page is named, and the good pages are kept', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paper = await aSmallPaper(page, '10D')
  const leaves = pile.flatMap(({ leaves: own }) => own)
  await scan(page, paper, await sheafOf('damaged.pdf', leaves, { spoilt: 5 }))
  await expect(page.getByText('leaf 6, for the sorting table')).toBeVisible()
  await expectAccessible(page)
  await page.goto(`${paper}/sort`)
  await expect(page.getByRole('heading', { name: 'Leaf 6' })).toBeVisible()
  await expect(page.getByText('page 6 of the file cannot be read: scan that sheet again')).toBeVisible()
  await expectAccessible(page)
  await page.keyboard.press('d')
  await expect(page.getByRole('heading', { name: 'Leaf 6' })).toBeHidden()
  await scan(page, paper, await sheafOf('sheet.pdf', [leaves[5]!]))
  await page.goto(`${paper}/sort`)
  await page.getByText(/^All scripts/).click()
  await expect(page.getByText('page 2 came later')).toBeVisible()
  await expect(page.getByText('page 2 missing', { exact: true })).toBeHidden()
})
