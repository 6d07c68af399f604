'use client'

import type { Route } from 'next'
import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { classNames } from './class-names'

export interface TabLink {
  readonly href: Route
  readonly label: string
}

/** The pages of one thing, side by side; the one shown is marked. */
export function TabLinks({ label, items }: { readonly label: string; readonly items: readonly TabLink[] }) {
  const path = usePathname()
  return (
    <nav aria-label={label} className="no-print overflow-x-auto border-b border-line">
      <ul className="flex gap-x-6 px-4 sm:px-6">
        {items.map((item) => {
          const isCurrent = path === item.href
          return (
            <li key={item.href}>
              <Link
                href={item.href}
                aria-current={isCurrent ? 'page' : undefined}
                className={classNames(
                  'block whitespace-nowrap border-b-2 py-2 touch:py-3 hover:no-underline',
                  isCurrent ? 'border-accent font-semibold text-ink' : 'border-transparent text-ink-2 hover:text-ink',
                )}
              >
                {item.label}
              </Link>
            </li>
          )
        })}
      </ul>
    </nav>
  )
}
