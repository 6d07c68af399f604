import { type ReactNode } from 'react'

/** Head of a page: title with what it is of, one line of facts, and what can be done at the right. */
export function PageHead({
  title,
  of,
  meta,
  actions,
  children,
}: {
  readonly title: ReactNode
  /** set smaller after the title: `on CQ-107` */
  readonly of?: ReactNode
  readonly meta?: ReactNode
  readonly actions?: ReactNode
  readonly children?: ReactNode
}) {
  return (
    <header className="px-4 pt-5 pb-3 sm:px-6">
      <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
        <div className="min-w-0">
          <h1 className="text-pretty">
            {title}
            {of === undefined ? null : <span className="ml-2 text-[18px] text-ink-2">{of}</span>}
          </h1>
          {meta === undefined ? null : <div className="mt-1 text-ink-2 [&_a]:underline">{meta}</div>}
        </div>
        {actions === undefined ? null : <div className="flex flex-wrap gap-2">{actions}</div>}
      </div>
      {children}
    </header>
  )
}
