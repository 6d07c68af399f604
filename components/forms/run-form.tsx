'use client'

import { unstable_rethrow } from 'next/navigation'
import { useEffect, useMemo, useRef, useState, useTransition } from 'react'
import { Button } from '@/components/ui/button'
import { type FormState } from '@/components/ui/form-state'
import { LinkButton } from '@/components/ui/link-button'
import { Notice } from '@/components/ui/notice'
import { SelectField } from '@/components/ui/select-field'
import { TextArea } from '@/components/ui/text-area'
import { TextField } from '@/components/ui/text-field'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { readRunForm } from '@/lib/domain/read-run-form'
import { openRunForm, type RunFormChoices, type RunFormValues, runFormValuesSchema } from '@/lib/domain/run-form'
import { CautionList } from './caution-list'
import { DraftLine } from './draft-line'
import { flowReferenceChoices } from './flow-reference-choices'
import { unsentDraft } from './draft-keeper'
import { FeedRow, Part, Radio, Said } from './run-form-parts'
import { useDraft } from './use-draft'

const BED_CODES = ['tube-per-particle', 'bed-per-particle']
const PRESSURE_CODES = ['over-pressure', 'near-pressure-limit', 'over-temperature']
const GASES = ['CO2', 'CO', 'H2', 'CH4', 'N2', 'Ar', 'He', 'O2', 'H2O', 'NH3', 'C2H4', 'C2H6', 'C3H6', 'C3H8', 'NO']

export interface RunFormProps {
  readonly choices: RunFormChoices
  /** the form as it opens: a draft, or filled in from the last run on the rig */
  readonly initial: RunFormValues
  readonly isDraft: boolean
  /** now, as the server had it when the page was made: both sides render the same */
  readonly now: string
  readonly save: (values: RunFormValues) => Promise<FormState>
  /** name under which what is typed is kept */
  readonly draftName?: string
  /** a run that was logged and is corrected: what it is (campaign, rig, sample, name) stays */
  readonly corrects?: { readonly code: string; readonly place: string; readonly href: `/runs/${string}` }
}

/** Log a run: what is in the bed, what flows, and what to be careful about; units as people write them. */
export function RunForm({ choices, initial, isDraft, now, save, draftName = 'log-run', corrects }: RunFormProps) {
  const [values, setValues] = useState(initial)
  const [touched, setTouched] = useState<ReadonlySet<string>>(new Set())
  const [hasChanged, setHasChanged] = useState(false)
  const [answer, setAnswer] = useState<FormState>(null)
  const [isKept, setIsKept] = useState(false)
  const [isPending, startSaving] = useTransition()
  const form = useRef<HTMLFormElement>(null)
  const draft = useDraft(draftName, values, hasChanged)
  const reading = useMemo(() => readRunForm(values, choices), [values, choices])

  // what this tab could not send before it was loaded again is newer than what the server kept
  useEffect(() => {
    const parsed = runFormValuesSchema.safeParse(unsentDraft(draftName))
    if (!parsed.success) return
    // eslint-disable-next-line react-hooks/set-state-in-effect -- the tab's store exists only in the browser, after the first render
    setValues(parsed.data)
    setHasChanged(true)
  }, [draftName])

  const change = (part: Partial<RunFormValues>) => {
    setValues((before) => ({ ...before, ...part }))
    setHasChanged(true)
    setIsKept(false)
  }
  const touch = (name: string) => setTouched((before) => (before.has(name) ? before : new Set([...before, name])))
  const hasAnswer = answer !== null && !answer.ok
  const issueOf = (name: string): string | undefined =>
    touched.has(name) || hasAnswer
      ? [...reading.issues, ...(hasAnswer ? answer.issues : [])].find((issue) => issue.field === name)?.message
      : undefined

  type TextName = {
    [Name in keyof RunFormValues]: RunFormValues[Name] extends string ? Name : never
  }[keyof RunFormValues]
  const text = (name: TextName) => ({
    name,
    value: values[name],
    error: issueOf(name),
    understood: reading.said[name],
    onChange: (event: { target: { value: string } }) =>
      change({
        [name]: event.target.value,
        // what was said of another figure says nothing of this one: an unstated kind is asked again
        ...(name === 'pressure' ? { pressureKind: '' as const } : {}),
      }),
    onBlur: () => touch(name),
  })

  const rig = choices.rigs.find(({ id }) => id === values.rigId)
  const samples = choices.samples.filter(({ campaignIds }) => campaignIds.includes(values.campaignId))
  const sample = choices.samples.find(({ id }) => id === values.sampleId)
  const bedIn = choices.bedsIn.find((bed) => bed.rigId === values.rigId && bed.channel === values.channel)
  const isNewBed = values.bed === 'new' || bedIn === undefined
  const last = choices.lastRuns.find((run) => run.rigId === values.rigId)
  const cautionsOf = (codes: readonly string[]) => reading.cautions.filter(({ code }) => codes.includes(code))
  const feedCautions = reading.cautions.filter(({ code }) => ![...BED_CODES, ...PRESSURE_CODES].includes(code))

  const changeRig = (rigId: string) => {
    // untouched, the form follows the rig; once something was typed only the rig changes
    if (!hasChanged && !isDraft) setValues(openRunForm(choices, rigId, values.campaignId, values.key, new Date(now)))
    else change({ rigId, channel: choices.rigs.find(({ id }) => id === rigId)?.channels[0]?.code ?? '' })
  }
  const fillFromLast = () => {
    setValues({ ...openRunForm(choices, values.rigId, values.campaignId, values.key, new Date(now)) })
    setHasChanged(true)
  }

  const submit = () => {
    setAnswer({ ok: false, code: 'invalid', message: '', issues: [] })
    if (reading.run === null) {
      setAnswer({
        ok: false,
        code: 'invalid',
        message: `Not ${corrects === undefined ? 'logged' : 'saved'} yet: some fields need a look.`,
        issues: reading.issues,
      })
      focusFirstFault(form.current)
      return
    }
    draft.keeper.stop()
    startSaving(async () => {
      try {
        const next = await save(values)
        setAnswer(next)
        if (next !== null && !next.ok) draft.keeper.goOn()
      } catch (error) {
        // a redirect of the framework passes through here: the run is logged, and what was typed is not to be kept again
        unstable_rethrow(error)
        draft.keeper.goOn()
        if (!(error instanceof TypeError)) throw error
        setAnswer({
          ok: false,
          code: 'busy',
          message: 'Not saved: no connection. What you typed stays here; try again when the connection is back.',
          issues: [],
        })
      }
    })
  }

  return (
    <form
      ref={form}
      noValidate
      className="px-4 pb-32 sm:px-6"
      onSubmit={(event) => {
        event.preventDefault()
        submit()
      }}
    >
      <header className="pt-5">
        <h1>{corrects === undefined ? 'Log a run' : `Correct ${corrects.code}`}</h1>
        <p className="mt-1 text-[13px] text-ink-2">
          {corrects !== undefined
            ? `${corrects.place}. What the run is stays; what was written of it can be corrected, and its numbers follow. Who changed what is kept.`
            : isDraft
              ? 'This is what you had typed and not logged yet.'
              : last === undefined
                ? 'The first run on this rig. Write quantities with their units, as you are used to.'
                : `Filled in from ${last.code}, the last run on ${last.rigCode}. Change what differs.`}
          {corrects === undefined && isDraft && last !== undefined ? (
            <>
              {' '}
              <button type="button" className="cursor-pointer text-accent underline" onClick={fillFromLast}>
                Start again from {last.code}
              </button>
            </>
          ) : null}
        </p>
      </header>

      {corrects === undefined ? (
        <Part title="" aside={null}>
          <SelectField
            {...text('campaignId')}
            label="Campaign"
            unchosen="Choose a campaign"
            choices={choices.campaigns.map(({ id, code, name }) => ({ value: id, label: `${name} (${code})` }))}
            className="col-span-2"
          />
          <SelectField
            {...text('rigId')}
            label="Rig"
            unchosen="Choose a rig"
            choices={choices.rigs.map(({ id, code, name }) => ({
              value: id,
              label: code === name ? code : `${code}, ${name}`,
            }))}
            onChange={(event) => changeRig(event.target.value)}
          />
          <SelectField
            {...text('channel')}
            label="Channel"
            choices={(rig?.channels ?? []).map(({ code }) => ({ value: code, label: code }))}
          />
          <SelectField
            {...text('kind')}
            label="Kind of run"
            choices={[
              { value: 'catalyst', label: 'Catalyst' },
              { value: 'blank', label: 'Blank, no catalyst' },
              { value: 'diluent', label: 'Diluent alone' },
            ]}
            className="col-span-2"
          />
        </Part>
      ) : null}

      <Part
        title="Bed"
        aside={
          <>
            {reading.bedSentence === '' ? null : <Said>{reading.bedSentence}</Said>}
            <CautionList cautions={cautionsOf(BED_CODES)} />
          </>
        }
      >
        {bedIn === undefined || corrects !== undefined ? null : (
          <fieldset className="col-span-2">
            <legend className="sr-only">Which bed</legend>
            <Radio
              name="bed"
              value="in"
              isChecked={values.bed === 'in'}
              onChoose={() => change({ bed: 'in' })}
              label={`The bed that is in: ${bedIn.code}, ${bedIn.sampleCode}, ${formatQuantity(bedIn.catalystMassKg, 'mass')}`}
            />
            <Radio
              name="bed"
              value="new"
              isChecked={values.bed === 'new'}
              onChoose={() => change({ bed: 'new' })}
              label="A bed packed for this run"
            />
          </fieldset>
        )}
        {isNewBed ? (
          <>
            {corrects === undefined ? (
              <SelectField
                {...text('sampleId')}
                label="Sample"
                unchosen={
                  samples.length === 0 && values.campaignId !== ''
                    ? 'No sample in this campaign yet'
                    : 'Choose a sample'
                }
                choices={samples.map(({ id, code, name }) => ({ value: id, label: `${code}, ${name}` }))}
                onChange={(event) =>
                  // the mass of another sample would be a plausible wrong one
                  change({ sampleId: event.target.value, lotId: '', catalyst: '' })
                }
                className={(sample?.lots.length ?? 0) > 0 ? 'col-span-1' : 'col-span-2'}
              />
            ) : null}
            {(sample?.lots.length ?? 0) > 0 ? (
              <SelectField
                {...text('lotId')}
                label="Lot"
                unchosen="Not stated"
                choices={(sample?.lots ?? []).map(({ id, code }) => ({ value: id, label: code }))}
              />
            ) : null}
            <TextField {...text('catalyst')} label="Catalyst" placeholder="80 mg" />
            <TextField
              {...text('weighing')}
              label="Uncertainty of the weighing"
              placeholder="0.5 % or 0.4 mg"
              hint="one standard uncertainty"
            />
            <TextField {...text('diluent')} label="Diluent" placeholder="450 mg SiC" />
            <TextField {...text('sieve')} label="Sieve fraction" placeholder="125 to 180 µm" />
            <TextField {...text('tube')} label="Tube, inner diameter" placeholder="4 mm" />
            <TextField {...text('bedLength')} label="Bed length" placeholder="18 mm" />
          </>
        ) : null}
      </Part>

      <Part
        title="Feed"
        aside={
          <>
            {reading.feedSentence === '' ? null : <Said>{reading.feedSentence}</Said>}
            <CautionList cautions={feedCautions} />
          </>
        }
      >
        <SelectField
          {...text('flowReference')}
          label="Flows are counted at"
          unchosen="Not said yet"
          hint={reading.asksFlowReference ? undefined : 'A line can state its own, as in 60 mL/min (0 °C, 1013 mbar).'}
          choices={flowReferenceChoices(values.flowReference)}
          className="col-span-2"
        />
        <div className="col-span-2">
          <div className="grid gap-2">
            {values.feed.map((row, position) => (
              <FeedRow
                key={position}
                position={position}
                row={row}
                moleFraction={reading.moleFractions[position] ?? null}
                speciesIssue={issueOf(`feed.${String(position)}.species`)}
                flowIssue={issueOf(`feed.${String(position)}.flow`)}
                said={reading.said[`feed.${String(position)}.flow`]}
                onChange={(part) =>
                  change({
                    feed: values.feed.map((other, index) =>
                      index === position
                        ? { ...other, ...part }
                        : part.isStandard === true
                          ? { ...other, isStandard: false }
                          : other,
                    ),
                  })
                }
                onTouch={(name) => touch(`feed.${String(position)}.${name}`)}
                onRemove={() => change({ feed: values.feed.filter((_row, index) => index !== position) })}
              />
            ))}
          </div>
          <datalist id="gases">
            {GASES.map((gas) => (
              <option key={gas} value={gas} />
            ))}
          </datalist>
          {issueOf('feed') === undefined ? null : <p className="mt-1 text-[13px] text-fault">{issueOf('feed')}</p>}
          <Button
            className="mt-2"
            disabled={values.feed.length >= 20}
            onClick={() => change({ feed: [...values.feed, { species: '', flow: '', isStandard: false }] })}
          >
            Add a gas
          </Button>
        </div>
      </Part>

      <Part title="Conditions" aside={<CautionList cautions={cautionsOf(PRESSURE_CODES)} />}>
        <TextField
          {...text('pressure')}
          label="Pressure at the inlet"
          placeholder="1.30 bar abs"
          className={reading.asksPressureKind ? 'col-span-1' : 'col-span-2'}
        />
        {reading.asksPressureKind ? (
          <SelectField
            {...text('pressureKind')}
            label="Gauge or absolute"
            unchosen="Not said yet"
            choices={[
              { value: 'absolute', label: 'absolute' },
              { value: 'gauge', label: 'gauge, above the air around' },
            ]}
          />
        ) : null}
        {reading.isGauge ? (
          <TextField
            {...text('barometer')}
            label="Air pressure at the gauge"
            className="col-span-2"
            placeholder="1013 mbar"
          />
        ) : null}
        <TextField {...text('start')} label="Start" type="datetime-local" className="col-span-2" />
        <TextField
          {...text('highestTemperature')}
          label="Highest temperature planned"
          isOptional
          placeholder="275 °C"
          hint="for the cautions; kept in the notes"
          className="col-span-2"
        />
        <TextArea {...text('pretreatment')} label="Pretreatment" isOptional className="col-span-2" rows={2} />
        <TextArea {...text('notes')} label="Notes" isOptional className="col-span-2" rows={2} />
        {corrects === undefined ? (
          <TextField
            {...text('code')}
            label="Name of the run"
            hint="Left empty, it gets the next free number."
            className="col-span-2"
          />
        ) : null}
      </Part>

      <div className="fixed inset-x-0 bottom-0 z-30 border-t border-line bg-paper px-4 py-2 sm:px-6">
        <div className="lg:max-w-[56rem]">
          {hasAnswer && answer.message !== '' ? (
            <Notice kind="fault" isLive title={answer.message} className="mb-2 max-h-40 overflow-y-auto">
              <ul>
                {answer.issues.map((issue) => (
                  <li key={`${issue.field} ${issue.message}`}>{issue.message}</li>
                ))}
              </ul>
            </Notice>
          ) : null}
          <DraftLine
            state={draft.state}
            signInHref={`/sign-in?next=${encodeURIComponent(corrects === undefined ? '/runs/new' : `${corrects.href}/edit`)}`}
          />
          {isKept ? <p className="text-[13px] text-sound">Kept. Open “Log a run” again to go on.</p> : null}
          <div className="mt-1.5 flex gap-2.5">
            {corrects === undefined ? (
              <Button
                className="min-h-[46px] flex-1 text-[16px]"
                onClick={() => {
                  setHasChanged(true)
                  draft.keeper.take(values)
                  void draft.keeper.send().then(setIsKept)
                }}
              >
                Save for later
              </Button>
            ) : (
              <LinkButton href={corrects.href} className="min-h-[46px] flex-1 text-[16px]">
                Leave as it was
              </LinkButton>
            )}
            <Button
              type="submit"
              kind="main"
              className="min-h-[46px] flex-1 text-[16px]"
              busyWith={isPending ? 'Saving' : null}
            >
              {corrects === undefined ? 'Save and add files' : 'Save corrections'}
            </Button>
          </div>
        </div>
      </div>
    </form>
  )
}

function focusFirstFault(form: HTMLFormElement | null): void {
  // after the fields at fault were marked
  requestAnimationFrame(() => {
    const field = form?.querySelector('[aria-invalid="true"]')
    if (field instanceof HTMLElement) field.focus()
  })
}
