'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { TextArea } from '@/components/ui/text-area'
import { type RunActions } from './run-actions'

/** A remark beside the run; remarks are added, never changed. */
export function RemarkForm({ runId, remark }: { runId: string; remark: RunActions['remark'] }) {
  const router = useRouter()
  const [body, setBody] = useState('')
  const [error, setError] = useState('')
  const [isBusy, setIsBusy] = useState(false)
  const save = async () => {
    if (body.trim() === '') {
      setError('Write the remark first.')
      return
    }
    setIsBusy(true)
    setError('')
    try {
      const answer = await remark(runId, body.trim())
      if (answer.ok) {
        setBody('')
        router.refresh()
      } else setError(answer.message)
    } catch (cause) {
      setError(`Not stored: ${cause instanceof Error ? cause.message : 'the server gave no answer'}.`)
    } finally {
      setIsBusy(false)
    }
  }
  return (
    <div className="mt-2 max-w-xl print:hidden">
      <TextArea
        name="remark"
        label="New remark"
        rows={2}
        value={body}
        maxLength={2_000}
        onChange={(event) => setBody(event.target.value)}
      />
      {error === '' ? null : (
        <Notice kind="fault" isLive className="mt-2">
          {error}
        </Notice>
      )}
      <p className="mt-2 mb-0">
        <Button onClick={() => void save()} busyWith={isBusy ? 'Saving' : null}>
          Add remark
        </Button>
      </p>
    </div>
  )
}
