'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'
import { describedBy, FieldFrame } from './field-frame'
import { useFieldIssue } from './form-state'

export interface TextAreaProps extends Omit<ComponentProps<'textarea'>, 'name' | 'className' | 'id'> {
  readonly name: string
  readonly label: ReactNode
  readonly hint?: ReactNode
  readonly error?: string | undefined
  readonly isOptional?: boolean
  readonly className?: string
}

/** Several lines of text. */
export function TextArea({ name, label, hint, error, isOptional, className, ...area }: TextAreaProps) {
  const id = useId()
  const issue = useFieldIssue(name)
  const shown = { hint, error: error ?? issue }
  return (
    <FieldFrame id={id} label={label} className={className} isOptional={isOptional ?? false} {...shown}>
      <textarea
        rows={3}
        {...area}
        id={id}
        name={name}
        className="control"
        aria-invalid={shown.error === undefined ? undefined : true}
        aria-describedby={describedBy(id, shown)}
      />
    </FieldFrame>
  )
}
