import 'server-only'
import { AppError } from '../domain/errors'

/** Refuses an edit of a version that is no longer the one kept, and shows what is. */
export function refuseStale(current: object & { readonly version: number }): never {
  throw new AppError(
    'stale',
    'Somebody changed this meanwhile. Nothing of your change was kept: look at what it is now, then repeat it.',
    { current },
  )
}

/** A change that names no field would only count the version up. */
export function refuseEmpty(change: object): void {
  if (Object.values(change).every((value) => value === undefined))
    throw new AppError('invalid', 'The change names no field. Send at least one.')
}

/** A field that is well-formed and yet cannot be. */
export function refuseField(field: string, message: string): never {
  throw new AppError('unprocessable', message, { issues: [{ field, message }] })
}
