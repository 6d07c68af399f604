import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { afterAll, describe, expect, test } from 'vitest'
import { openFolderDatabase } from '@/db/client'
import { startChild } from '../../support/start-child'

const parent = mkdtempSync(path.join(tmpdir(), 'crash-'))
const folder = path.join(parent, 'database')
afterAll(() => rmSync(parent, { recursive: true, force: true }))

/** `npm run test:long` asks for more. */
const KILLS = Number(process.env.KILLS ?? 25)

const writeUntilKilled = (...parameters: string[]) =>
  startChild('tests/integration/db/children/write-until-killed.mts', folder, ...parameters)

const lastAcknowledged = (lines: readonly string[]) =>
  Number(lines.findLast((line) => line.startsWith('acknowledged '))?.slice('acknowledged '.length) ?? 0)

interface Found {
  readonly rows: { readonly round: number; readonly rows: number; readonly last: number; readonly numbers: number }[]
  readonly byIndex: { readonly round: number; readonly rows: number }[]
}

/** Everything acknowledged is there, in whole pairs; at most the one under way at the kill is there besides. */
function faultsIn(found: Found, acknowledged: ReadonlyMap<number, number>): string[] {
  const faults: string[] = []
  for (const [round, last] of acknowledged) {
    const row = found.rows.find((entry) => entry.round === round) ?? { rows: 0, last: 0, numbers: 0 }
    if (row.last !== last && row.last !== last + 1)
      faults.push(`round ${round}: ${last} acknowledged, ${row.last} found`)
    if (row.numbers !== row.last || row.rows !== 2 * row.last) faults.push(`round ${round}: half a change`)
  }
  const counts = (rows: readonly { round: number; rows: number }[]) =>
    JSON.stringify(rows.map((row) => [row.round, row.rows]))
  if (counts(found.rows) !== counts(found.byIndex)) faults.push('table and index differ')
  return faults
}

describe.skipIf(process.env.TEST_BACKEND === 'postgres')('a process that dies', () => {
  test(
    `killed at ${KILLS} random moments while writing: every acknowledged row is there, and nobody else came in`,
    { timeout: KILLS * 15_000 },
    async () => {
      const acknowledged = new Map<number, number>()
      const faults: string[] = []
      let refusals = 0
      let state = 20_261_201
      const random = () => (state = (state * 48271) % 2147483647) / 2147483647
      for (let round = 1; round <= KILLS; round++) {
        const child = writeUntilKilled(String(round))
        const found: Found = JSON.parse((await child.line('found ')).slice('found '.length))
        faults.push(...faultsIn(found, acknowledged))
        await openFolderDatabase(folder).catch(
          (error: Error) => (refusals += error.name === 'DataFolderLockedError' ? 1 : 0),
        )
        await new Promise((resolve) => setTimeout(resolve, 20 + random() * 900))
        await child.kill()
        acknowledged.set(round, lastAcknowledged(child.lines))
      }
      const opened = await openFolderDatabase(folder)
      const rows = await opened.database.execute<Found['rows'][number] & Record<string, unknown>>(
        sql`select round, count(*)::int as rows, max(n)::int as last, count(distinct n)::int as numbers from written group by round order by round`,
      )
      faults.push(...faultsIn({ rows: rows.rows, byIndex: rows.rows }, acknowledged))
      await opened.close()
      const total = [...acknowledged.values()].reduce((sum, count) => sum + count, 0)
      console.log(`${KILLS} kills, ${total} acknowledged changes`)
      expect(faults).toEqual([])
      expect(refusals).toBe(KILLS)
      expect(total).toBeGreaterThan(KILLS)
    },
  )

  test('killed while the folder is first made: the next start makes it', async () => {
    const fresh = path.join(parent, 'fresh')
    const child = startChild('tests/integration/db/children/write-until-killed.mts', fresh, '1')
    // the folder under its final name appears only when it is whole
    await new Promise((resolve) => setTimeout(resolve, 1_500))
    await child.kill()
    const opened = await openFolderDatabase(fresh)
    expect((await opened.database.execute(sql`select count(*)::int as n from users`)).rows).toEqual([{ n: 0 }])
    await opened.close()
  })

  test('a disk that refuses a sync ends the process, and what was acknowledged before is there', async () => {
    const child = writeUntilKilled('1001', '60')
    expect(await child.ended()).toBe(70)
    const last = lastAcknowledged(child.lines)
    expect(last).toBeGreaterThan(5)
    const next = writeUntilKilled('1002')
    const found: Found = JSON.parse((await next.line('found ')).slice('found '.length))
    expect(faultsIn({ rows: found.rows, byIndex: found.byIndex }, new Map([[1001, last]]))).toEqual([])
    await next.kill()
  })
})
