import { type ReactNode } from 'react'
import { classNames } from './class-names'

export type TagKind = 'doubt' | 'fault' | 'sound' | 'plain'

const KINDS: Readonly<Record<TagKind, string>> = {
  doubt: 'bg-doubt-wash text-doubt',
  fault: 'bg-fault-wash text-fault',
  sound: 'bg-sound-wash text-sound',
  plain: 'bg-well text-ink-2',
}

/** A short word on a wash of its kind. The word carries the meaning; the colour only helps to find it. */
export function Tag({ kind = 'plain', children }: { readonly kind?: TagKind; readonly children: ReactNode }) {
  return (
    <span
      className={classNames('inline-block whitespace-nowrap rounded-[3px] px-1.5 text-[12.5px] leading-5', KINDS[kind])}
    >
      {children}
    </span>
  )
}
