import Link from 'next/link'
import { type ReactNode } from 'react'

/** Open to everybody: the name of the product and a wide page. */
export default function ValidationLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <header className="border-b border-line px-4 py-2.5 sm:px-6">
        <Link href="/" className="font-head text-[17px] font-semibold text-ink hover:no-underline">
          Inverse <span className="text-accent">Kelvin</span>
        </Link>
      </header>
      <main id="main" className="pb-16">
        {children}
      </main>
    </>
  )
}
