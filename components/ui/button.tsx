import { type ComponentProps } from 'react'
import { buttonClass, type ButtonKind } from './button-class'

export interface ButtonProps extends ComponentProps<'button'> {
  readonly kind?: ButtonKind
  /** what it is busy with, shown in place of its label while it cannot be pressed */
  readonly busyWith?: string | null
}

/** A button. It submits nothing unless told to. */
export function Button({
  kind = 'plain',
  type = 'button',
  busyWith = null,
  className,
  children,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      className={buttonClass(kind, className)}
      disabled={rest.disabled === true || busyWith !== null}
    >
      {busyWith === null ? (
        children
      ) : (
        <span>
          <span className="busy-mark" aria-hidden="true" />
          {busyWith}
        </span>
      )}
    </button>
  )
}
