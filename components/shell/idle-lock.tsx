'use client'

import { useEffect, useRef } from 'react'

const MARK = 'last-touched'
const LOOK_EVERY_MS = 15_000

/** When any tab of this browser was last touched. A private window may have no storage; then each tab counts for itself. */
function readMark(own: number): number {
  try {
    return Math.max(own, Number(window.localStorage.getItem(MARK)) || 0)
  } catch {
    return own
  }
}
function writeMark(at: number): void {
  try {
    window.localStorage.setItem(MARK, String(at))
  } catch {
    // counted in this tab alone
  }
}

/**
 * Leaves the session after a time without a hand on it, and comes back to this page after signing in. What was typed into
 * a form is kept on the server as it is typed.
 */
export function IdleLock({ afterS }: { readonly afterS: number }) {
  const form = useRef<HTMLFormElement>(null)
  const next = useRef<HTMLInputElement>(null)
  useEffect(() => {
    let own = Date.now()
    writeMark(own)
    const touched = () => {
      const now = Date.now()
      if (now - own < 1_000) return
      own = now
      writeMark(now)
    }
    const look = () => {
      if (Date.now() - readMark(own) < afterS * 1_000) return
      if (next.current !== null) next.current.value = window.location.pathname + window.location.search
      form.current?.submit()
    }
    const events = ['pointerdown', 'pointermove', 'keydown', 'wheel', 'touchstart'] as const
    for (const name of events) window.addEventListener(name, touched, { passive: true })
    // A tablet that was asleep wakes up here.
    document.addEventListener('visibilitychange', look)
    const timer = window.setInterval(look, LOOK_EVERY_MS)
    return () => {
      for (const name of events) window.removeEventListener(name, touched)
      document.removeEventListener('visibilitychange', look)
      window.clearInterval(timer)
    }
  }, [afterS])
  return (
    <form ref={form} action="/sign-out" method="post" hidden>
      <input ref={next} type="hidden" name="next" defaultValue="/" />
    </form>
  )
}
