'use client'

import { type DragEvent, useId, useRef, useState } from 'react'
import { classNames } from '@/components/ui/class-names'
import { Button } from '@/components/ui/button'

/** Where files are dropped, or chosen by the button; several at once. */
export function DropZone({
  label,
  hint,
  onFiles,
  isMultiple = true,
}: {
  readonly label: string
  readonly hint: string
  readonly onFiles: (files: readonly File[]) => void
  readonly isMultiple?: boolean
}) {
  const id = useId()
  const input = useRef<HTMLInputElement>(null)
  const [isOver, setIsOver] = useState(false)
  const over = (event: DragEvent) => {
    event.preventDefault()
    setIsOver(true)
  }
  return (
    <div
      className={classNames(
        'grid justify-items-start gap-2 border border-dashed px-4 py-5',
        isOver ? 'border-accent bg-accent-wash' : 'border-line-strong bg-well',
      )}
      onDragEnter={over}
      onDragOver={over}
      onDragLeave={() => setIsOver(false)}
      onDrop={(event) => {
        event.preventDefault()
        setIsOver(false)
        onFiles([...event.dataTransfer.files])
      }}
    >
      <label htmlFor={id} className="font-semibold">
        {label}
      </label>
      <p className="m-0 text-ink-2">{hint}</p>
      <Button kind="main" onClick={() => input.current?.click()}>
        {isMultiple ? 'Choose files' : 'Choose a file'}
      </Button>
      <input
        ref={input}
        id={id}
        type="file"
        multiple={isMultiple}
        className="sr-only"
        tabIndex={-1}
        onChange={(event) => {
          onFiles([...(event.target.files ?? [])])
          // the same file may be chosen again after it failed
          event.target.value = ''
        }}
      />
    </div>
  )
}
