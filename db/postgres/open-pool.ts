import 'server-only'
import { Pool, types, type PoolConfig } from 'pg'
import { insideTransaction } from '../inside-transaction'
import { INTERACTIVE_LIMITS } from '../database-limits'

const INT8 = 20

/** Whole numbers as numbers, as the other back end gives them; one too large for a double is refused rather than rounded. */
function parseInt8(text: string): number {
  const value = Number(text)
  if (!Number.isSafeInteger(value))
    throw new Error(`The number ${text} from the database is too large to be held exactly.`)
  return value
}

/** The outer methods are refused inside a transaction, as on the other back end. */
function guard(pool: Pool): Pool {
  for (const method of ['query', 'connect'] as const) {
    const original: (...parameters: never[]) => unknown = pool[method]
    Object.defineProperty(pool, method, {
      value: (...parameters: never[]) => {
        insideTransaction.refuseOuter(pool)
        return Reflect.apply(original, pool, parameters)
      },
    })
  }
  return pool
}

export function openPool(url: string, more: PoolConfig = {}): Pool {
  types.setTypeParser(INT8, parseInt8)
  const pool = new Pool({
    connectionString: url,
    max: 10,
    connectionTimeoutMillis: 10_000,
    statement_timeout: INTERACTIVE_LIMITS.callMs,
    lock_timeout: 3_000,
    idle_in_transaction_session_timeout: INTERACTIVE_LIMITS.transactionMs,
    application_name: 'inverse-kelvin',
    ...more,
  })
  // a connection lost while idle is replaced by the pool; without a listener it would end the process
  pool.on('error', (error) => console.error('A connection to the database was lost:', error.message))
  return guard(pool)
}
