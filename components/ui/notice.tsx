import { type ReactNode } from 'react'
import { classNames } from './class-names'
import { type TagKind } from './tag'

const KINDS: Readonly<Record<TagKind, readonly [string, string]>> = {
  doubt: ['bg-doubt-wash border-doubt', 'text-doubt'],
  fault: ['bg-fault-wash border-fault', 'text-fault'],
  sound: ['bg-sound-wash border-sound', 'text-sound'],
  plain: ['bg-well border-line-strong', 'text-ink'],
}

/** Something to read before going on: what, where, and what to do. */
export function Notice({
  kind = 'plain',
  title,
  isLive = false,
  className,
  children,
}: {
  readonly kind?: TagKind
  readonly title?: string
  /** read out when it appears */
  readonly isLive?: boolean
  readonly className?: string
  readonly children?: ReactNode
}) {
  const [box, head] = KINDS[kind]
  return (
    <div
      className={classNames('prose border-l-[3px] px-3 py-2.5 text-ink', box, className)}
      {...(isLive ? { role: kind === 'fault' ? 'alert' : 'status' } : {})}
    >
      {title === undefined ? null : <strong className={classNames('font-semibold', head)}>{title} </strong>}
      {children}
    </div>
  )
}
