/** A part of a long list: so many rows, after the row whose sort key is given. */
export interface Page<Key> {
  readonly limit: number
  readonly after: Key | null
}

/** As many rows as a screen ever asks for at once. */
export const LARGEST_LIST = 10_000

export const wholeList = { limit: LARGEST_LIST, after: null } as const
