'use client'

import { type ReactNode, useState } from 'react'
import { TextField } from '@/components/ui/text-field'
import { type Dimension } from '@/lib/analysis/units/dimension'
import { parseQuantity, type QuantityOptions } from '@/lib/analysis/units/parse-quantity'

/** A quantity typed with its unit; what was understood is said back underneath. */
export function QuantityField({
  name,
  label,
  dimension,
  defaultValue = '',
  options,
  hint,
  isOptional,
  placeholder,
  className,
  disabled,
}: {
  readonly name: string
  readonly label: ReactNode
  readonly dimension: Dimension
  readonly defaultValue?: string
  readonly options?: QuantityOptions
  readonly hint?: ReactNode
  readonly isOptional?: boolean
  readonly placeholder?: string
  readonly className?: string
  readonly disabled?: boolean
}) {
  const [text, setText] = useState(defaultValue)
  const [isLeft, setIsLeft] = useState(false)
  const read = text.trim() === '' ? null : parseQuantity(text, dimension, options)
  return (
    <TextField
      name={name}
      label={label}
      value={text}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => setIsLeft(true)}
      understood={read?.ok === true ? read.said : undefined}
      error={isLeft && read?.ok === false ? read.sentence : undefined}
      {...(hint === undefined ? {} : { hint })}
      {...(isOptional === undefined ? {} : { isOptional })}
      {...(placeholder === undefined ? {} : { placeholder })}
      {...(className === undefined ? {} : { className })}
      {...(disabled === undefined ? {} : { disabled })}
    />
  )
}
