import { type ReactNode } from 'react'

/** What stands where there is nothing yet: why it is empty and the next step. */
export function EmptyState({
  title,
  children,
  action,
}: {
  readonly title: string
  readonly children?: ReactNode
  readonly action?: ReactNode
}) {
  return (
    <div className="prose max-w-[62ch] border-t border-line py-6">
      <h2>{title}</h2>
      {children === undefined ? null : <div className="mt-1 text-ink-2">{children}</div>}
      {action === undefined ? null : <div className="mt-4">{action}</div>}
    </div>
  )
}
