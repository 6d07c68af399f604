// Loads the demo campaign into the data folder, once, and prints who can sign in.
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { closeDatabase } from '../db/client'
import { DEMO_PASSWORD, demoPeople } from '../db/demo/demo-campaign'
import { environment } from '../lib/environment'
import { loadDemoCampaign } from './demo-loader'

const MARK = path.join(environment.DATA_DIR, 'loaded')

function printSignIns(): void {
  console.log(`\nSign in at ${environment.APP_ORIGIN} as`)
  for (const person of demoPeople) console.log(`  ${person.role.padEnd(10)} ${person.email}`)
  console.log(`  password   ${DEMO_PASSWORD}   (for all five; this is a demo with invented data)\n`)
}

async function main(): Promise<void> {
  if (existsSync(MARK)) console.log(`  already loaded on ${readFileSync(MARK, 'utf8').trim()}`)
  else {
    await loadDemoCampaign({ say: console.log })
    writeFileSync(MARK, `${new Date().toISOString()}\n`, { mode: 0o600 })
  }
  printSignIns()
}

main()
  .catch((error: unknown) => {
    console.error(error)
    process.exitCode = 1
  })
  .finally(() => closeDatabase())
