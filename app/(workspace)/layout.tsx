import { type ReactNode } from 'react'
import { signOutAction } from '@/app/(public)/sign-in/actions'
import { HeaderBar } from '@/components/shell/header-bar'
import { Notice } from '@/components/ui/notice'
import { getActor } from '@/lib/access/actor'
import { listStandingNotices } from '@/lib/access/standing-notices'

/** Navigation only. It guards nothing: each page asks for its actor itself, since a layout is not run again between pages. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const actor = await getActor()
  return (
    <>
      <HeaderBar
        signedIn={actor === null ? null : { displayName: actor.displayName, role: actor.role }}
        signOut={actor === null ? null : signOutAction}
      />
      {(actor === null ? [] : listStandingNotices(actor)).map((notice) => (
        <Notice key={notice.title} kind="doubt" title={notice.title} className="no-print">
          {notice.text}
        </Notice>
      ))}
      <main id="main" tabIndex={-1} className="pb-16 outline-none">
        {children}
      </main>
    </>
  )
}
