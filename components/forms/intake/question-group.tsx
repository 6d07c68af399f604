'use client'

import { useId, useState } from 'react'
import { Tag } from '@/components/ui/tag'
import { TextField } from '@/components/ui/text-field'
import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { isTimeZone } from '@/lib/domain/instant-in-zone'
import { type Question } from '@/lib/domain/intake'

const TITLES: Readonly<Record<Question['key'], string>> = {
  kind: 'What is this file?',
  'date-order': 'Day first or month first?',
  'time-zone': 'Which clock?',
  'elapsed-start': 'When did it start?',
  'flow-reference': 'At which state are flows counted?',
  'pressure-kind': 'Absolute or gauge?',
  barometer: 'Pressure of the room?',
  basis: 'Dry or wet gas?',
  'response-convention': 'Which way do the factors go?',
  'decimal-mark': 'Point or comma?',
  'ambiguous-hour': 'Which of the two hours?',
}

/** What can be typed where no choice fits. */
const TYPED: Readonly<
  Partial<
    Record<Question['key'], { readonly label: string; readonly placeholder: string; readonly type?: 'datetime-local' }>
  >
> = {
  'time-zone': { label: 'Another zone', placeholder: 'Europe/Zurich' },
  barometer: { label: 'As read off the barometer', placeholder: '1013 mbar' },
  'elapsed-start': { label: 'Date and time of the start', placeholder: '', type: 'datetime-local' },
}

interface TypedAnswer {
  /** empty while nothing usable is typed */
  readonly value: string
  readonly understood?: string
  readonly error?: string
}

function readTyped(key: Question['key'], text: string): TypedAnswer {
  const trimmed = text.trim()
  if (trimmed === '') return { value: '' }
  if (key === 'time-zone')
    return isTimeZone(trimmed)
      ? { value: trimmed }
      : { value: '', error: 'No such zone. Write it as continent and city: Europe/Zurich.' }
  if (key === 'barometer') {
    const read = parseQuantity(trimmed, 'pressure')
    if (!read.ok) return { value: '', error: read.sentence }
    if (read.valueSi < 50_000 || read.valueSi > 120_000)
      return { value: '', error: 'The air of a room has between 500 and 1200 mbar.' }
    return { value: String(read.valueSi), understood: read.said }
  }
  return { value: trimmed }
}

/** One thing that the file leaves open, asked as a person would; nothing is chosen before somebody chooses it. */
export function QuestionGroup({
  question,
  answer,
  onAnswer,
}: {
  readonly question: Question
  /** empty while unanswered */
  readonly answer: string
  readonly onAnswer: (value: string) => void
}) {
  const id = useId()
  const [text, setText] = useState('')
  const typed = TYPED[question.key]
  const read = readTyped(question.key, text)
  return (
    <fieldset className="m-0 min-w-0 border-0 border-l-[3px] border-doubt p-0 pl-3" aria-describedby={`${id}-why`}>
      <legend className="float-left w-full p-0 font-semibold">{TITLES[question.key]}</legend>
      <p id={`${id}-why`} className="clear-both m-0 mb-1 max-w-[62ch] text-[13.5px] text-ink-2">
        {question.sentence}
      </p>
      {question.choices.map((choice) => (
        <label key={choice.value} className="flex min-h-8 items-center gap-2.5 touch:min-h-11">
          <input
            type="radio"
            name={`${id}-${question.key}`}
            value={choice.value}
            checked={answer === choice.value}
            onChange={() => {
              setText('')
              onAnswer(choice.value)
            }}
            className="size-[18px] shrink-0 accent-(--accent) touch:size-6"
          />
          <span>
            {choice.label}
            {choice.value === question.proposal ? (
              <>
                {' '}
                <Tag>proposed</Tag>
              </>
            ) : null}
          </span>
        </label>
      ))}
      {typed === undefined ? null : (
        <TextField
          name={question.key}
          label={typed.label}
          placeholder={typed.placeholder}
          {...(typed.type === undefined ? {} : { type: typed.type })}
          value={text}
          understood={read.understood}
          error={read.error}
          onChange={(event) => {
            setText(event.target.value)
            onAnswer(readTyped(question.key, event.target.value).value)
          }}
          className="mt-1 max-w-80"
        />
      )}
    </fieldset>
  )
}
