import { AppError, appErrorOf } from '@/lib/domain/errors'

export function mapDatabaseError(error: unknown): AppError | null {
  return appErrorOf(error)
}
