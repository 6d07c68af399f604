import { notFound } from 'next/navigation'
import { appErrorOf } from '@/lib/domain/errors'

/** Reads for a page: what is not there, or not for this person, becomes the page that says so. */
export async function showOrNotFound<T>(reading: Promise<T>): Promise<T> {
  try {
    return await reading
  } catch (error) {
    const code = appErrorOf(error)?.code
    if (code === 'not-found' || code === 'not-allowed') notFound()
    throw error
  }
}
