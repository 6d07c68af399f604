import { config } from 'zod/v4/core'

// Runs in the browser before anything else. Schemas would first ask by `new Function` whether they may compile themselves; the content policy
// blocks and reports that, so they are told not to ask.
config({ jitless: true })
