'use client'

import { useEffect, useState } from 'react'
import { DraftKeeper, type DraftState } from './draft-keeper'

/** Keeps on the server what is being typed in a form, from the first change on. */
export function useDraft(form: string, content: unknown, hasChanged: boolean) {
  const [state, setState] = useState<DraftState>({ kind: 'untouched' })
  const [keeper] = useState(() => new DraftKeeper(form, setState))

  useEffect(() => {
    if (hasChanged) keeper.take(content)
  }, [keeper, content, hasChanged])

  useEffect(() => {
    const sendLast = () => {
      if (keeper.isWaiting) void keeper.send(true)
    }
    const sendNow = () => {
      if (keeper.isWaiting) void keeper.send()
    }
    window.addEventListener('pagehide', sendLast)
    window.addEventListener('online', sendNow)
    window.addEventListener('focus', sendNow)
    return () => {
      window.removeEventListener('pagehide', sendLast)
      window.removeEventListener('online', sendNow)
      window.removeEventListener('focus', sendNow)
      sendLast()
      keeper.still()
    }
  }, [keeper])

  return { state, keeper }
}
