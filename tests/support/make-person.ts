import { randomUUID } from 'node:crypto'
import { getDatabase } from '@/db/client'
import { insertUser } from '@/db/mutations/people'
import { PASSWORD_SCHEME, preparePassword } from '@/lib/auth/password'
import { hashInThread } from '@/lib/auth/password-threads'
import { type Role } from '@/lib/domain/role'
import { environment } from '@/lib/environment'

export const TEST_PASSWORD = 'kettle orbit marzipan tundra'

/** As cheap as bcrypt goes: what a good hash costs is tested where hashes are made. */
const CHEAPEST = 4

/** Hash of the test password, made in milliseconds. */
export async function hashForTests(password = TEST_PASSWORD): Promise<string> {
  return hashInThread(preparePassword(password, environment.PEPPER), CHEAPEST)
}

/** A person who can sign in with the test password, unless another hash is given. */
export async function makePerson(role: Role, more: { email?: string; passwordHash?: string } = {}) {
  const id = randomUUID()
  const email = more.email ?? `${role}-${id.slice(0, 8)}@example.test`
  const passwordHash = more.passwordHash ?? (await hashForTests())
  const db = await getDatabase()
  await db.transaction((tx) =>
    insertUser(tx, {
      id,
      email,
      displayName: `${role} for a test`,
      role,
      passwordHash,
      passwordScheme: PASSWORD_SCHEME,
    }),
  )
  return { id, email, displayName: `${role} for a test`, role }
}
