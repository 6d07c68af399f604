import { readFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { DEMO_PASSWORD, demoPeople } from '@/db/demo/demo-campaign'
import truth from '@/tests/reference/methanation-truth.json'
import { openBrowser, signIn, type BrowserSession } from '@/tests/support/browser'
import { seriousFaults } from '@/tests/support/page-checks'
import { startServer, type DemoServer } from '@/tests/support/demo-server'

// One way through the product as people take it: log a run, hand its files in, see its points, compare, download; and what each role is refused.

const FILES = path.resolve(import.meta.dirname, '../../db/demo/files')
const emailOf = (role: string) => demoPeople.find((person) => person.role === role)?.email ?? ''

let server: DemoServer
let technician: BrowserSession
let campaignId = ''
let runId = ''

interface RankingBody {
  readonly summary: string
  readonly rows: readonly {
    readonly sampleCode: string
    readonly rank: number | null
    readonly activationEnergyInterval: readonly [number, number] | null
    readonly lnPreExponentialInterval: readonly [number, number] | null
    readonly cautions: readonly { readonly code: string }[]
    readonly runs: readonly {
      readonly runId: string
      readonly code: string
      readonly isIncluded: boolean
      readonly reason: string
    }[]
  }[]
}

async function tokenOf(role: string): Promise<string> {
  const answer = await fetch(`${server.origin}/api/v1/tokens`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({
      email: emailOf(role),
      password: DEMO_PASSWORD,
      name: 'test',
      scopes: ['read', 'intake', 'write'],
    }),
  })
  expect(answer.status).toBe(201)
  return ((await answer.json()) as { secret: string }).secret
}

const api = async (role: string, route: string, init: RequestInit = {}) =>
  fetch(`${server.origin}/api/v1${route}`, {
    ...init,
    headers: { authorization: `Bearer ${await tokenOf(role)}`, ...init.headers },
  })

beforeAll(async () => {
  server = await startServer({ data: 'demo' })
  technician = await openBrowser()
  await signIn(technician.page, server.origin, emailOf('technician'), DEMO_PASSWORD)
}, 300_000)

afterAll(async () => {
  await technician?.close()
  await server?.stop()
})

test('a technician logs a run, filled in from the last one on the rig', async () => {
  const { page } = technician
  await page.goto(`${server.origin}/runs/new`)
  await page.getByLabel('Rig', { exact: true }).selectOption({ label: 'Rig B, Fixed bed, one tube' })
  await page.getByText('A bed packed for this run').click()
  await page.getByLabel('Sample', { exact: true }).selectOption({ label: 'CQ-101, 5 wt% Ni on alumina, reference lot' })
  await page.getByLabel('Catalyst', { exact: true }).fill('80,3 mg')
  await page.getByLabel('Diluent', { exact: true }).fill('450 mg SiC')
  await page.getByLabel('Sieve fraction').fill('125 to 180 µm')
  await page.getByLabel('Bed length').fill('18 mm')
  await page.getByLabel('Flow of CO₂').fill('7,2 mL/min')
  await page.getByLabel('Start', { exact: true }).fill('2026-03-02T07:30')
  // what was understood is said back, and the cautions stand where the hand is
  await expect.poll(() => page.getByText(/80.3 mg/).count()).toBeGreaterThan(0)
  await expect.poll(() => page.getByText(/Local codes/).count()).toBeGreaterThan(0)
  expect(await seriousFaults(page)).toEqual([])
  await page.getByRole('button', { name: 'Save and add files' }).click()
  await page.waitForURL(/\/runs\/[^/]+\/intake/, { timeout: 20_000 })
  runId = /\/runs\/([^/]+)\/intake/.exec(page.url())?.[1] ?? ''
  expect(runId).not.toBe('')
})

test('adds the two files, which the rig’s column maps know, and sees the points', async () => {
  const { page } = technician
  await page
    .locator('input[type=file]')
    .setInputFiles(['R-0001-rig.csv', 'R-0001-analysis.csv'].map((name) => path.join(FILES, name)))
  await expect.poll(() => page.getByRole('button', { name: 'Confirm' }).count(), { timeout: 30_000 }).toBe(2)
  await page.getByText('would be taken in').first().waitFor()
  expect(await seriousFaults(page)).toEqual([])
  await page.getByRole('button', { name: 'Confirm' }).first().click()
  await expect.poll(() => page.getByRole('button', { name: 'Confirm' }).count(), { timeout: 30_000 }).toBe(1)
  await page.getByRole('button', { name: 'Confirm' }).click()
  await page.getByRole('link', { name: 'See the points' }).click()
  await page.waitForURL(new RegExp(`/runs/${runId}$`))
  await page.getByRole('heading', { name: /^Points/ }).waitFor({ timeout: 30_000 })
  await expect.poll(() => page.getByText('8 holds').count(), { timeout: 30_000 }).toBeGreaterThan(0)
})

test('the same bytes again make no second copy', async () => {
  const { page } = technician
  await page.goto(`${server.origin}/runs/${runId}/intake`)
  await page.locator('input[type=file]').setInputFiles(path.join(FILES, 'R-0001-rig.csv'))
  await page
    .getByText(/no second copy|already/i)
    .first()
    .waitFor()
  expect(technician.faults).toEqual([])
})

test('the ranking holds what was put in: Ea and ln A of six samples, and every caution', async () => {
  const me = (await (await api('researcher', '/me')).json()) as { memberships: Record<string, string> }
  campaignId = Object.keys(me.memberships)[0] ?? ''
  const ranking = (await (await api('researcher', `/campaigns/${campaignId}/ranking`)).json()) as RankingBody
  for (const code of ['CQ-101', 'CQ-102', 'CQ-103', 'CQ-104', 'CQ-105']) {
    const row = ranking.rows.find((one) => one.sampleCode === code)
    const expected = truth.runs.find((run) => run.sample === code)
    const [low, high] = row?.activationEnergyInterval ?? [Number.NaN, Number.NaN]
    expect((expected?.apparent_ea_kj_mol ?? Number.NaN) * 1000, code).toBeGreaterThan(low)
    expect((expected?.apparent_ea_kj_mol ?? Number.NaN) * 1000, code).toBeLessThan(high)
    const [lnLow, lnHigh] = row?.lnPreExponentialInterval ?? [Number.NaN, Number.NaN]
    expect(expected?.ln_a_mol_per_kg_s, code).toBeGreaterThan(lnLow)
    expect(expected?.ln_a_mol_per_kg_s, code).toBeLessThan(lnHigh)
  }
  const codes = (sample: string) =>
    ranking.rows.find((row) => row.sampleCode === sample)?.cautions.map((one) => one.code)
  expect(codes('CQ-106')).toEqual(expect.arrayContaining(['line-bends', 'pore-diffusion-likely']))
  expect(codes('CQ-107')).toContain('deactivation')
  const undecided = ranking.rows.flatMap((row) => row.runs).find((run) => run.code === 'R-0009')
  expect(undecided?.isIncluded).toBe(false)
  expect(undecided?.reason).toMatch(/until a lead decides/)
  expect(ranking.rows.find((row) => row.sampleCode === 'SiC')?.rank).toBeNull()
})

test('a researcher compares two samples and downloads the table', async () => {
  const researcher = await openBrowser()
  try {
    const { page } = researcher
    await signIn(page, server.origin, emailOf('researcher'), DEMO_PASSWORD)
    await page.goto(`${server.origin}/campaigns/${campaignId}/slopes`)
    await page
      .getByRole('heading', { name: /Compar|Difference/ })
      .first()
      .waitFor({ timeout: 20_000 })
    await page.goto(`${server.origin}/campaigns/${campaignId}`)
    await page.getByText('CQ-104').first().waitFor({ timeout: 20_000 })
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'CSV' }).click(),
    ])
    const text = readFileSync(await download.path(), 'utf8')
    const [head = '', ...rows] = text.trim().split('\r\n')
    expect(head).toContain('Apparent activation energy [kJ mol⁻¹]')
    expect(rows).toHaveLength(8)
    expect(text).toContain('CQ-104')
    expect(researcher.faults).toEqual([])
  } finally {
    await researcher.close()
  }
})

test('a workbook comes out as a workbook', async () => {
  const answer = await api('lead', `/campaigns/${campaignId}/ranking.xlsx`)
  expect(answer.status).toBe(200)
  const bytes = new Uint8Array(await answer.arrayBuffer())
  expect([...bytes.subarray(0, 2)]).toEqual([0x50, 0x4b])
})

test('what a role may not do is refused by the server', async () => {
  const run = (await (await api('technician', `/runs/${runId}`)).json()) as { version: number }
  const version = { 'if-match': `W/"${runId}.${run.version}"`, 'content-type': 'application/json' }
  const decision = JSON.stringify({ decision: 'counts', reason: 'because I say so' })
  const decide = (role: string) =>
    api(role, `/runs/${runId}/decision`, { method: 'POST', headers: version, body: decision })
  expect((await decide('technician')).status).toBe(403)
  expect((await decide('researcher')).status).toBe(403)
  expect((await decide('guest')).status).toBe(404)
  const exclusion = JSON.stringify({ kind: 'hold', atS: 1_772_000_000, reason: 'not to my liking' })
  const leaveOut = (role: string) =>
    api(role, `/runs/${runId}/exclusions`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: exclusion,
    })
  expect((await leaveOut('technician')).status).toBe(403)
  for (const route of [`/campaigns/${campaignId}/ranking`, `/runs/${runId}`, `/runs/${runId}/result`])
    expect((await api('guest', route)).status, route).toBe(404)
  const guest = await openBrowser()
  try {
    await signIn(guest.page, server.origin, emailOf('guest'), DEMO_PASSWORD)
    const answer = await guest.page.goto(`${server.origin}/runs/${runId}`)
    expect(answer?.status()).toBe(404)
  } finally {
    await guest.close()
  }
})
