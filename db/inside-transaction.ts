import { AsyncLocalStorage } from 'node:async_hooks'

interface Scope {
  readonly owner: object
  readonly transaction: { readonly isOpen: boolean }
}

const scope = new AsyncLocalStorage<Scope>()

/**
 * Knows whether the running code stands inside a transaction's callback. There the outer database would wait for the transaction, and the
 * transaction for the callback: for ever. It is refused at once instead, on both back ends.
 */
export const insideTransaction = {
  run: <T>(owner: object, transaction: { readonly isOpen: boolean }, work: () => T): T =>
    scope.run({ owner, transaction }, work),

  refuseOuter(owner: object) {
    const inside = scope.getStore()
    if (inside?.owner === owner && inside.transaction.isOpen)
      throw new Error('Inside a transaction every statement goes through the transaction, not through the database.')
  },
}
