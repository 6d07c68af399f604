import { type ReactNode } from 'react'
import { PublicHeader } from '@/components/shell/public-header'

/** Open to everybody: the name of the product and a wide page. */
export default function ValidationLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <PublicHeader />
      <main id="main" className="pb-16">
        {children}
      </main>
    </>
  )
}
