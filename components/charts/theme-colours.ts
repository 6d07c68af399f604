import { useSyncExternalStore } from 'react'

/** The theme's colours as a canvas needs them: read from the custom properties, so that they are written once, in globals.css. */
export interface ThemeColours {
  readonly paper: string
  readonly sheet: string
  readonly line: string
  readonly lineStrong: string
  readonly ink: string
  readonly ink2: string
  readonly ink3: string
  readonly accent: string
  readonly doubt: string
  readonly fault: string
  /** six stops, cold to hot */
  readonly temper: readonly string[]
  readonly fontFamily: string
}

/** Light theme, for the server's pass and for tests of what is drawn. */
export const lightColours: ThemeColours = {
  paper: '#fbfaf6',
  sheet: '#ffffff',
  line: '#ddd8cc',
  lineStrong: '#b9b2a3',
  ink: '#1b1d20',
  ink2: '#51565c',
  ink3: '#6d7278',
  accent: '#1d4e7a',
  doubt: '#8a5a00',
  fault: '#9b2c35',
  temper: ['#ead28a', '#d7a13c', '#b1672c', '#7d3a60', '#473f88', '#1c3668'],
  fontFamily: '"Source Sans 3 Variable", sans-serif',
}

const DARK = '(prefers-color-scheme: dark)'
let cached: ThemeColours | null = null

function readColours(): ThemeColours {
  const style = getComputedStyle(document.documentElement)
  const read = (name: string, otherwise: string) => style.getPropertyValue(name).trim() || otherwise
  return {
    paper: read('--paper', lightColours.paper),
    sheet: read('--sheet', lightColours.sheet),
    line: read('--line', lightColours.line),
    lineStrong: read('--line-strong', lightColours.lineStrong),
    ink: read('--ink', lightColours.ink),
    ink2: read('--ink-2', lightColours.ink2),
    ink3: read('--ink-3', lightColours.ink3),
    accent: read('--accent', lightColours.accent),
    doubt: read('--doubt', lightColours.doubt),
    fault: read('--fault', lightColours.fault),
    temper: lightColours.temper.map((stop, index) => read(`--temper-${index}`, stop)),
    fontFamily: getComputedStyle(document.body).fontFamily || lightColours.fontFamily,
  }
}

function subscribe(onChange: () => void): () => void {
  const query = window.matchMedia(DARK)
  const renew = () => {
    cached = null
    onChange()
  }
  query.addEventListener('change', renew)
  return () => query.removeEventListener('change', renew)
}

/** The colours of the theme in use; follows the system when it changes between light and dark. */
export function useThemeColours(): ThemeColours {
  return useSyncExternalStore(
    subscribe,
    () => (cached ??= readColours()),
    () => lightColours,
  )
}
