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

const scoped = new AsyncLocalStorage<DatabaseLimits>()

export const databaseLimits = (): DatabaseLimits => scoped.getStore() ?? INTERACTIVE_LIMITS

/** Runs `work` with other deadlines: longer ones for a job nobody waits for, shorter ones in tests. */
export const withDatabaseLimits = <T>(limits: Partial<DatabaseLimits>, work: () => T): T =>
  scoped.run({ ...databaseLimits(), ...limits }, work)
