import 'server-only'
import { AppError } from '../domain/errors'

/** Stops what the policy does not allow, for somebody who may know that the thing exists. */
export function authorise(
  allowed: boolean,
  message = 'Your role does not allow this. A lead of the campaign or an admin can do it, or change your role.',
): asserts allowed {
  if (!allowed) throw new AppError('not-allowed', message)
}

/** Hides what somebody may not even know of: the same words as for a thing that does not exist. */
export function hideUnless(member: boolean): asserts member {
  if (!member) throw new AppError('not-found', 'There is nothing here under this address, or not for you.')
}
