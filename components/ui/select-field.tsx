'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'
import { describedBy, FieldFrame } from './field-frame'
import { useFieldIssue } from './form-state'

export interface SelectChoice {
  readonly value: string
  readonly label: string
}

export interface SelectFieldProps extends Omit<ComponentProps<'select'>, 'name' | 'className' | 'id' | 'children'> {
  readonly name: string
  readonly label: ReactNode
  readonly choices: readonly SelectChoice[]
  /** first line with an empty value, for what has not been chosen: `Choose a rig` */
  readonly unchosen?: string
  readonly hint?: ReactNode
  readonly error?: string | undefined
  readonly understood?: string | undefined
  readonly isOptional?: boolean
  readonly className?: string
}

/** One of a list. */
export function SelectField({
  name,
  label,
  choices,
  unchosen,
  hint,
  error,
  understood,
  isOptional,
  className,
  ...select
}: SelectFieldProps) {
  const id = useId()
  const issue = useFieldIssue(name)
  const shown = { hint, understood, error: error ?? issue }
  return (
    <FieldFrame id={id} label={label} className={className} isOptional={isOptional ?? false} {...shown}>
      <select
        {...select}
        id={id}
        name={name}
        className="control"
        aria-invalid={shown.error === undefined ? undefined : true}
        aria-describedby={describedBy(id, shown)}
      >
        {unchosen === undefined ? null : <option value="">{unchosen}</option>}
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  )
}
