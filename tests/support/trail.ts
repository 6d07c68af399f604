import { asc } from 'drizzle-orm'
import { expect } from 'vitest'
import { getDatabase } from '@/db/client'
import { auditEntries } from '@/db/schema'
import { AppError } from '@/lib/domain/errors'

/** The whole audit trail, oldest first. */
export async function trail() {
  const db = await getDatabase()
  return db.select().from(auditEntries).orderBy(asc(auditEntries.seq))
}

/** Code of the failure that something ends in; fails where it does not fail. */
export async function refusalOf(work: Promise<unknown>): Promise<AppError> {
  const outcome = await work.then(
    () => null,
    (error: unknown) => error,
  )
  expect(outcome).toBeInstanceOf(AppError)
  if (!(outcome instanceof AppError)) throw new Error('not refused')
  return outcome
}
