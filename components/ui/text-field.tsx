'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'
import { classNames } from './class-names'
import { describedBy, FieldFrame } from './field-frame'
import { useFieldIssue } from './form-state'

export interface TextFieldProps extends Omit<ComponentProps<'input'>, 'name' | 'className' | 'id'> {
  readonly name: string
  readonly label: ReactNode
  readonly hint?: ReactNode
  readonly error?: string | undefined
  readonly understood?: string | undefined
  readonly isOptional?: boolean
  readonly className?: string
  readonly inputClassName?: string
}

/** One line of text. An error from the form around it shows here when the names agree. */
export function TextField({
  name,
  label,
  hint,
  error,
  understood,
  isOptional,
  className,
  inputClassName,
  ...input
}: TextFieldProps) {
  const id = useId()
  const issue = useFieldIssue(name)
  const shown = { hint, understood, error: error ?? issue }
  return (
    <FieldFrame id={id} label={label} className={className} isOptional={isOptional ?? false} {...shown}>
      <input
        autoComplete="off"
        {...input}
        id={id}
        name={name}
        className={classNames('control', inputClassName)}
        aria-invalid={shown.error === undefined ? undefined : true}
        aria-describedby={describedBy(id, shown)}
      />
    </FieldFrame>
  )
}
