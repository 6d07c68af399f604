import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, expect, test } from 'vitest'
import type { OpenDatabase, Transaction } from '@/db/client'
import { mapDatabaseError } from '@/db/map-database-error'
import { campaigns, lots, members, runs, samples, siteCounts, uploads, users } from '@/db/schema'
import { AppError } from '@/lib/domain/errors'
import { freshDatabase } from '../../support/fresh-database'
import { makeRun } from '../../support/make-run'

let opened: OpenDatabase
let ids: Awaited<ReturnType<typeof makeRun>>
beforeAll(async () => {
  opened = await freshDatabase()
  ids = await makeRun(opened.database, 'a')
})
afterAll(() => opened.close())

const refusal = (work: (tx: Transaction) => Promise<unknown>) =>
  opened.database.transaction(work).then(
    () => null,
    (error: unknown) =>
      error instanceof AppError ? { code: error.code, message: error.message, issues: error.details.issues } : error,
  )

test.each<{ name: string; work: (tx: Transaction) => Promise<unknown>; code: string; says: RegExp; field?: string }>([
  {
    name: 'the same address in other letters',
    work: (tx) =>
      tx.insert(users).values({
        id: 'x',
        email: 'A@EXAMPLE.test',
        displayName: 'x',
        role: 'lead',
        passwordHash: '',
        passwordScheme: '',
      }),
    code: 'conflict',
    says: /has an account already/,
    field: 'email',
  },
  {
    name: 'a role that is none',
    work: (tx) => tx.update(users).set({ role: 'root' }),
    code: 'invalid',
    says: /technician, researcher, lead, guest and admin/,
    field: 'role',
  },
  {
    name: 'a campaign code that is taken',
    work: (tx) =>
      tx.insert(campaigns).values({ id: 'x', code: 'a', name: 'x', reactionId: ids.reactionId, createdBy: ids.userId }),
    code: 'conflict',
    says: /campaign with this code/,
    field: 'code',
  },
  {
    name: 'a sample code that is taken',
    work: (tx) => tx.insert(samples).values({ id: 'x', code: 'a', name: 'x', createdBy: ids.userId }),
    code: 'conflict',
    says: /sample with this code/,
    field: 'code',
  },
  {
    name: 'a lot of a sample that is not there',
    work: (tx) => tx.insert(lots).values({ id: 'x', code: 'x', sampleId: 'nowhere', createdBy: ids.userId }),
    code: 'conflict',
    says: /^The sample named here does not exist/,
  },
  {
    name: 'a sample that is in use',
    work: (tx) => tx.delete(samples),
    code: 'conflict',
    says: /still in use/,
  },
  {
    name: 'a site count of nothing',
    work: (tx) =>
      tx.insert(siteCounts).values({
        id: 'x',
        sampleId: ids.sampleId,
        method: 'x',
        molPerKg: 0,
        relativeStandardUncertainty: 0.1,
        createdBy: ids.userId,
      }),
    code: 'invalid',
    says: /above zero/,
    field: 'molPerKg',
  },
  {
    name: 'a decision on a run that is open',
    work: (tx) => tx.update(runs).set({ decision: 'counts' }),
    code: 'invalid',
    says: /decided run/,
    field: 'decision',
  },
  {
    name: 'the same bytes in the same run',
    work: (tx) =>
      tx.insert(uploads).values({
        id: 'x',
        campaignId: ids.campaignId,
        runId: ids.runId,
        sha256: '0'.repeat(64),
        byteCount: 1,
        fileName: 'again.csv',
        createdBy: ids.userId,
      }),
    code: 'conflict',
    says: /this very file/,
    field: 'file',
  },
  {
    name: 'a member twice',
    work: (tx) => {
      const member = { campaignId: ids.campaignId, userId: ids.userId, role: 'lead' }
      return tx.insert(members).values([member, member])
    },
    code: 'conflict',
    says: /member of the campaign already/,
    field: 'userId',
  },
  {
    name: 'a value that is missing',
    work: (tx) => tx.execute(sql`insert into samples (id, code, created_by) values ('x', 'x', ${ids.userId})`),
    code: 'invalid',
    says: /missing in samples/,
  },
  {
    name: 'a text no database can hold',
    work: (tx) => tx.update(samples).set({ name: 'a\u0000b' }),
    code: 'invalid',
    says: /cannot be stored/,
  },
])('$name: $code', async ({ work, code, says, field }) => {
  expect(await refusal(work)).toMatchObject({
    code,
    message: expect.stringMatching(says),
    issues: field ? [{ field }] : [],
  })
})

test('a fault of ours is not explained to anybody', async () => {
  const error = await refusal((tx) => tx.execute(sql`select nothing from nowhere`))
  expect(error).not.toBeInstanceOf(AppError)
  expect(mapDatabaseError(error)).toBeNull()
  expect(mapDatabaseError(new Error('x'))).toBeNull()
})
