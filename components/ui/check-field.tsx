'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'

/** A yes or no with its words beside it. */
export function CheckField({
  label,
  hint,
  className,
  ...input
}: Omit<ComponentProps<'input'>, 'type' | 'id'> & { readonly label: ReactNode; readonly hint?: ReactNode }) {
  const id = useId()
  return (
    <div className={className}>
      <div className="flex items-start gap-2 touch:min-h-11 touch:items-center">
        <input
          {...input}
          id={id}
          type="checkbox"
          className="mt-0.5 size-[18px] shrink-0 accent-(--accent) touch:mt-0 touch:size-6"
          aria-describedby={hint === undefined ? undefined : `${id}-hint`}
        />
        <label htmlFor={id} className="touch:py-2.5">
          {label}
        </label>
      </div>
      {hint === undefined ? null : (
        <div id={`${id}-hint`} className="ml-7 text-[13px] text-ink-3">
          {hint}
        </div>
      )}
    </div>
  )
}
