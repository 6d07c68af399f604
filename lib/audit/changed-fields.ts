import { canonicalJson } from '../domain/canonical-json'

/** Bookkeeping that every change moves, and what is counted rather than kept. */
const UNTOLD = new Set(['version', 'myRole', 'sampleCount', 'runCount', 'waitingCount', 'fileCount'])

/** What an edit changed, field by field, before and after: the trail says what was done and no more. */
export function changedFields(
  before: object,
  after: object,
): { readonly before: Readonly<Record<string, unknown>>; readonly after: Readonly<Record<string, unknown>> } {
  const was = new Map<string, unknown>(Object.entries(before))
  const is = new Map<string, unknown>(Object.entries(after))
  const names = [...new Set([...was.keys(), ...is.keys()])].filter(
    (name) => !UNTOLD.has(name) && textOf(was.get(name)) !== textOf(is.get(name)),
  )
  const pick = (values: ReadonlyMap<string, unknown>) =>
    Object.fromEntries(names.map((name) => [name, values.get(name) ?? null]))
  return { before: pick(was), after: pick(is) }
}

function textOf(value: unknown): string {
  return canonicalJson(value ?? null)
}
