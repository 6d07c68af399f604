import 'server-only'
import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { is } from 'drizzle-orm'
import { PgTransaction } from 'drizzle-orm/pg-core'
import { from as copyFrom, type CopyStreamQuery } from 'pg-copy-streams'
import type { Transaction } from './executor'
import type { StatementRunner } from './pglite/thread-client'

const SIGNATURE = Buffer.from('PGCOPY\n\u00ff\r\n\0\0\0\0\0\0\0\0\0', 'latin1')
const TRAILER = Buffer.from([0xff, 0xff])

export type CopyValue = string | Uint8Array | { readonly int4: number } | { readonly float8: number } | null

function encode(value: CopyValue): Uint8Array | null {
  if (value === null || value instanceof Uint8Array) return value
  if (typeof value === 'string') return Buffer.from(value, 'utf8')
  const bytes = Buffer.alloc('int4' in value ? 4 : 8)
  if ('int4' in value) bytes.writeInt32BE(value.int4)
  else bytes.writeDoubleBE(value.float8)
  return bytes
}

/** One row in the binary form of COPY. */
export function encodeCopyRow(values: readonly CopyValue[]): Uint8Array {
  const count = Buffer.alloc(2)
  count.writeInt16BE(values.length)
  const parts: Uint8Array[] = [count]
  for (const value of values) {
    const bytes = encode(value)
    const length = Buffer.alloc(4)
    length.writeInt32BE(bytes === null ? -1 : bytes.length)
    parts.push(length)
    if (bytes !== null) parts.push(bytes)
  }
  return Buffer.concat(parts)
}

/** The connection under a transaction: the query builder has no word for COPY. */
function connectionOf(tx: Transaction): StatementRunner | { query(stream: CopyStreamQuery): CopyStreamQuery } {
  if (!is(tx, PgTransaction)) throw new Error('COPY runs inside a transaction')
  const session: unknown = Reflect.get(tx, 'session')
  if (typeof session !== 'object' || session === null) throw new Error('the transaction has no session')
  return Reflect.get(session, 'client') as ReturnType<typeof connectionOf>
}

/** Copies rows into a table; `target` is written in this repository, never put together from input: `readings (a, b)`. */
export async function copyBinaryInto(tx: Transaction, target: string, rows: readonly Uint8Array[]): Promise<void> {
  const connection = connectionOf(tx)
  if ('exec' in connection) {
    const blob = new Uint8Array(Buffer.concat([SIGNATURE, ...rows, TRAILER]))
    await connection.query(`copy ${target} from '/dev/blob' with (format binary)`, [], { blob })
    return
  }
  const stream = connection.query(copyFrom(`copy ${target} from stdin with (format binary)`))
  await pipeline(Readable.from([SIGNATURE, ...rows, TRAILER]), stream)
}
