import { type ReactNode } from 'react'
import { HeaderBar } from '@/components/shell/header-bar'
import { getActor } from '@/lib/access/actor'

/** Navigation only. It guards nothing: each page asks for its actor itself, since a layout is not run again between pages. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const actor = await getActor()
  return (
    <>
      <HeaderBar
        signedIn={actor === null ? null : { displayName: actor.displayName, role: actor.role }}
        signOut={null}
      />
      <main id="main" tabIndex={-1} className="pb-16 outline-none">
        {children}
      </main>
    </>
  )
}
