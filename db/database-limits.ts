import { AsyncLocalStorage } from 'node:async_hooks'

export interface DatabaseLimits {
  /** how long one statement may run */
  readonly callMs: number
  /** how long a transaction may stay open */
  readonly transactionMs: number
  /** how long a caller waits for its turn */
  readonly waitMs: number
}

export const INTERACTIVE_LIMITS: DatabaseLimits = { callMs: 10_000, transactionMs: 15_000, waitMs: 20_000 }

// The open database belongs to one of the several copies that a server process holds of this module; all of them share this one scope.
const key = Symbol.for('inverse-kelvin.database-limits')
const shared = globalThis as typeof globalThis & { [key]?: AsyncLocalStorage<DatabaseLimits> }
const scoped = (shared[key] ??= new AsyncLocalStorage<DatabaseLimits>())

export const databaseLimits = (): DatabaseLimits => scoped.getStore() ?? INTERACTIVE_LIMITS

/** Runs `work` with other deadlines: longer ones for a job nobody waits for, shorter ones in tests. */
export const withDatabaseLimits = <T>(limits: Partial<DatabaseLimits>, work: () => T): T =>
  scoped.run({ ...databaseLimits(), ...limits }, work)
