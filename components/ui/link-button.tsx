import Link, { type LinkProps } from 'next/link'
import { type ReactNode } from 'react'
import { buttonClass, type ButtonKind } from './button-class'

/** A link to another page that looks like a button. */
export function LinkButton<T extends string>({
  href,
  kind = 'plain',
  className,
  children,
}: {
  readonly href: LinkProps<T>['href']
  readonly kind?: ButtonKind
  readonly className?: string
  readonly children: ReactNode
}) {
  return (
    <Link href={href} className={buttonClass(kind, className)}>
      {children}
    </Link>
  )
}
