import { demoPassword } from '@/seeds/demo-people'
import { expect, expectAccessible, signInAs, test } from './fixtures'
import { aSmallPaper, pile, scan, sheafOf } from './small-pile'

// The sorting table without a pointer: a sheet that was scanned twice put aside, all names given, the last taken back.

test('a pile is sorted by keyboard alone', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  const paper = await aSmallPaper(page, '10K')
  // The last page is scanned twice.
  await scan(page, paper, await sheafOf('keys.pdf', [...pile.flatMap(({ leaves }) => leaves), pile[4]!.leaves[1]]))
  const name = await test.step('the scan page leads to the table', async () => {
    await page.getByRole('link', { name: 'Sort 1 loose sheet and the names' }).press('Enter')
    await expect(page.getByRole('heading', { name: 'Leaf 11' })).toBeVisible()
    await expect(page.getByText('perhaps scanned twice')).toBeVisible()
    await expectAccessible(page)
    return page.getByRole('region', { name: 'Names to confirm' })
  })
  await test.step('left for later, turned and back, set aside, taken back, set aside', async () => {
    await page.keyboard.press('l')
    await page.keyboard.press(']')
    await expect(page.getByText('undo turn')).toBeVisible()
    await page.keyboard.press('z')
    await expect(page.getByText('undo turn')).toBeHidden()
    await page.keyboard.press('d')
    await expect(page.getByRole('heading', { name: 'Leaf 11' })).toBeHidden()
    await page.keyboard.press('z')
    await expect(page.getByRole('heading', { name: 'Leaf 11' })).toBeVisible()
    await page.keyboard.press('d')
    await expect(page.getByText('1, kept, not part of this test')).toBeVisible()
  })
  await test.step('names: the certain ones together, the others one by one', async () => {
    const certain = page.getByRole('region', { name: 'Certain names' })
    for (let left = pile.length; left > 0 && (await name.isVisible()); left--) {
      const rows = await name.getByRole('row').count()
      await page.keyboard.press('y')
      await expect.poll(() => name.getByRole('row').count()).toBeLessThan(rows)
    }
    if (await certain.isVisible()) {
      await expectAccessible(page)
      await page.keyboard.press('c')
    }
    await expect(page.getByText('5 scripts, every one with a name')).toBeVisible()
    await expectAccessible(page)
  })
  await test.step('the last name comes back by Z and is given again', async () => {
    await page.keyboard.press('z')
    await expect(page.getByText('5 scripts, every one with a name')).toBeHidden()
  })
})
