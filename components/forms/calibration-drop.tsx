'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { RequestError } from '@/components/server-state/fetch-json'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { SelectField, type SelectChoice } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'
import { type Calibration } from '@/lib/domain/calibration'
import { readPercent } from './intake/read-percent'
import { DropZone } from './intake/drop-zone'
import { sendFiles } from './intake/send-file'

interface Refusal {
  readonly file: File
  readonly sentence: string
  /** the header does not say which way a number goes: only a person can */
  readonly asksConvention: boolean
}

/** Drop a table of response factors: that is all it takes, once it is said from when it holds. What its header leaves open is asked. */
export function CalibrationDrop({ rigs }: { readonly rigs: readonly SelectChoice[] }) {
  const router = useRouter()
  const [validFrom, setValidFrom] = useState('')
  const [rigId, setRigId] = useState('')
  const [instrument, setInstrument] = useState('')
  const [uncertainty, setUncertainty] = useState('')
  const [convention, setConvention] = useState('')
  const [held, setHeld] = useState<readonly File[]>([])
  const [refusals, setRefusals] = useState<readonly Refusal[]>([])
  const [kept, setKept] = useState<readonly string[]>([])
  const [isBusy, setIsBusy] = useState(false)
  const relative = readPercent(uncertainty)
  const start = validFrom === '' ? null : new Date(validFrom)
  const isReady = start !== null && !Number.isNaN(start.getTime()) && relative.ok
  const asksConvention = refusals.some((refusal) => refusal.asksConvention)

  const send = async (files: readonly File[], from: Date, said: string) => {
    const query = new URLSearchParams({
      validFrom: from.toISOString(),
      ...(rigId === '' ? {} : { rigId }),
      ...(instrument.trim() === '' ? {} : { instrument: instrument.trim() }),
      ...(said === '' ? {} : { convention: said }),
      ...(relative.ok && relative.value !== null ? { relativeStandardUncertainty: String(relative.value) } : {}),
    })
    setIsBusy(true)
    const refused: Refusal[] = []
    const made: string[] = []
    for (const file of files) {
      try {
        const { items } = await sendFiles<{ readonly items: readonly Calibration[] }>(
          `/api/v1/calibrations/files?${query.toString()}`,
          [file],
          { signal: new AbortController().signal, onProgress: () => {} },
        )
        made.push(...items.map((item) => `${item.name} with ${String(item.entries.length)} species`))
      } catch (error) {
        if (!(error instanceof Error)) throw error
        refused.push({
          file,
          sentence: error.message,
          asksConvention: error instanceof RequestError && error.fields.includes('convention'),
        })
      }
    }
    setHeld(refused.map(({ file }) => file))
    setRefusals(refused)
    setKept(made)
    setIsBusy(false)
    if (made.length > 0) router.refresh()
  }
  const take = (files: readonly File[]) => {
    setKept([])
    setRefusals([])
    // what was said of the last table says nothing of this one
    setConvention('')
    if (isReady) void send(files, start, '')
    else setHeld(files)
  }

  return (
    <div className="grid gap-3">
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          name="dropValidFrom"
          label="The factors hold from"
          type="datetime-local"
          value={validFrom}
          hint="On your clock. Runs that start later use them."
          error={held.length > 0 && start === null ? 'Say from when they hold; the file waits.' : undefined}
          onChange={(event) => setValidFrom(event.target.value)}
        />
        <TextField
          name="dropUncertainty"
          label="Standard uncertainty of a factor, in %"
          isOptional
          inputMode="decimal"
          hint="Used where the table has no column for it."
          value={uncertainty}
          error={relative.ok ? undefined : relative.sentence}
          onChange={(event) => setUncertainty(event.target.value)}
        />
        <SelectField
          name="dropRig"
          label="For the analyser of"
          unchosen="All rigs"
          choices={rigs}
          value={rigId}
          onChange={(event) => setRigId(event.target.value)}
        />
        <TextField
          name="dropInstrument"
          label="Instrument"
          isOptional
          maxLength={100}
          value={instrument}
          onChange={(event) => setInstrument(event.target.value)}
        />
      </div>
      <DropZone
        label="Drop a table of response factors here"
        hint="One row a species: its formula and its factor; a column with the relative uncertainty if there is one."
        accept=".csv,.txt,.tsv,.xlsx"
        isDisabled={isBusy}
        onFiles={take}
      >
        {refusals.map((refusal) => (
          <Notice
            key={refusal.file.name}
            kind={refusal.asksConvention ? 'doubt' : 'fault'}
            isLive
            className="mt-3"
            title={refusal.asksConvention ? 'One question.' : `${refusal.file.name} was not kept.`}
          >
            {refusal.sentence}
          </Notice>
        ))}
        {asksConvention ? (
          <fieldset className="m-0 mt-3 border-0 p-0">
            <legend className="p-0 text-[14px] text-ink-2">A number in the table is</legend>
            {[
              { value: 'factor', label: 'a factor: amount per area' },
              { value: 'sensitivity', label: 'a sensitivity: area per amount' },
            ].map((choice) => (
              <label key={choice.value} className="flex min-h-8 items-center gap-2.5 touch:min-h-11">
                <input
                  type="radio"
                  name="dropConvention"
                  value={choice.value}
                  checked={convention === choice.value}
                  onChange={() => setConvention(choice.value)}
                  className="size-[18px] shrink-0 accent-(--accent) touch:size-6"
                />
                {choice.label}
              </label>
            ))}
          </fieldset>
        ) : null}
        {held.length === 0 ? null : (
          <div className="mt-3 flex flex-wrap items-center gap-2">
            <Button
              kind="main"
              disabled={!isReady || (asksConvention && convention === '')}
              busyWith={isBusy ? 'Keeping' : null}
              onClick={() => {
                if (start !== null) void send(held, start, convention)
              }}
            >
              Keep {held.map((file) => file.name).join(', ')}
            </Button>
            <Button
              disabled={isBusy}
              onClick={() => {
                setHeld([])
                setRefusals([])
              }}
            >
              Not this file
            </Button>
          </div>
        )}
        {kept.length === 0 ? null : (
          <Notice kind="sound" isLive className="mt-3" title="Kept:">
            {kept.join('; ')}. Runs that start after it are valued with it from now on.
          </Notice>
        )}
      </DropZone>
    </div>
  )
}
