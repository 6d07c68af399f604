import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, expect, test, vi } from 'vitest'
import { POST as postPerson } from '@/app/api/v1/people/route'
import { POST as postRun } from '@/app/api/v1/runs/route'
import { getDatabase, type OpenDatabase } from '@/db/client'
import type * as peopleMutations from '@/db/mutations/people'
import { idempotencyKeys, runs, users } from '@/db/schema'
import { createToken } from '@/lib/access/tokens'
import type * as session from '@/lib/auth/session'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'

vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => null,
}))
/** The process dies when the change is committed and its answer is about to be kept. */
const death = vi.hoisted(() => ({ isNear: false }))
vi.mock('@/db/mutations/people', async (original) => {
  const real = await original<typeof peopleMutations>()
  return {
    ...real,
    storeIdempotentAnswer: async (...given: Parameters<typeof real.storeIdempotentAnswer>) => {
      if (death.isNear) throw new Error('killed')
      return real.storeIdempotentAnswer(...given)
    },
  }
})

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
let secret: string
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  const token = await createToken(lab.admin, {
    name: 'script',
    scopes: ['read', 'intake', 'write'],
    campaignId: null,
    validDays: 1,
  })
  secret = token.secret
})
afterAll(() => opened.close())
beforeEach(() => {
  death.isNear = false
})

const post = (path: string, key: string, body: unknown) =>
  new Request(`http://localhost:3000/api/v1${path}`, {
    method: 'POST',
    headers: { Authorization: `Bearer ${secret}`, 'Content-Type': 'application/json', 'Idempotency-Key': key },
    body: JSON.stringify(body),
  })
const runCount = async () => (await (await getDatabase()).select({ id: runs.id }).from(runs)).length

test('a run whose answer was lost is answered as it would have been the first time, and is there once', async () => {
  const before = await runCount()
  const body = lab.own.runInput({ notes: 'over a bad connection' })
  death.isNear = true
  expect((await postRun(post('/runs', 'lost-run-key', body))).status).toBe(500)
  expect(await runCount()).toBe(before + 1)
  death.isNear = false
  const again = await postRun(post('/runs', 'lost-run-key', body))
  expect(again.status).toBe(201)
  const run: { id: string; notes: string } = await again.json()
  const [row] = await (await getDatabase()).select().from(runs).where(eq(runs.id, run.id))
  expect([row?.notes, run.notes]).toEqual(['over a bad connection', 'over a bad connection'])
  expect([again.headers.get('etag'), again.headers.get('location')]).toEqual([
    `W/"${run.id}.1"`,
    `/api/v1/runs/${run.id}`,
  ])
  // and so it is from the answer that is kept now
  const third = await postRun(post('/runs', 'lost-run-key', body))
  expect([third.status, third.headers.get('etag'), await third.json()]).toEqual([201, again.headers.get('etag'), run])
  expect(await runCount()).toBe(before + 1)
})

test('an invitation whose answer was lost is not made twice, and no code that opens nothing is given out', async () => {
  const body = { email: 'lost@example.test', displayName: 'Lost', role: 'researcher' }
  death.isNear = true
  expect((await postPerson(post('/people', 'lost-person-key', body))).status).toBe(500)
  death.isNear = false
  for (let n = 0; n < 2; n++) {
    const again = await postPerson(post('/people', 'lost-person-key', body))
    expect(again.status).toBe(409)
    const said = await again.text()
    expect(said).toContain('This was done with the first request.')
    expect(said).not.toContain('code_')
  }
  const db = await getDatabase()
  expect(await db.select().from(users).where(eq(users.email, body.email))).toHaveLength(1)
  expect(JSON.stringify(await db.select().from(idempotencyKeys))).not.toContain('code_')
})
