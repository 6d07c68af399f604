import { type ReactNode } from 'react'

export interface Fact {
  readonly label: string
  readonly value: ReactNode
}

/** A short list of named facts. */
export function Facts({ items }: { readonly items: readonly Fact[] }) {
  return (
    <dl className="grid grid-cols-[minmax(7rem,auto)_1fr] gap-x-5 gap-y-1.5 sm:grid-cols-[minmax(10rem,auto)_1fr]">
      {items.map((item) => (
        <div key={item.label} className="contents">
          <dt className="text-ink-2">{item.label}</dt>
          <dd className="min-w-0 break-words">{item.value}</dd>
        </div>
      ))}
    </dl>
  )
}
