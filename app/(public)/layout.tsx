import { type ReactNode } from 'react'
import { PublicHeader } from '@/components/shell/public-header'

/** Pages for people who are not signed in: the name of the product and one form. */
export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <PublicHeader />
      <main id="main" className="mx-auto w-full max-w-[26rem] px-4 pt-10 pb-16 sm:pt-16">
        {children}
      </main>
    </>
  )
}
