import type { Config } from 'tailwindcss'

/** What CSS cannot say; the tokens themselves stand in app/globals.css. */
const config: Config = {
  content: ['./app/**/*.{ts,tsx}', './components/**/*.{ts,tsx}'],
}

export default config
