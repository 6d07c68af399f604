import { type ColumnMapSpecification } from '../domain/column-map'
import { type ReadingContext } from './reading-context'

/** One file to look at or to read, for the reading thread. */
export type ReadTask =
  | { readonly kind: 'detect'; readonly path: string; readonly name: string; readonly context: ReadingContext }
  | {
      readonly kind: 'read'
      readonly path: string
      readonly name: string
      readonly context: ReadingContext
      readonly specification: ColumnMapSpecification
    }
  | { readonly kind: 'response-factors'; readonly path: string; readonly name: string }
