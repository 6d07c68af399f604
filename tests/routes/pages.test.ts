import { readdirSync } from 'node:fs'
import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { z } from 'zod'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { selectAccount } from '@/db/queries/people'
import { startSession } from '@/lib/access/sign-in'
import type * as session from '@/lib/auth/session'
import { findHandlers } from '@/tests/support/find-handlers'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'

/*
 * Every page of the application, found by its file as the build finds it: one that is added later has to get its line here. A page decides for itself
 * who sees it, as no layout guards it.
 */
const cookie = vi.hoisted((): { secret: string | null } => ({ secret: null }))
vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => cookie.secret,
}))
vi.mock('next/headers', () => ({ headers: async () => new Headers({ 'x-request-path': '/here' }) }))

/** nobody; a researcher of no campaign; the lead of another one; of this one: guest, technician, researcher, lead; admin */
const callers = [
  null,
  'stranger',
  'other-lead',
  'own-guest',
  'own-technician',
  'own-researcher',
  'own-lead',
  'admin',
] as const

/*
 * Written by hand from the table of who may do what. `s` shown, `-` not found, `i` sent to sign in, `h` sent home, `e` to the editions. The columns are the callers above.
 */
const table: Readonly<Record<string, string>> = {
  '(public)/invitation': 's s s s s s s s',
  '(public)/set-up': '- - - - - - - -',
  '(public)/sign-in': 's h h h h h h h',
  validation: 's s s s s s s s',
  '(workspace)': 'i s s s s s s s',
  '(workspace)/calibrations/(list)': 'i s s - s s s s',
  '(workspace)/campaigns/(list)': 'i s s s s s s s',
  // a guest's way into a campaign leads to its editions
  '(workspace)/campaigns/[campaignId]': 'i - - e s s s s',
  '(workspace)/campaigns/[campaignId]/editions': 'i - - s s s s s',
  // none has been published
  '(workspace)/campaigns/[campaignId]/editions/[number]': 'i - - - - - - -',
  '(workspace)/campaigns/[campaignId]/history': 'i - - - - - s s',
  '(workspace)/campaigns/[campaignId]/method': 'i - - - s s s s',
  '(workspace)/campaigns/[campaignId]/people': 'i - - - s s s s',
  '(workspace)/campaigns/[campaignId]/runs': 'i - - - s s s s',
  '(workspace)/campaigns/[campaignId]/slopes': 'i - - - s s s s',
  '(workspace)/campaigns/new': 'i - s - - - s s',
  '(workspace)/column-maps': 'i s s - s s s s',
  '(workspace)/reactions/(list)': 'i s s - s s s s',
  '(workspace)/reactions/[reactionId]': 'i s s - s s s s',
  '(workspace)/reactions/new': 'i s s - - s s s',
  '(workspace)/rigs/(list)': 'i s s - s s s s',
  '(workspace)/rigs/[rigId]': 'i s s - s s s s',
  '(workspace)/rigs/new': 'i - - - - - - s',
  '(workspace)/runs/(list)': 'i s s - s s s s',
  '(workspace)/runs/[runId]': 'i - - - s s s s',
  '(workspace)/runs/[runId]/edit': 'i - - - s s s s',
  '(workspace)/runs/[runId]/intake': 'i - - - s s s s',
  '(workspace)/runs/new': 'i s s - s s s s',
  '(workspace)/samples/(list)': 'i s s - s s s s',
  '(workspace)/samples/[sampleId]': 'i - - - s s s s',
  '(workspace)/samples/new': 'i s s - s s s s',
  '(workspace)/settings': 'i s s s s s s s',
  '(workspace)/settings/people': 'i - - - - - - s',
}

const APP = path.resolve(import.meta.dirname, '../../app')
const pages = readdirSync(APP, { recursive: true, encoding: 'utf8' })
  .filter((file) => /(^|\/)page\.tsx$/.test(file.replaceAll(path.sep, '/')))
  .map((file) => file.replaceAll(path.sep, '/').replace(/\/?page\.tsx$/, ''))
  .sort()

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
const secrets = new Map<string | null, string>()
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  for (const caller of callers) {
    if (caller === null) continue
    const account = await selectAccount(await getDatabase(), caller)
    if (account === null) throw new Error(`there is no ${caller}`)
    secrets.set(caller, await startSession(account, { address: '10.9.0.1', userAgent: '', knownPeople: [] }))
  }
})
afterAll(() => opened.close())

const renderer = z.custom<(props: object) => unknown>((value) => typeof value === 'function')
const pageSchema = z.object({ default: renderer, generateMetadata: renderer.optional() })

async function load(page: string) {
  const exported: unknown = await import(pathToFileURL(path.join(APP, page, 'page.tsx')).href)
  const { default: show, generateMetadata: title } = pageSchema.parse(exported)
  return { show, title }
}

const digestSchema = z.object({ digest: z.string() })

/** What comes of asking: shown, or where the framework is told to go instead. Anything else is a fault and fails the test. */
async function outcomeOf(ask: () => unknown): Promise<string> {
  try {
    await ask()
    return 's'
  } catch (error) {
    const digest = digestSchema.safeParse(error).data?.digest ?? ''
    if (digest.startsWith('NEXT_HTTP_ERROR_FALLBACK;404')) return '-'
    if (/^NEXT_REDIRECT;[a-z]*;\/sign-in\?next=%2Fhere;/.test(digest)) return 'i'
    if (/^NEXT_REDIRECT;[a-z]*;\/;/.test(digest)) return 'h'
    if (/^NEXT_REDIRECT;[a-z]*;\/campaigns\/[^/]+\/editions;/.test(digest)) return 'e'
    throw error
  }
}

test('the table has a line for every page, and for no other', () => {
  expect(pages).toEqual(Object.keys(table).sort())
})

test('outside the interface there is one handler more, which ends a session for whoever has one', async () => {
  const others = (await findHandlers()).filter((one) => !one.file.startsWith('app/api/v1/'))
  expect(others.map(({ name }) => name)).toEqual(['POST app/(public)/sign-out/route.ts'])
})

describe('who sees which page', () => {
  const own = () => ({
    campaignId: lab.own.campaign.id,
    runId: lab.own.run.id,
    sampleId: lab.own.sample.id,
    reactionId: lab.reaction.id,
    rigId: lab.rig.id,
  })
  const propsOf = (params: object) => ({ params: Promise.resolve(params), searchParams: Promise.resolve({}) })

  test.each(Object.entries(table))('%s: %s', async (page, expected) => {
    const { show, title } = await load(page)
    const seen: string[] = []
    for (const caller of callers) {
      cookie.secret = secrets.get(caller) ?? null
      const outcome = await outcomeOf(() => show(propsOf(own())))
      seen.push(outcome)
      // nor does the title say what the page does not
      if (title !== undefined && outcome !== 's') expect(await outcomeOf(() => title(propsOf(own())))).toBe(outcome)
    }
    expect(seen.join(' ')).toBe(expected)
  })

  test.each(pages.filter((page) => page.includes('[')))('%s: what is not there is not found', async (page) => {
    const { show } = await load(page)
    cookie.secret = secrets.get('admin') ?? null
    const nowhere = Object.fromEntries(Object.keys(own()).map((name) => [name, 'nowhere']))
    expect(await outcomeOf(() => show(propsOf(nowhere)))).toBe('-')
  })
})
