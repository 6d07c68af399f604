'use client'

import { type ReactNode, useState } from 'react'
import { Button } from '@/components/ui/button'
import { TextField } from '@/components/ui/text-field'

/** A password, hidden until its owner wants to see it. Pasting is fine: long ones come out of a password safe. */
export function PasswordField({
  name,
  label,
  hint,
  autoComplete,
}: {
  readonly name: string
  readonly label: string
  readonly hint?: ReactNode
  readonly autoComplete: 'current-password' | 'new-password'
}) {
  const [isShown, setIsShown] = useState(false)
  return (
    <div>
      <TextField
        name={name}
        label={label}
        hint={hint}
        type={isShown ? 'text' : 'password'}
        autoComplete={autoComplete}
        spellCheck={false}
        autoCapitalize="none"
        required
        maxLength={1024}
      />
      <Button kind="quiet" className="-ml-3 touch:-ml-4" aria-pressed={isShown} onClick={() => setIsShown(!isShown)}>
        {isShown ? 'Hide' : 'Show'} the {label.toLowerCase()}
      </Button>
    </div>
  )
}
