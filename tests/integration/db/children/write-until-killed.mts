// Opens a data folder, says what it finds there, then writes without end and says what was acknowledged.
import { writeSync } from 'node:fs'
import { sql } from 'drizzle-orm'
import { openFolderDatabase } from '@/db/client'

const [folder = '', round = '0', failSyncAfter] = process.argv.slice(2)
const { database } = await openFolderDatabase(folder, failSyncAfter ? { failSyncAfter: Number(failSyncAfter) } : {})
const say = (word: string, value: unknown) => writeSync(1, `${word} ${JSON.stringify(value)}\n`)

await database.execute(
  sql`create table if not exists written (round int, n int, half int, primary key (round, n, half))`,
)
await database.execute(sql`create table if not exists padding (round int, content text)`)
// once through the table and once through its index: a torn page would make them differ
const found = await database.execute(
  sql`select round, count(*)::int as rows, max(n)::int as last, count(distinct n)::int as numbers from written group by round order by round`,
)
const byIndex = await database.transaction(async (tx) => {
  await tx.execute(sql`set local enable_seqscan = off`)
  return tx.execute(
    sql`select round, count(*)::int as rows from written where round >= 0 group by round order by round`,
  )
})
say('found', { rows: found.rows, byIndex: byIndex.rows })

for (let n = 1; ; n++) {
  if (n % 3 === 0)
    await database.execute(sql`insert into written values (${Number(round)}, ${n}, 1), (${Number(round)}, ${n}, 2)`)
  else
    await database.transaction(async (tx) => {
      await tx.execute(sql`insert into written values (${Number(round)}, ${n}, 1)`)
      await tx.execute(sql`insert into padding values (${Number(round)}, ${'x'.repeat(3_000)})`)
      await tx.execute(sql`insert into written values (${Number(round)}, ${n}, 2)`)
    })
  say('acknowledged', n)
}
