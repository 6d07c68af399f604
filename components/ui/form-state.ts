'use client'

import { createContext, useContext } from 'react'
import { type ActionResult } from '@/lib/domain/errors'

/** What the form around a field last heard from the server: null before the first answer. */
export type FormState = ActionResult<string> | null

const FormStateContext = createContext<FormState>(null)

export const FormStateProvider = FormStateContext.Provider

/** Sentence that the server put at this field, if any. */
export function useFieldIssue(name: string): string | undefined {
  const state = useContext(FormStateContext)
  if (state === null || state.ok) return undefined
  return state.issues.find((issue) => issue.field === name)?.message
}
