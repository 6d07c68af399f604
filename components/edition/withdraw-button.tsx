'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { ReasonDialog } from '@/components/run/reason-dialog'
import { Button } from '@/components/ui/button'
import { type ActionResult } from '@/lib/domain/errors'

/** Withdraws an edition after asking why. */
export function WithdrawButton({
  number,
  withdraw,
}: {
  readonly number: number
  readonly withdraw: (reason: string) => Promise<ActionResult<string>>
}) {
  const router = useRouter()
  const [isAsking, setIsAsking] = useState(false)
  return (
    <>
      <Button onClick={() => setIsAsking(true)}>Withdraw</Button>
      {isAsking ? (
        <ReasonDialog
          title={`Withdraw edition ${String(number)}`}
          confirmLabel="Withdraw it"
          onClose={() => setIsAsking(false)}
          onConfirm={withdraw}
          onDone={() => {
            setIsAsking(false)
            router.refresh()
          }}
        >
          <p className="mt-0 mb-3">
            It stays under its number and address, marked as withdrawn with your reason, for everybody who has it. Its
            runs can be worked on again; a correction is the next edition.
          </p>
        </ReasonDialog>
      ) : null}
    </>
  )
}
