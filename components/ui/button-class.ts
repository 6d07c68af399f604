import { classNames } from './class-names'

export type ButtonKind = 'main' | 'plain' | 'quiet' | 'danger'

const BASE =
  'inline-flex items-center justify-center gap-2 rounded px-3 py-1 min-h-8 touch:min-h-11 touch:px-4 no-underline hover:no-underline cursor-pointer disabled:cursor-not-allowed disabled:opacity-60 whitespace-nowrap'

const KINDS: Readonly<Record<ButtonKind, string>> = {
  main: 'bg-accent border border-accent text-paper font-semibold',
  plain: 'bg-sheet border border-control-line text-ink hover:border-ink-3',
  quiet: 'border border-transparent text-accent hover:underline',
  danger: 'bg-sheet border border-fault text-fault',
}

/** Look of a button, shared by buttons and by links that act like one. */
export function buttonClass(kind: ButtonKind, more?: string): string {
  return classNames(BASE, KINDS[kind], more)
}
