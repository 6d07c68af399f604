import 'server-only'
import { randomBytes } from 'node:crypto'
import { closeSync, fsyncSync, linkSync, mkdirSync, openSync, readFileSync, unlinkSync, writeSync } from 'node:fs'
import path from 'node:path'
import { z } from 'zod'

const blankIsUnset = (value: unknown) => (value === '' ? undefined : value)
const optional = <T extends z.ZodType>(inner: T) => z.preprocess(blankIsUnset, inner.optional())

const secret = z.string().min(32, 'needs at least 32 characters')

const environmentSchema = z.object({
  NODE_ENV: z.preprocess(blankIsUnset, z.enum(['development', 'production', 'test']).default('development')),
  /** Set by the framework; during a build nothing may be opened or made. */
  NEXT_PHASE: optional(z.string()),
  /** Holds the database, the files as handed in, and the secrets. */
  DATA_DIR: z.preprocess(blankIsUnset, z.string().default('.data')),
  /** A PostgreSQL server instead of the database in DATA_DIR. */
  DATABASE_URL: optional(z.url({ protocol: /^postgres(ql)?$/ })),
  /** The address people type. An `http:` one off this machine is a choice to be made outright, not a fallback. */
  APP_ORIGIN: z.preprocess(
    blankIsUnset,
    z
      .url({ protocol: /^https?$/ })
      .transform((text) => new URL(text).origin)
      .default('http://localhost:3000'),
  ),
  SESSION_KEY: optional(secret),
  /** Still opens cookies while a key is being changed; seals none. */
  SESSION_KEY_PREVIOUS: optional(secret),
  PEPPER: optional(secret),
  MAX_UPLOAD_BYTES: z.preprocess(blankIsUnset, z.coerce.number().int().positive().default(2_147_483_648)),
  /** How many reverse proxies in front may be believed about the caller's address. */
  TRUSTED_PROXIES: z.preprocess(blankIsUnset, z.coerce.number().int().min(0).max(5).default(0)),
})

type Parsed = z.infer<typeof environmentSchema>

/** What the process was started with. `SESSION_KEY` and `PEPPER` are made and kept in the data folder when not given. */
export type Environment = Omit<Parsed, 'SESSION_KEY' | 'PEPPER'> & {
  /** Whether this is the built program; tests and scripts run the sources as they stand. */
  readonly IS_BUNDLED: boolean
  readonly SESSION_KEY: string
  readonly PEPPER: string
}

const secretsSchema = z.object({ sessionKey: secret, pepper: secret })
type Secrets = z.infer<typeof secretsSchema>

function parse(): Parsed {
  const result = environmentSchema.safeParse(process.env)
  if (result.success)
    return { ...result.data, DATA_DIR: path.resolve(/* turbopackIgnore: true */ result.data.DATA_DIR) }
  const lines = result.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`)
  throw new Error(`The environment is not usable.\n${lines.join('\n')}`)
}

const isErrno = (error: unknown, code: string) => error instanceof Error && 'code' in error && error.code === code

function readSecrets(file: string): Secrets | null {
  let text: string
  try {
    text = readFileSync(file, 'utf8')
  } catch (error) {
    if (isErrno(error, 'ENOENT')) return null
    throw error
  }
  const parsed = secretsSchema.safeParse(JSON.parse(text))
  if (!parsed.success)
    throw new Error(`${file} is damaged. Put it back from a backup; without it nobody's password can be checked.`)
  return parsed.data
}

/** Written whole under another name and linked into place, so that two processes starting at once agree on one file. */
function keepSecrets(dataDir: string): Secrets {
  const file = path.join(dataDir, 'secrets.json')
  const found = readSecrets(file)
  if (found) return found
  mkdirSync(dataDir, { recursive: true, mode: 0o700 })
  const made: Secrets = {
    sessionKey: randomBytes(48).toString('base64url'),
    pepper: randomBytes(48).toString('base64url'),
  }
  const draft = `${file}.${process.pid}.${randomBytes(4).toString('hex')}`
  const handle = openSync(draft, 'wx', 0o600)
  try {
    writeSync(handle, `${JSON.stringify(made, null, 2)}\n`)
    fsyncSync(handle)
  } finally {
    closeSync(handle)
  }
  try {
    linkSync(draft, file)
  } catch (error) {
    if (!isErrno(error, 'EEXIST')) throw error
  } finally {
    unlinkSync(draft)
  }
  const kept = readSecrets(file)
  if (!kept) throw new Error(`${file} could not be kept; is the data folder writable?`)
  return kept
}

let parsed: Parsed | undefined
let secrets: Secrets | undefined
const values = () => (parsed ??= parse())
const kept = () => (secrets ??= keepSecrets(values().DATA_DIR))

/** The one reader of `process.env`. Read on first use, so that importing it during a build neither fails nor makes a folder. */
export const environment: Environment = {
  // the build writes the value in; elsewhere nothing sets it
  IS_BUNDLED: process.env.NEXT_RUNTIME !== undefined,
  get NODE_ENV() {
    return values().NODE_ENV
  },
  get NEXT_PHASE() {
    return values().NEXT_PHASE
  },
  get DATA_DIR() {
    return values().DATA_DIR
  },
  get DATABASE_URL() {
    return values().DATABASE_URL
  },
  get APP_ORIGIN() {
    return values().APP_ORIGIN
  },
  get SESSION_KEY() {
    return values().SESSION_KEY ?? kept().sessionKey
  },
  get SESSION_KEY_PREVIOUS() {
    return values().SESSION_KEY_PREVIOUS
  },
  get PEPPER() {
    return values().PEPPER ?? kept().pepper
  },
  get MAX_UPLOAD_BYTES() {
    return values().MAX_UPLOAD_BYTES
  },
  get TRUSTED_PROXIES() {
    return values().TRUSTED_PROXIES
  },
}
