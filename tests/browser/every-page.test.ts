import { readdirSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { DEMO_PASSWORD, demoPeople } from '@/db/demo/demo-campaign'
import { openBrowser, signIn, type BrowserSession } from '@/tests/support/browser'
import { seriousFaults, widthAt360 } from '@/tests/support/page-checks'
import { startServer, type DemoServer } from '@/tests/support/demo-server'
import { demoClient } from '@/tests/support/demo-client'

// Every page that stands in the tree, found by its file, so that none escapes: nothing serious for axe in light and dark, no fault in the console,
// no sideways scroll at 360 px. The set-up page is not there once a product is set up; people.test.ts looks at it.

const APP = path.resolve(import.meta.dirname, '../../app')

/** Addresses of all pages, with groups taken out: `/campaigns/[campaignId]/slopes`. */
const pages = (readdirSync(APP, { recursive: true }) as string[])
  .filter((file) => path.basename(file) === 'page.tsx')
  .map((file) => `/${path.dirname(file)}`.replaceAll(/\/\([^)]*\)/g, '').replace(/\/\.$/, '/') || '/')
  .filter((page) => page !== '/set-up')
  .sort()

let server: DemoServer
let session: BrowserSession
const ids: Record<string, string> = {}

beforeAll(async () => {
  server = await startServer({ data: 'demo' })
  const client = await demoClient(server.origin, 'admin')
  const first = async (route: string) => (await client<{ items: { id: string }[] }>(route)).items[0]?.id ?? ''
  ids['campaignId'] = await first('/campaigns')
  ids['reactionId'] = await first('/reactions')
  ids['rigId'] = await first('/rigs')
  ids['sampleId'] = await first('/samples')
  ids['runId'] = await first('/runs')
  session = await openBrowser()
}, 300_000)
afterAll(async () => {
  await session?.close()
  await server?.stop()
})

const isPublic = (page: string) => ['/sign-in', '/invitation', '/validation'].includes(page)

async function look(page: string): Promise<string[]> {
  const address = page.replaceAll(/\[(\w+)\]/g, (_whole, name: string) => ids[name] ?? '')
  const faults: string[] = []
  const known = session.faults.length
  const answer = await session.page.goto(`${server.origin}${address}`)
  if (answer?.status() !== 200) faults.push(`${address} answered ${answer?.status()}`)
  await session.page.locator('h1').first().waitFor({ timeout: 20_000 })
  await session.page.waitForTimeout(400)
  faults.push(...(await seriousFaults(session.page)))
  const width = await widthAt360(session.page)
  if (width > 360) faults.push(`${width} px wide at 360`)
  return [...faults, ...session.faults.slice(known)]
}

test.each(pages.filter(isPublic))('%s without a sign-in', async (page) => {
  expect(await look(page)).toEqual([])
})

test('the pages behind the sign-in, as admin', { timeout: 400_000 }, async () => {
  const admin = demoPeople.find((person) => person.role === 'admin')
  await signIn(session.page, server.origin, admin?.email ?? '', DEMO_PASSWORD)
  const found: Record<string, string[]> = {}
  for (const page of pages.filter((one) => !isPublic(one))) {
    const faults = await look(page)
    if (faults.length > 0) found[page] = faults
  }
  expect(found).toEqual({})
})
