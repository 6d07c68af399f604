import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { idempotencyKeys, runs } from '@/db/schema'
import { onceForKey } from '@/lib/access/idempotency'
import { addRemark, createRun } from '@/lib/access/runs'
import { type Actor } from '@/lib/domain/role'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { refusalOf, trail } from '@/tests/support/trail'

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
let actor: Actor
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  actor = lab.own.lead
})
afterAll(() => opened.close())

const START = new Date('2026-03-02T08:00:00Z')
const after = (seconds: number) => new Date(START.getTime() + seconds * 1_000)
const request = { method: 'POST', path: '/runs', body: '{}' }
const kept = async () => ({
  runs: (await (await getDatabase()).select({ id: runs.id }).from(runs)).length,
  entries: (await trail()).length,
})
/** Makes a run and answers with it. */
const make = async () => {
  const run = await createRun(actor, lab.own.runInput())
  return { status: 201, body: run, headers: { location: `/runs/${run.id}` } }
}
const stop = () => new Promise<never>(() => {})

test('a process that dies between commit and answer: the repeat makes nothing and answers with what was made', async () => {
  const before = await kept()
  let made: unknown
  // nothing after the commit ever runs, as when the process is killed
  void onceForKey(
    actor,
    'key-of-the-dead',
    request,
    async () => {
      made = await createRun(actor, lab.own.runInput())
      return stop()
    },
    START,
  )
  await expect.poll(() => made).toBeDefined()
  for (const now of [after(5), after(5), after(80_000)]) {
    const again = await onceForKey(actor, 'key-of-the-dead', request, make, now)
    expect(again.status).toBe(201)
    expect(again.body).toEqual(made)
  }
  expect(await kept()).toEqual({ runs: before.runs + 1, entries: before.entries + 1 })
})

test('an answer that fails after the change keeps the key, and later than the time of an unanswered one', async () => {
  const before = await kept()
  let id = ''
  await expect(
    onceForKey(
      actor,
      'key-of-the-failed',
      request,
      async () => {
        id = (await createRun(actor, lab.own.runInput())).id
        throw new Error('killed')
      },
      START,
    ),
  ).rejects.toThrow('killed')
  const again = await onceForKey(actor, 'key-of-the-failed', request, make, after(4_000))
  expect(again).toMatchObject({ status: 201, body: { id }, headers: { location: `/runs/${id}` } })
  expect(await kept()).toEqual({ runs: before.runs + 1, entries: before.entries + 1 })
  // its whole answer is kept now, and with another body it is refused as before
  expect(await onceForKey(actor, 'key-of-the-failed', request, stop, after(4_001))).toMatchObject({ body: { id } })
  const other = onceForKey(actor, 'key-of-the-failed', { ...request, body: '[]' }, make, after(4_002))
  expect((await refusalOf(other)).code).toBe('unprocessable')
})

test('of two changes the one that was committed is not made again, the other is', async () => {
  const before = await kept()
  const both = (isKilled: boolean) => async () => {
    const run = await createRun(actor, lab.own.runInput())
    if (isKilled) throw new Error('killed')
    const remark = await addRemark(actor, run.id, 'bed looks grey')
    return { status: 201, body: [run.id, remark.body], headers: {} }
  }
  await expect(onceForKey(actor, 'key-of-the-two', request, both(true), START)).rejects.toThrow('killed')
  const { body } = await onceForKey(actor, 'key-of-the-two', request, both(false), after(1))
  expect(body).toEqual([expect.any(String), 'bed looks grey'])
  expect(await kept()).toEqual({ runs: before.runs + 1, entries: before.entries + 2 })
})

test('what was refused before its change committed frees the key', async () => {
  const before = await kept()
  const refused = onceForKey(
    actor,
    'key-of-the-refused',
    request,
    async () => {
      await createRun(actor, lab.own.runInput({ channel: 'no such' }))
      return stop()
    },
    START,
  )
  expect((await refusalOf(refused)).code).toBe('unprocessable')
  expect((await onceForKey(actor, 'key-of-the-refused', request, make, after(1))).status).toBe(201)
  expect(await kept()).toEqual({ runs: before.runs + 1, entries: before.entries + 1 })
})

test('a request that wakes up after its key was given to another commits nothing', async () => {
  const before = await kept()
  let wake = () => {}
  const asleep = new Promise<void>((resolve) => (wake = resolve))
  const late = onceForKey(actor, 'key-of-the-late', request, async () => (await asleep, make()), START)
  const refusal = refusalOf(late)
  await expect
    .poll(async () => {
      const rows = await (
        await getDatabase()
      )
        .select()
        .from(idempotencyKeys)
        .where(eq(idempotencyKeys.key, 'key-of-the-late'))
      return rows.length
    })
    .toBe(1)
  const again = await onceForKey(actor, 'key-of-the-late', request, make, after(700))
  expect(again.status).toBe(201)
  wake()
  expect((await refusal).code).toBe('conflict')
  expect(await kept()).toEqual({ runs: before.runs + 1, entries: before.entries + 1 })
})
