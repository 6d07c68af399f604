import { createInterface } from 'node:readline'
import { Writable } from 'node:stream'
import { parseArgs } from 'node:util'
import { closeDatabase } from '@/db/client'
import { makeAdminByCommand } from '@/lib/access/set-up'
import { appErrorOf } from '@/lib/domain/errors'
import { emailSchema } from '@/lib/domain/person'

/** A line that is not shown while it is typed. */
async function askHidden(question: string): Promise<string> {
  const isTerminal = process.stdin.isTTY === true
  if (isTerminal) process.stdout.write(question)
  const silent = new Writable({ write: (_chunk, _encoding, done) => done() })
  const lines = createInterface({ input: process.stdin, output: silent, terminal: isTerminal })
  const line = await new Promise<string>((resolve) => {
    lines.once('line', resolve)
    lines.once('close', () => resolve(''))
  })
  lines.close()
  if (isTerminal) process.stdout.write('\n')
  return line
}

async function main(): Promise<void> {
  const { values } = parseArgs({ options: { email: { type: 'string' }, name: { type: 'string' } } })
  const email = emailSchema.safeParse(values.email ?? '')
  if (!email.success) {
    console.error('Usage: node scripts/create-admin.mjs --email name@laboratory.example [--name "Full Name"]')
    process.exitCode = 2
    return
  }
  const password = await askHidden('Password (at least 15 characters, not shown): ')
  const displayName = values.name ?? email.data.slice(0, email.data.indexOf('@'))
  const outcome = await makeAdminByCommand({ email: email.data, displayName, password })
  console.log(outcome === 'made' ? `${email.data} is an admin now.` : `${email.data} has the new password.`)
}

main()
  .catch((error: unknown) => {
    const expected = appErrorOf(error)
    console.error(expected?.message ?? (error instanceof Error ? error.message : error))
    process.exitCode = 1
  })
  .finally(closeDatabase)
