import { type ReactNode } from 'react'

/** A part of a page under its own heading, set off by a hairline that runs on from the words. */
export function Section({
  title,
  note,
  actions,
  children,
}: {
  readonly title: string
  readonly note?: ReactNode
  readonly actions?: ReactNode
  readonly children: ReactNode
}) {
  return (
    <section className="mt-6">
      <div className="mb-2 flex flex-wrap items-center gap-x-3 gap-y-1">
        <h2>{title}</h2>
        {note === undefined ? null : <span className="text-[13px] text-ink-2">{note}</span>}
        <span className="h-px min-w-8 flex-1 bg-line" aria-hidden="true" />
        {actions}
      </div>
      {children}
    </section>
  )
}
