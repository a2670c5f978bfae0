import AxeBuilder from '@axe-core/playwright'
import { expect, test as base, type Page } from '@playwright/test'

/** The demo school and the empty real school that the configuration starts. */
export const demoAddress = 'http://localhost:3187'
export const realAddress = 'http://localhost:3188'

/** A test in which no request leaves our own origins and no page throws. */
export const test = base.extend<{ watched: void }>({
  watched: [
    async ({ context }, use) => {
      const foreign: string[] = []
      const errors: string[] = []
      context.on('request', (request) => {
        const url = request.url()
        if (!/^(data|blob|about):/.test(url) && ![demoAddress, realAddress].some((ours) => url.startsWith(ours))) foreign.push(url)
      })
      context.on('weberror', (error) => errors.push(error.error().message))
      await use()
      expect(foreign, 'requests to another origin').toEqual([])
      expect(errors, 'errors thrown in a page').toEqual([])
    },
    { auto: true },
  ],
})

export { expect }

/** Signs in through the door, as a person would. */
export async function signInAs(page: Page, name: string, password: string, address = demoAddress): Promise<void> {
  await page.goto(`${address}/sign-in`)
  await page.getByLabel('Name').fill(name)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'))
}

/** No violation of WCAG 2.2 A and AA that axe can find. */
export async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']).analyze()
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(' | ')}`), `on ${page.url()}`).toEqual([])
}
