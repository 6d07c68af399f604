import { z } from 'zod'
import { AppError } from '@/lib/domain/errors'

/** An id as it may stand in an address. */
export const idInAddress = z.string().regex(/^[\w.:-]{1,64}$/)

/** The parts of an address that are ids. What cannot be one names nothing. */
export async function pathIds<Name extends string>(context: {
  readonly params: Promise<Readonly<Record<Name, string>>>
}): Promise<Readonly<Record<Name, string>>> {
  const params = await context.params
  for (const value of Object.values<string>(params))
    if (!idInAddress.safeParse(value).success)
      throw new AppError('not-found', 'There is nothing here under this address, or not for you.')
  return params
}
