'use client'

import { type ReactNode, useSyncExternalStore } from 'react'
import { TextField } from '@/components/ui/text-field'

function subscribe(changed: () => void): () => void {
  window.addEventListener('hashchange', changed)
  return () => window.removeEventListener('hashchange', changed)
}
const readHash = () => decodeURIComponent(window.location.hash.slice(1))
const readNothing = () => ''

/** A one-time code: typed, pasted, or taken from behind the hash sign of the address, which no server ever sees. */
export function OneTimeCodeField({ label, hint }: { readonly label: string; readonly hint?: ReactNode }) {
  const fromAddress = useSyncExternalStore(subscribe, readHash, readNothing)
  return (
    <TextField
      key={fromAddress}
      name="code"
      label={label}
      hint={hint}
      defaultValue={fromAddress}
      spellCheck={false}
      autoCapitalize="none"
      required
    />
  )
}
