import type { Page } from '@playwright/test'
import { demoPassword } from '@/seeds/demo-people'
import { expect, signInAs, test } from './fixtures'

// Whoever looks round the demo school meets real handwriting within three steps, whatever their part.

test('the teacher goes on marking where the pile was left', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  await page.getByRole('link', { name: /^Go on with .*Percentages, ratio and area/ }).click()
  await expectHandwriting(page)
})

test('the teacher finds what is left from the mark book', async ({ page }) => {
  await signInAs(page, 'r.adeyemi', demoPassword)
  await page.getByRole('link', { name: 'Percentages, ratio and area', exact: true }).click()
  await page.getByRole('link', { name: 'Go on marking' }).click()
  await page.getByRole('link', { name: /^Go on with/ }).click()
  await expectHandwriting(page)
})

test('the marker opens a question of theirs', async ({ page }) => {
  await signInAs(page, 'm.osei', demoPassword)
  await page.getByRole('link', { name: 'Percentages, ratio and area', exact: true }).click()
  await page.getByRole('link', { name: /^1a, of .* run this column/ }).click()
  await expectHandwriting(page)
})

test('the moderator reads a sampled script', async ({ page }) => {
  await signInAs(page, 'k.lindqvist', demoPassword)
  await page.getByRole('link', { name: 'Heating and cooling', exact: true }).click()
  await page.getByRole('link', { name: 'Second-mark 4', exact: true }).click()
  await expectHandwriting(page)
})

test('the student sees the page as it was written', async ({ page }) => {
  await signInAs(page, '6113', demoPassword)
  await page.getByRole('link', { name: 'Quick quiz: place value and money' }).click()
  await expect(page.locator('[role="img"][aria-busy="false"]').first()).toBeVisible({ timeout: 60_000 })
})

/** The first picture on the desk has come and has something in it. */
async function expectHandwriting(page: Page): Promise<void> {
  await expect(page).toHaveURL(/\/mark\//)
  const picture = page.getByRole('img', { name: /^Handwritten answer/ }).first()
  await expect(picture).toBeVisible()
  await expect.poll(() => picture.evaluate((image: HTMLImageElement) => image.complete && image.naturalWidth)).toBeGreaterThan(100)
}
