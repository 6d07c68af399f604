'use client'

import { useSyncExternalStore } from 'react'
import { formatInstant } from '@/lib/domain/format-instant'

const neverChanges = () => () => {}
const zoneHere = () => Intl.DateTimeFormat().resolvedOptions().timeZone
const zoneOnServer = () => 'UTC'

/** A moment on the reader's own clock; in UTC, and said so, until the browser tells which clock that is. */
export function Moment({ at }: { readonly at: string }) {
  const zone = useSyncExternalStore(neverChanges, zoneHere, zoneOnServer)
  return (
    <time dateTime={at} title={`${at.slice(0, 19).replace('T', ' ')} UTC`} className="whitespace-nowrap">
      {formatInstant(at, zone)}
      {zone === 'UTC' ? ' UTC' : ''}
    </time>
  )
}
