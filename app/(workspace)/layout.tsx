import { type ReactNode } from 'react'
import { HeaderBar } from '@/components/shell/header-bar'
import { IdleLock } from '@/components/shell/idle-lock'
import { Notice } from '@/components/ui/notice'
import { getActor } from '@/lib/access/actor'
import { SESSION_IDLE_S } from '@/lib/access/session-rules'
import { listStandingNotices } from '@/lib/access/standing-notices'

/** Navigation only. It guards nothing: each page asks for its actor itself, since a layout is not run again between pages. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const actor = await getActor()
  return (
    <>
      <HeaderBar signedIn={actor === null ? null : { displayName: actor.displayName, role: actor.role }} />
      {(actor === null ? [] : listStandingNotices(actor)).map((notice) => (
        <Notice key={notice.title} kind="doubt" title={notice.title} className="no-print">
          {notice.text}
        </Notice>
      ))}
      <main id="main" tabIndex={-1} className="pb-16 outline-none">
        {children}
      </main>
      {actor === null ? null : <IdleLock afterS={SESSION_IDLE_S} />}
    </>
  )
}
