import { AxeBuilder } from '@axe-core/playwright'
import { type Page } from 'playwright-core'

/** What axe finds serious or worse on the page as it stands, in light and in dark. */
export async function seriousFaults(page: Page): Promise<string[]> {
  const found: string[] = []
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme })
    const { violations } = await new AxeBuilder({ page }).analyze()
    for (const one of violations)
      if (one.impact === 'serious' || one.impact === 'critical')
        found.push(
          `${page.url()} ${colorScheme} ${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`,
        )
  }
  await page.emulateMedia({ colorScheme: 'light' })
  return found
}

/** How wide the page is on a screen of 360 px; more means that it scrolls sideways. */
export async function widthAt360(page: Page): Promise<number> {
  const size = page.viewportSize() ?? { width: 1440, height: 900 }
  await page.setViewportSize({ width: 360, height: 780 })
  const width = await page.evaluate(() => document.documentElement.scrollWidth)
  await page.setViewportSize(size)
  return width
}
