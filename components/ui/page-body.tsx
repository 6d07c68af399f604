import { type ReactNode } from 'react'
import { classNames } from './class-names'

/** What stands under the head of a page, on its margins; forms and running text are kept to a width that reads well. */
export function PageBody({
  isNarrow = false,
  children,
}: {
  readonly isNarrow?: boolean
  readonly children: ReactNode
}) {
  return <div className={classNames('px-4 sm:px-6', isNarrow && 'max-w-[46rem]')}>{children}</div>
}
