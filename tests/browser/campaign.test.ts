import { type Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { DEMO_PASSWORD, demoPeople } from '@/db/demo/demo-campaign'
import { openBrowser, signIn, type BrowserSession } from '@/tests/support/browser'
import { seriousFaults, widthAt360 } from '@/tests/support/page-checks'
import { startServer, type DemoServer } from '@/tests/support/demo-server'

let server: DemoServer
let lead: BrowserSession
let researcher: BrowserSession
let campaign = ''

const emailOf = (role: string) => demoPeople.find((person) => person.role === role)?.email ?? ''

/** A column that is out of sight is not in the page; the keyboard brings the last one in. */
async function remarkCell(page: Page, sampleCode: string) {
  const row = page.locator('.ag-row', { hasText: sampleCode }).first()
  const rowIndex = await row.getAttribute('row-index')
  await page.locator(`.ag-row[row-index="${rowIndex}"] .ag-cell[col-id="sample"]`).click()
  await page.keyboard.press('End')
  const cell = page.locator(`.ag-row[row-index="${rowIndex}"] .ag-cell[col-id="remark"]`)
  await cell.waitFor()
  return cell
}

async function writeRemark(page: Page, sampleCode: string, remark: string): Promise<void> {
  const cell = await remarkCell(page, sampleCode)
  await cell.dblclick()
  await cell.locator('input').fill(remark)
  await page.keyboard.press('Enter')
}

beforeAll(async () => {
  server = await startServer({ data: 'demo' })
  lead = await openBrowser()
  researcher = await openBrowser()
  await signIn(lead.page, server.origin, emailOf('lead'), DEMO_PASSWORD)
  await signIn(researcher.page, server.origin, emailOf('researcher'), DEMO_PASSWORD)
  await lead.page.goto(`${server.origin}/campaigns`)
  const href = await lead.page
    .locator('a[href^="/campaigns/"]', { hasText: /methanation|METH/ })
    .first()
    .getAttribute('href')
  campaign = `${server.origin}${href ?? ''}`
})
afterAll(async () => {
  await lead?.close()
  await researcher?.close()
  await server?.stop()
})

describe('ranking', () => {
  test('ranks seven samples and draws the best of them', async () => {
    await lead.page.goto(campaign)
    await lead.page.locator('.ag-row').nth(7).waitFor()
    const ranks = await lead.page.locator('.ag-cell[col-id="rank"]').allTextContents()
    expect(ranks.filter((rank) => /^[1-7]$/.test(rank.trim()))).toHaveLength(7)
    await lead.page.getByRole('img', { name: /^Arrhenius plot of CQ-/ }).waitFor()
  })

  test('opens the working of a number from the keyboard and goes back to its cell', async () => {
    const cell = lead.page.locator('.ag-row[row-index="0"] .ag-cell[col-id="activationEnergyJPerMol"]')
    await lead.page.locator('.ag-row[row-index="0"] .ag-cell[col-id="probabilityBest"]').click()
    if (await lead.page.getByRole('heading', { name: /^Working:/ }).isVisible())
      await lead.page.keyboard.press('Escape')
    await lead.page.keyboard.press('ArrowRight')
    await lead.page.keyboard.press('Enter')
    const heading = lead.page.getByRole('heading', { name: /^Working: activation energy/i })
    await heading.waitFor()
    expect(await heading.evaluate((element) => element === document.activeElement)).toBe(true)
    await lead.page.keyboard.press('Escape')
    await heading.waitFor({ state: 'detached' })
    expect(await cell.evaluate((element) => element.contains(document.activeElement))).toBe(true)
  })

  test('follows the reference temperature that the ruler is set to', async () => {
    await lead.page.getByRole('slider', { name: 'Reference temperature of the ranking' }).focus()
    await lead.page.keyboard.press('PageUp')
    await lead.page.getByText('TOF at 255 °C', { exact: true }).waitFor()
    expect(new URL(lead.page.url()).searchParams.get('at')).toBe('255')
    await lead.page.getByRole('button', { name: 'Back to the method’s temperature' }).click()
    await lead.page.getByText('TOF at 250 °C', { exact: true }).waitFor()
  })

  test('keeps a lead’s cells from a researcher and shows both values when two write one cell', async () => {
    await lead.page.goto(campaign)
    await researcher.page.goto(campaign)
    await lead.page.locator('.ag-row').nth(7).waitFor()
    await researcher.page.locator('.ag-row').nth(7).waitFor()
    await writeRemark(lead.page, 'CQ-103', 'seen by the lead')
    await lead.page.getByText('seen by the lead').waitFor()
    await writeRemark(researcher.page, 'CQ-103', 'seen by the researcher')
    const alert = researcher.page.getByRole('alert').filter({ hasText: 'changed by someone else' })
    await alert.waitFor()
    expect(await alert.textContent()).toContain('“seen by the lead”')
    expect(await alert.textContent()).toContain('“seen by the researcher”')
    await researcher.page.getByRole('button', { name: 'Write mine' }).click()
    await alert.waitFor({ state: 'detached' })
    await researcher.page.reload()
    await researcher.page.locator('.ag-row').nth(7).waitFor()
    expect(await (await remarkCell(researcher.page, 'CQ-103')).textContent()).toContain('seen by the researcher')
    const shortlist = researcher.page.locator('.ag-cell[col-id="isShortlisted"] input').first()
    expect(await shortlist.isDisabled()).toBe(true)
  })
})

describe('run', () => {
  test('leaves a hold out with a reason, shows both lines, and puts it back', async () => {
    const { page } = researcher
    await page.goto(`${campaign}/runs`)
    await page.getByRole('link', { name: 'R-0008' }).click()
    await page.getByRole('heading', { name: /^R-0008/ }).waitFor()
    await page.getByRole('button', { name: 'Pick hold 3' }).click()
    await page.getByRole('button', { name: 'Leave out', exact: true }).click()
    await page.getByLabel('Reason').fill('the bed jumped while the valve was turned')
    await page.getByRole('dialog').getByRole('button', { name: 'Leave out' }).click()
    await page.getByText('without what was left out').waitFor()
    await page.getByText('with it', { exact: true }).waitFor()
    await page.getByText(/not in the line, .*the bed jumped/).waitFor()
    await page.getByRole('button', { name: 'Put back', exact: true }).click()
    await page.getByLabel('Reason').fill('the log shows no jump')
    await page.getByRole('dialog').getByRole('button', { name: 'Put back' }).click()
    await page.getByText('without what was left out').waitFor({ state: 'detached' })
  })

  test('moves a window by numbers, and by the keyboard on the trace', async () => {
    const { page } = researcher
    await page.getByRole('slider', { name: 'Start of hold 2' }).focus()
    await page.keyboard.press('ArrowRight')
    await page.keyboard.press('Enter')
    await page.getByRole('dialog', { name: 'Move the window of hold 2' }).waitFor()
    await page.getByLabel('Reason').fill('the line was still being flushed')
    await page.getByRole('dialog').getByRole('button', { name: 'Move window' }).click()
    await page
      .getByRole('cell', { name: /moved/ })
      .or(page.getByRole('rowheader', { name: /moved/ }))
      .first()
      .waitFor()
  })

  test('gives a technician nothing to leave out', async () => {
    const technician = await openBrowser()
    try {
      await signIn(technician.page, server.origin, emailOf('technician'), DEMO_PASSWORD)
      await technician.page.goto(researcher.page.url())
      await technician.page.getByRole('heading', { name: /^R-0008/ }).waitFor()
      expect(await technician.page.getByRole('button', { name: 'Leave out', exact: true }).count()).toBe(0)
      expect(await technician.page.getByRole('slider', { name: /of hold/ }).count()).toBe(0)
    } finally {
      await technician.close()
    }
  })
})

describe('every page of a campaign', () => {
  test('has no serious fault in light and dark, fits 360 px and keeps to the content policy', async () => {
    const { page } = researcher
    const run = page.url()
    for (const address of [campaign, `${campaign}/slopes`, `${campaign}/runs`, run]) {
      await page.goto(address)
      await page.getByRole('main').locator('table:visible, .ag-row').first().waitFor()
      expect(await seriousFaults(page)).toEqual([])
      expect(await widthAt360(page), `${address} at 360 px`).toBeLessThanOrEqual(360)
    }
    const policy = (fault: string) => fault.includes('Content Security Policy') || fault.includes('hydrat')
    expect([...lead.faults, ...researcher.faults].filter(policy)).toEqual([])
  })

  test('compares two samples', async () => {
    const { page } = researcher
    await page.goto(`${campaign}/slopes`)
    await page.getByLabel('Sample', { exact: true }).selectOption({ index: 0 })
    await page.getByLabel('against', { exact: true }).selectOption({ index: 6 })
    await page.getByText(/is faster than/).waitFor()
    await page.getByRole('rowheader', { name: /Difference of Ea/ }).waitFor()
  })
})
