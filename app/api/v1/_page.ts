import { z } from 'zod'
import { openCursor, sealCursor } from '@/lib/access/list-cursor'
import { type Page } from '@/lib/domain/page'
import { type Listed } from './_records'

/** What every list takes: how many rows, and where the one before it ended. */
export const pageQuery = {
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().min(1).max(600).optional(),
}

interface PageRequest<Key> {
  /** one row more than asked for, to see whether there are more */
  readonly page: Page<Key>
  readonly answer: <Row>(rows: readonly Row[], keyOf: (row: Row) => Key) => Listed<Row>
}

/** Reads the page asked for of a list, and makes the answer of its rows. */
export function pageOf<T extends z.ZodType>(
  list: string,
  query: { readonly limit: number; readonly cursor?: string | undefined },
  keySchema: T,
): PageRequest<z.output<T>> {
  const { limit, cursor } = query
  return {
    page: { limit: limit + 1, after: cursor === undefined ? null : openCursor(list, cursor, keySchema) },
    answer: (rows, keyOf) => {
      const items = rows.slice(0, limit)
      const last = items.at(-1)
      return { items, next: rows.length > limit && last !== undefined ? sealCursor(list, keyOf(last)) : null }
    },
  }
}
