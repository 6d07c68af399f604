import { AppError } from '@/lib/domain/errors'
import { pathIds } from './_path-id'

export type EditionContext = { params: Promise<{ campaignId: string; number: string }> }

/** Campaign and number of an edition's address. */
export async function editionPath(context: EditionContext): Promise<{ campaignId: string; number: number }> {
  const { campaignId, number } = await pathIds(context)
  if (!/^[1-9]\d{0,6}$/.test(number))
    throw new AppError('not-found', 'There is nothing here under this address, or not for you.')
  return { campaignId, number: Number(number) }
}
