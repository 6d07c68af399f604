'use client'

import { type ReactNode, useEffect, useId, useRef } from 'react'
import { Button } from './button'

/** A question in front of the page. Escape and the close button leave it; focus returns to where it came from. */
export function Dialog({
  title,
  isOpen,
  onClose,
  foot,
  children,
}: {
  readonly title: string
  readonly isOpen: boolean
  readonly onClose: () => void
  readonly foot?: ReactNode
  readonly children: ReactNode
}) {
  const element = useRef<HTMLDialogElement>(null)
  const titleId = useId()
  useEffect(() => {
    const dialog = element.current
    if (dialog === null) return
    if (isOpen && !dialog.open) dialog.showModal()
    if (!isOpen && dialog.open) dialog.close()
  }, [isOpen])
  return (
    <dialog
      ref={element}
      aria-labelledby={titleId}
      onClose={onClose}
      className="m-auto w-[min(40rem,calc(100vw-2rem))] rounded border border-line-strong bg-paper p-0 text-ink"
    >
      {isOpen ? (
        <>
          <div className="flex items-center justify-between gap-4 border-b border-line px-5 py-3">
            <h2 id={titleId}>{title}</h2>
            <Button kind="quiet" onClick={onClose}>
              Close
            </Button>
          </div>
          <div className="px-5 py-4">{children}</div>
          {foot === undefined ? null : (
            <div className="flex flex-wrap justify-end gap-2 border-t border-line px-5 py-3">{foot}</div>
          )}
        </>
      ) : null}
    </dialog>
  )
}
