import { demoPassword } from '@/seeds/demo-people'
import { expect, signInAs, test } from './fixtures'
import { aSmallPaper, pile, scan, sheafOf } from './small-pile'

// One sheet stayed behind in the classroom: it comes when the others are being marked.

test('a late page joins its script, and what was marked stays', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paper = await aSmallPaper(page, '10L')
  const late = pile[3]!.leaves[1]
  await scan(page, paper, await sheafOf('without.pdf', pile.flatMap(({ leaves }) => leaves).filter((leaf) => leaf !== late)))
  await test.step('the table says what is missing', async () => {
    await page.goto(`${paper}/sort`)
    await page.getByText(/^All scripts/).click()
    await expect(page.getByText('page 2 missing', { exact: true })).toBeVisible()
  })
  await test.step('marking begins', async () => {
    await page.goto(`${paper}/mark`)
    await page.getByRole('link', { name: /1a/ }).first().click()
    await page.getByRole('group', { name: 'Mark points' }).waitFor()
    await page.keyboard.press('a')
    await page.keyboard.press('Enter')
    await expect(page.getByText(/1 of 5 marked/)).toBeVisible()
  })
  await scan(page, paper, await sheafOf('late.pdf', [late]))
  await page.goto(`${paper}/sort`)
  await page.getByText(/^All scripts/).click()
  await expect(page.getByText('page 2 came later')).toBeVisible()
  await expect(page.getByText('page 2 missing', { exact: true })).toBeHidden()
  await page.goto(`${paper}/mark`)
  await page.getByRole('link', { name: /1a/ }).first().click()
  await expect(page.getByText(/1 of 5 marked/)).toBeVisible()
})
