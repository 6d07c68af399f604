import { type ReactNode } from 'react'

/** Something that is opened when it is wanted: a form below a table, further details. */
export function Fold({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  return (
    <details className="mt-2">
      <summary className="inline-flex min-h-7 cursor-pointer items-center text-accent touch:min-h-11">{label}</summary>
      <div className="mt-2 border-l-2 border-line pl-4">{children}</div>
    </details>
  )
}
