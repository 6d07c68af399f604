'use client'

import { type DragEvent, type ReactNode, useId, useRef, useState } from 'react'
import { classNames } from '@/components/ui/class-names'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'

/** Files that were let go over the page; a folder is none and is told by name. */
function droppedFiles(event: DragEvent): { files: File[]; folders: string[] } {
  const files: File[] = []
  const folders: string[] = []
  for (const item of event.dataTransfer.items) {
    if (item.kind !== 'file') continue
    const entry = item.webkitGetAsEntry()
    if (entry?.isDirectory === true) folders.push(entry.name)
    else {
      const file = item.getAsFile()
      if (file !== null) files.push(file)
    }
  }
  return { files, folders }
}

const carriesFiles = (event: DragEvent) => event.dataTransfer.types.includes('Files')

/** A place to let files go anywhere in it, with a button that does the same for hands without a mouse. */
export function DropZone({
  label,
  hint,
  accept,
  isDisabled = false,
  onFiles,
  children,
}: {
  readonly label: string
  readonly hint: ReactNode
  /** endings the file picker starts with; others can be chosen too */
  readonly accept?: string
  readonly isDisabled?: boolean
  readonly onFiles: (files: readonly File[]) => void
  /** what lies in the zone as well, so that a file can be let go over it */
  readonly children?: ReactNode
}) {
  const id = useId()
  const input = useRef<HTMLInputElement>(null)
  // entering a child leaves the parent: counted, so that the frame does not flicker
  const depth = useRef(0)
  const [isOver, setIsOver] = useState(false)
  const [folders, setFolders] = useState<readonly string[]>([])
  const take = (files: readonly File[]) => {
    if (files.length > 0) onFiles(files)
  }
  return (
    <div
      onDragEnter={(event) => {
        if (!carriesFiles(event)) return
        event.preventDefault()
        depth.current++
        setIsOver(true)
      }}
      onDragOver={(event) => {
        if (carriesFiles(event)) event.preventDefault()
      }}
      onDragLeave={(event) => {
        if (!carriesFiles(event)) return
        depth.current = Math.max(0, depth.current - 1)
        if (depth.current === 0) setIsOver(false)
      }}
      onDrop={(event) => {
        if (!carriesFiles(event)) return
        event.preventDefault()
        depth.current = 0
        setIsOver(false)
        if (isDisabled) return
        const dropped = droppedFiles(event)
        setFolders(dropped.folders)
        take(dropped.files)
      }}
    >
      <div
        className={classNames(
          'flex flex-wrap items-center gap-x-5 gap-y-3 rounded border border-dashed px-4 py-5 sm:px-6',
          isOver ? 'border-accent bg-accent-wash' : 'border-control-line bg-well',
        )}
      >
        <div className="min-w-0 flex-1 basis-60">
          <p id={`${id}-label`} className="m-0 font-head text-[16px] font-[560]">
            {isOver ? 'Let go to add' : label}
          </p>
          <p id={`${id}-hint`} className="m-0 mt-0.5 text-[13px] text-ink-2">
            {hint}
          </p>
        </div>
        <input
          ref={input}
          id={id}
          type="file"
          multiple
          {...(accept === undefined ? {} : { accept })}
          className="sr-only"
          tabIndex={-1}
          aria-label={label}
          disabled={isDisabled}
          onChange={(event) => {
            take([...(event.target.files ?? [])])
            setFolders([])
            // the same file may be chosen once more
            event.target.value = ''
          }}
        />
        <Button
          kind="main"
          disabled={isDisabled}
          aria-describedby={`${id}-label ${id}-hint`}
          onClick={() => input.current?.click()}
          className="max-sm:w-full"
        >
          Choose files
        </Button>
      </div>
      {folders.length === 0 ? null : (
        <Notice kind="doubt" isLive className="mt-2" title={`A folder is not taken: ${folders.join(', ')}.`}>
          Open it and drop the files that are in it.
        </Notice>
      )}
      {children}
    </div>
  )
}
