import { z } from 'zod'
import { roleSchema, tokenScopes, tokenScopeSchema, type Role, type TokenScope } from './role'
import { idSchema } from './text'

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, 'An e-mail address has at most 254 characters.')
  .pipe(z.email('An e-mail address looks like name@laboratory.example.'))
/** At sign-in any text is looked up as it is. */
const typedEmailSchema = z
  .string()
  .trim()
  .min(1, 'Type your e-mail address.')
  .max(254, 'An e-mail address has at most 254 characters.')
/** As typed: no trimming, no truncation; how good it is, is judged when it is set. */
const passwordSchema = z.string().min(1, 'Type the password.').max(2_000, 'A password has at most 1,024 bytes.')
const displayNameSchema = z
  .string()
  .trim()
  .min(1, 'Type the name that others see.')
  .max(100, 'A name has at most 100 characters.')

export const signInSchema = z.strictObject({ email: typedEmailSchema, password: passwordSchema })

const oneTimeCodeSchema = z.string().trim().min(1, 'Type or paste the code.').max(100, 'This is longer than a code.')

export const setUpSchema = z.strictObject({
  code: oneTimeCodeSchema,
  email: emailSchema,
  displayName: displayNameSchema,
  password: passwordSchema,
})

export const acceptInvitationSchema = z.strictObject({
  code: oneTimeCodeSchema,
  password: passwordSchema,
})

export const newPersonSchema = z.strictObject({ email: emailSchema, displayName: displayNameSchema, role: roleSchema })
export type NewPerson = z.infer<typeof newPersonSchema>

export const personChangeSchema = z.strictObject({
  role: roleSchema.optional(),
  isDisabled: z.boolean().optional(),
  /** the version the editor saw */
  version: z.int().gte(1),
})
export type PersonChange = z.infer<typeof personChangeSchema>

export const profileChangeSchema = z.strictObject({ displayName: displayNameSchema })

export const passwordChangeSchema = z.strictObject({ currentPassword: passwordSchema, newPassword: passwordSchema })

export const newTokenSchema = z.strictObject({
  name: z
    .string()
    .trim()
    .min(1, 'Name the computer or script that will use the token.')
    .max(100, 'A name has at most 100 characters.'),
  scopes: z
    .array(tokenScopeSchema)
    .min(1, 'Choose at least one thing the token may do.')
    .max(tokenScopes.length)
    .default(['read', 'intake', 'write']),
  campaignId: idSchema.nullable().default(null),
  /** days until it ends; at most a year, so that a forgotten one does not live for ever */
  validDays: z.int().gte(1).lte(366).default(90),
})
export type NewToken = z.infer<typeof newTokenSchema>

/** A token asked for with name and password, by a script that has no session. */
export const tokenRequestSchema = newTokenSchema.extend({
  email: typedEmailSchema,
  password: passwordSchema,
})

export interface PersonSummary {
  readonly id: string
  readonly email: string
  readonly displayName: string
  readonly role: Role
  readonly isDisabled: boolean
  /** false while an invitation waits to be taken up */
  readonly hasPassword: boolean
  /** too many wrong passwords in a row: only a new invitation opens the account again */
  readonly isLocked: boolean
  readonly sessionCount: number
  readonly lastSeenAt: string | null
  readonly createdAt: string
  readonly version: number
}

/** A name to choose from, where members are made. */
export interface PersonName {
  readonly id: string
  readonly displayName: string
  readonly email: string
  readonly role: Role
}

export interface SessionSummary {
  /** reference, not the secret */
  readonly ref: string
  readonly isThisOne: boolean
  readonly signedInAt: string
  readonly lastSeenAt: string
  readonly expiresAt: string
  readonly ipPrefix: string
  readonly userAgent: string
}

export interface TokenSummary {
  readonly id: string
  readonly name: string
  readonly scopes: readonly TokenScope[]
  readonly campaignId: string | null
  readonly createdAt: string
  readonly lastUsedAt: string | null
  readonly expiresAt: string | null
  readonly revokedAt: string | null
}

/** Answered once, at its making; afterwards only the hash is known. */
export interface NewTokenAnswer extends TokenSummary {
  readonly secret: string
}

/** An invitation to be passed on by hand: a one-time code, and the address that takes it. */
export interface Invitation {
  readonly userId: string
  readonly email: string
  readonly code: string
  readonly url: string
  readonly expiresAt: string
}
