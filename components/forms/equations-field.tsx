'use client'

import { useState } from 'react'
import { TextArea } from '@/components/ui/text-area'
import { readEquation } from '@/lib/domain/read-equation'

/** Chemical equations, one a line, said back with their balance. */
export function EquationsField({
  name,
  label,
  hint,
  defaultValue = '',
}: {
  readonly name: string
  readonly label: string
  readonly hint?: string
  readonly defaultValue?: string
}) {
  const [text, setText] = useState(defaultValue)
  const lines = text.split('\n').filter((line) => line.trim() !== '')
  return (
    <div>
      <TextArea
        name={name}
        label={label}
        value={text}
        onChange={(event) => setText(event.target.value)}
        placeholder={'CO2 + 4 H2 = CH4 + 2 H2O'}
        {...(hint === undefined ? {} : { hint })}
      />
      <ol className="mt-1 list-decimal pl-5 text-[13px]" aria-live="polite">
        {lines.map((line, position) => {
          const read = readEquation(line)
          return (
            <li key={position} className={read.ok ? 'text-ink-2' : 'text-fault'}>
              {read.ok ? read.said : read.sentence}
            </li>
          )
        })}
      </ol>
    </div>
  )
}
