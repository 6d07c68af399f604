import { randomUUID } from 'node:crypto'
import { getDatabase } from '@/db/client'
import { insertUser } from '@/db/mutations/people'
import { hashPassword, PASSWORD_SCHEME } from '@/lib/auth/password'
import { type Role } from '@/lib/domain/role'

export const TEST_PASSWORD = 'kettle orbit marzipan tundra'

/** A person who can sign in. Hashing costs a third of a second, so give a hash made once where many are needed. */
export async function makePerson(role: Role, more: { email?: string; passwordHash?: string } = {}) {
  const id = randomUUID()
  const email = more.email ?? `${role}-${id.slice(0, 8)}@example.test`
  const passwordHash = more.passwordHash ?? (await hashPassword(TEST_PASSWORD))
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
