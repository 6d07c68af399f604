'use client'

import { type DraftState } from './draft-keeper'

/** One line that says whether what was typed is safe. */
export function DraftLine({ state, signInHref }: { readonly state: DraftState; readonly signInHref: string }) {
  return (
    <p role="status" className="prose text-[13px] text-ink-2">
      {state.kind === 'untouched' ? 'What you type is kept as you go.' : null}
      {state.kind === 'changed' ? 'Not saved yet.' : null}
      {state.kind === 'saved' ? `Saved for you at ${state.at.toTimeString().slice(0, 5)}; not logged yet.` : null}
      {state.kind === 'unreachable' ? (
        <span className="text-doubt">
          Not saved yet: no connection. What you typed stays here and is sent as soon as the connection is back.
        </span>
      ) : null}
      {state.kind === 'signed-out' ? (
        <span className="text-doubt">
          Not saved yet: you were signed out after a pause. What you typed stays here.{' '}
          <a href={signInHref} target="_blank" rel="noreferrer">
            Sign in again in a new tab
          </a>
          , then go on.
        </span>
      ) : null}
      {state.kind === 'refused' ? <span className="text-fault">Not saved: {state.sentence}</span> : null}
    </p>
  )
}
