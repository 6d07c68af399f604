import Link from 'next/link'
import { type ReactNode } from 'react'

/** Pages for people who are not signed in: the name of the product and one form. */
export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <header className="border-b border-line px-4 py-2.5 sm:px-6">
        <Link href="/" className="font-head text-[17px] font-semibold text-ink hover:no-underline">
          Inverse <span className="text-accent">Kelvin</span>
        </Link>
      </header>
      <main id="main" className="mx-auto w-full max-w-[26rem] px-4 pt-10 pb-16 sm:pt-16">
        {children}
      </main>
    </>
  )
}
