'use client'

import { useId } from 'react'
import { type Question } from '@/lib/domain/intake'

/** One question that the file cannot settle. Nothing is chosen beforehand; what is usual is only said. */
export function QuestionGroup({
  question,
  value,
  onChange,
}: {
  readonly question: Question
  readonly value: string
  readonly onChange: (value: string) => void
}) {
  const id = useId()
  return (
    <fieldset className="border-l-[3px] border-doubt bg-doubt-wash px-3 py-2.5">
      <legend className="sr-only">{question.sentence}</legend>
      <p className="m-0 mb-1.5" id={id}>
        {question.sentence}
      </p>
      {question.choices.length === 0 ? (
        <input
          className="control max-w-xs"
          aria-labelledby={id}
          value={value}
          placeholder={question.key === 'elapsed-start' ? '2026-03-02T07:30' : (question.proposal ?? '')}
          type={question.key === 'elapsed-start' ? 'datetime-local' : 'text'}
          step={question.key === 'elapsed-start' ? 1 : undefined}
          onChange={(event) => onChange(event.target.value)}
        />
      ) : (
        <div className="grid gap-1">
          {question.choices.map((choice) => (
            <label key={choice.value} className="flex items-start gap-2 touch:min-h-11 touch:items-center">
              <input
                type="radio"
                name={`${id}-${question.key}`}
                value={choice.value}
                checked={value === choice.value}
                onChange={() => onChange(choice.value)}
                className="mt-0.5 size-[18px] shrink-0 accent-(--accent)"
              />
              <span>
                {choice.label}
                {choice.value === question.proposal ? <span className="text-ink-2"> (likely)</span> : null}
              </span>
            </label>
          ))}
        </div>
      )}
    </fieldset>
  )
}
