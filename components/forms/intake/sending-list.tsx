'use client'

import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { Notice } from '@/components/ui/notice'
import { Progress } from '@/components/ui/progress'
import { fileSize } from './file-size'
import { type Sending } from './use-sending'

function said({ state, sentBytes, totalBytes, byteCount }: Sending): string {
  if (state === 'waiting') return `waits, ${fileSize(byteCount)}`
  if (state === 'reading') return 'arrived, being looked at'
  return totalBytes === 0 ? fileSize(byteCount) : `${fileSize(sentBytes)} of ${fileSize(totalBytes)}`
}

/** Files that are on their way, how far each is, and what went wrong with those that did not arrive. */
export function SendingList({
  sendings,
  onCancel,
  onAgain,
}: {
  readonly sendings: readonly Sending[]
  readonly onCancel: (key: string) => void
  readonly onAgain: (key: string) => void
}) {
  if (sendings.length === 0) return null
  return (
    <ul aria-label="Files on their way" className="m-0 mt-3 grid list-none gap-2 p-0">
      {sendings.map((sending) => (
        <li
          key={sending.key}
          className={classNames(
            'grid items-center gap-x-4 gap-y-1.5',
            sending.state === 'failed' ? 'sm:grid-cols-[minmax(0,1fr)_auto]' : 'grid-cols-[minmax(0,1fr)_auto]',
          )}
        >
          {sending.state === 'failed' ? (
            <>
              <Notice kind="fault" isLive title={`${sending.name} was not added.`}>
                {sending.sentence}
              </Notice>
              <span className="flex flex-wrap gap-2">
                <Button onClick={() => onAgain(sending.key)} aria-label={`Send ${sending.name} again`}>
                  Try again
                </Button>
                <Button kind="quiet" onClick={() => onCancel(sending.key)} aria-label={`Forget ${sending.name}`}>
                  Forget it
                </Button>
              </span>
            </>
          ) : (
            <>
              <Progress
                label={sending.name}
                value={sending.state === 'sending' && sending.totalBytes > 0 ? sending.sentBytes : null}
                max={Math.max(1, sending.totalBytes)}
                said={said(sending)}
              />
              <Button onClick={() => onCancel(sending.key)} aria-label={`Cancel ${sending.name}`}>
                Cancel
              </Button>
            </>
          )}
        </li>
      ))}
    </ul>
  )
}
