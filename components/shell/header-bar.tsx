'use client'

import type { Route } from 'next'
import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { LinkButton } from '@/components/ui/link-button'
import { type Role } from '@/lib/domain/role'

interface Place {
  readonly href: Route
  readonly label: string
}

const EVERYONE: readonly Place[] = [
  { href: '/', label: 'Start' },
  { href: '/campaigns', label: 'Campaigns' },
]
const HOUSE: readonly Place[] = [
  { href: '/samples', label: 'Samples' },
  { href: '/runs', label: 'Runs' },
  { href: '/rigs', label: 'Rigs' },
  { href: '/reactions', label: 'Reactions' },
  { href: '/calibrations', label: 'Calibrations' },
]

/** The bar at the head of every page: where one can go, the one thing done most often, and who is signed in. */
export function HeaderBar({
  signedIn,
}: {
  readonly signedIn: { readonly displayName: string; readonly role: Role } | null
}) {
  const path = usePathname()
  const isGuest = signedIn === null || signedIn.role === 'guest'
  const places = isGuest ? EVERYONE : [...EVERYONE, ...HOUSE]
  return (
    <header className="no-print border-b border-line">
      <a
        href="#main"
        className="sr-only focus:not-sr-only focus:absolute focus:z-50 focus:m-2 focus:rounded focus:bg-sheet focus:px-3 focus:py-2"
      >
        Skip to the content
      </a>
      <div className="flex min-h-[46px] items-center gap-x-4 px-4 sm:px-6 lg:gap-x-6">
        <Link href="/" className="whitespace-nowrap font-head text-[17px] font-semibold text-ink hover:no-underline">
          Inverse <span className="text-accent">Kelvin</span>
        </Link>
        <nav aria-label="Main" className="hidden flex-1 lg:block">
          <ul className="flex gap-x-5">
            {places.map((place) => (
              <li key={place.href}>
                <PlaceLink place={place} path={path} className="block border-b-2 py-2.5" />
              </li>
            ))}
          </ul>
        </nav>
        <div className="ml-auto flex items-center gap-x-3 py-1.5 lg:gap-x-4">
          {isGuest ? null : <LinkButton href="/runs/new">Log a run</LinkButton>}
          {signedIn === null ? null : (
            <div className="hidden items-center gap-x-3 lg:flex">
              <SignedIn signedIn={signedIn} />
              <SignOut />
            </div>
          )}
          {signedIn === null ? null : (
            <details key={path} className="group lg:hidden">
              <summary className="flex min-h-8 cursor-pointer list-none items-center rounded px-2 text-accent touch:min-h-11 [&::-webkit-details-marker]:hidden">
                Menu
              </summary>
              <div className="absolute inset-x-0 z-40 mt-1.5 border-y border-line bg-paper px-4 pb-3 sm:px-6">
                <nav aria-label="Main, as a list">
                  <ul>
                    {places.map((place) => (
                      <li key={place.href} className="border-b border-line">
                        <PlaceLink place={place} path={path} className="block border-l-2 py-2.5 pl-3" />
                      </li>
                    ))}
                  </ul>
                </nav>
                <div className="mt-3 flex items-center justify-between gap-3">
                  <SignedIn signedIn={signedIn} />
                  <SignOut />
                </div>
              </div>
            </details>
          )}
        </div>
      </div>
    </header>
  )
}

function PlaceLink({
  place,
  path,
  className,
}: {
  readonly place: Place
  readonly path: string
  readonly className: string
}) {
  const isCurrent = place.href === '/' ? path === '/' : path === place.href || path.startsWith(`${place.href}/`)
  return (
    <Link
      href={place.href}
      aria-current={path === place.href ? 'page' : isCurrent ? 'true' : undefined}
      className={classNames(
        className,
        'hover:no-underline',
        isCurrent ? 'border-accent text-ink' : 'border-transparent text-ink-2 hover:text-ink',
      )}
    >
      {place.label}
    </Link>
  )
}

function SignedIn({ signedIn }: { readonly signedIn: { readonly displayName: string; readonly role: Role } }) {
  return (
    <Link href="/settings" className="max-w-48 truncate text-ink-2 lg:max-w-40 xl:max-w-60" title="Settings">
      {signedIn.displayName}, {signedIn.role}
    </Link>
  )
}

/** A whole new page follows, so that nothing of this person stays in the browser's memory. */
function SignOut() {
  return (
    <form action="/sign-out" method="post">
      <Button type="submit" kind="quiet" className="px-1">
        Sign out
      </Button>
    </form>
  )
}
