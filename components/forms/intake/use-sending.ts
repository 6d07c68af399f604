'use client'

import { useEffect, useRef, useState } from 'react'
import { sendFiles } from './send-file'

export interface Sending {
  readonly key: string
  /** one file, or the chromatograms of one series */
  readonly files: readonly File[]
  readonly name: string
  readonly byteCount: number
  readonly state: 'waiting' | 'sending' | 'reading' | 'failed'
  readonly sentBytes: number
  readonly totalBytes: number
  /** why it failed */
  readonly sentence: string
}

const CHROMATOGRAM = /\.(cdf|nc)$/i

/** Chromatograms that are dropped together belong together and go in one request; every other file goes by itself. */
function inRequests(files: readonly File[]): (readonly File[])[] {
  const chromatograms = files.filter(({ name }) => CHROMATOGRAM.test(name))
  const others = files.filter(({ name }) => !CHROMATOGRAM.test(name)).map((file) => [file])
  return chromatograms.length === 0 ? others : [...others, chromatograms]
}

const nameOf = (files: readonly File[]): string =>
  files.length === 1 ? (files[0]?.name ?? '') : `${String(files.length)} chromatograms`

/** Files on their way, one after the other: a second one would only share the line with the first. */
export function useSending<T>(path: string, onArrived: (answer: T, sentName: string) => void) {
  const [sendings, setSendings] = useState<readonly Sending[]>([])
  const queue = useRef<Sending[]>([])
  const count = useRef(0)
  const current = useRef<{ readonly key: string; readonly controller: AbortController } | null>(null)
  const isOnItsWay = sendings.some((sending) => sending.state !== 'failed')

  // closing the tab would break off what is under way
  useEffect(() => {
    if (!isOnItsWay) return
    const warn = (event: BeforeUnloadEvent) => event.preventDefault()
    window.addEventListener('beforeunload', warn)
    return () => window.removeEventListener('beforeunload', warn)
  }, [isOnItsWay])

  const update = (key: string, part: Partial<Sending>) =>
    setSendings((before) => before.map((one) => (one.key === key ? { ...one, ...part } : one)))
  const remove = (key: string) => setSendings((before) => before.filter((one) => one.key !== key))

  const sendOne = async ({ key, files, name }: Sending) => {
    const controller = new AbortController()
    current.current = { key, controller }
    update(key, { state: 'sending' })
    try {
      const answer = await sendFiles<T>(path, files, {
        signal: controller.signal,
        onProgress: (sentBytes, totalBytes) =>
          update(key, {
            sentBytes,
            totalBytes,
            // all bytes have left: what goes on now is the reading
            state: totalBytes > 0 && sentBytes >= totalBytes ? 'reading' : 'sending',
          }),
      })
      remove(key)
      onArrived(answer, name)
    } catch (error) {
      if (error instanceof DOMException && error.name === 'AbortError') remove(key)
      else update(key, { state: 'failed', sentence: error instanceof Error ? error.message : String(error) })
    } finally {
      current.current = null
    }
  }

  const work = async () => {
    if (current.current !== null) return
    for (let next = queue.current.shift(); next !== undefined; next = queue.current.shift()) await sendOne(next)
  }

  const put = (more: readonly Sending[]) => {
    queue.current.push(...more)
    void work()
  }

  return {
    sendings,
    isOnItsWay,
    add: (files: readonly File[]) => {
      const more = inRequests(files).map((together): Sending => {
        count.current++
        return {
          key: String(count.current),
          files: together,
          name: nameOf(together),
          byteCount: together.reduce((sum, file) => sum + file.size, 0),
          state: 'waiting',
          sentBytes: 0,
          totalBytes: 0,
          sentence: '',
        }
      })
      setSendings((before) => [...before, ...more])
      put(more)
    },
    cancel: (key: string) => {
      queue.current = queue.current.filter((one) => one.key !== key)
      if (current.current?.key === key) current.current.controller.abort()
      else remove(key)
    },
    again: (key: string) => {
      const failed = sendings.find((one) => one.key === key)
      if (failed === undefined) return
      const next: Sending = { ...failed, state: 'waiting', sentBytes: 0, totalBytes: 0, sentence: '' }
      update(key, next)
      put([next])
    },
  }
}
