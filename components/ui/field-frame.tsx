import { type ReactNode } from 'react'

export interface FieldFrameProps {
  readonly id: string
  readonly label: ReactNode
  readonly hint?: ReactNode
  readonly error?: string | undefined
  /** what was made of the typed text, said back */
  readonly understood?: string | undefined
  readonly isOptional?: boolean
  readonly children: ReactNode
  readonly className?: string | undefined
}

/** Ids of the lines under a field that describe it. */
export function describedBy(id: string, props: Pick<FieldFrameProps, 'hint' | 'error' | 'understood'>) {
  const ids = [
    props.hint === undefined ? '' : `${id}-hint`,
    props.understood === undefined ? '' : `${id}-understood`,
    props.error === undefined ? '' : `${id}-error`,
  ].filter((name) => name !== '')
  return ids.length === 0 ? undefined : ids.join(' ')
}

/** Label above, hint, what was understood and what is wrong below. */
export function FieldFrame({
  id,
  label,
  hint,
  error,
  understood,
  isOptional = false,
  children,
  className,
}: FieldFrameProps) {
  return (
    <div className={className}>
      <label htmlFor={id} className="mb-0.5 block text-[14px] text-ink-2">
        {label}
        {isOptional ? <span className="text-ink-3">, if known</span> : null}
      </label>
      {children}
      <div className="mt-0.5 text-[13px]">
        {hint === undefined ? null : (
          <div id={`${id}-hint`} className="text-ink-3">
            {hint}
          </div>
        )}
        {understood === undefined ? null : (
          <div id={`${id}-understood`} className="text-ink-2">
            {understood}
          </div>
        )}
        {error === undefined ? null : (
          <div id={`${id}-error`} className="text-fault">
            {error}
          </div>
        )}
      </div>
    </div>
  )
}
