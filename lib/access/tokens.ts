import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertToken, revokeToken as revokeTokenRow } from '../../db/mutations/people'
import { selectMemberships, selectTokenOwner, selectTokens } from '../../db/queries/people'
import { makeApiToken } from '../auth/api-token'
import { AppError } from '../domain/errors'
import { type NewToken, type NewTokenAnswer, type TokenSummary } from '../domain/person'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { checkPassword, type Caller } from './sign-in'

const MAXIMUM_LIVE_TOKENS = 50

type TokenRow = Awaited<ReturnType<typeof selectTokens>>[number]

function summaryOf(row: TokenRow): TokenSummary {
  return {
    id: row.id,
    name: row.name,
    scopes: row.scopes,
    campaignId: row.campaignId,
    createdAt: row.createdAt.toISOString(),
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
    expiresAt: row.expiresAt?.toISOString() ?? null,
    revokedAt: row.revokedAt?.toISOString() ?? null,
  }
}

/** The tokens of a person: one's own, or anybody's for an admin. Never their secrets. */
export async function listTokens(actor: Actor, userId = actor.userId): Promise<TokenSummary[]> {
  authorise(
    can.manageTokensOf(actor, userId),
    'Tokens are managed by their owner or an admin, at a screen or with a token of scope write.',
  )
  return (await selectTokens(await getDatabase(), userId)).map(summaryOf)
}

/** Makes a token for the actor. The secret is in the answer and nowhere else afterwards. */
export async function createToken(actor: Actor, input: NewToken, now = new Date()): Promise<NewTokenAnswer> {
  // A token that could make tokens would outlive its own end.
  authorise(actor.tokenScopes === null, 'A token is made at a screen, or with e-mail address and password.')
  if (input.campaignId !== null) hideUnless(can.seeCampaign(actor, input.campaignId))
  const { secret, secretHash } = makeApiToken()
  const scopes = [...new Set(input.scopes)]
  const token = {
    id: randomUUID(),
    userId: actor.userId,
    name: input.name,
    secretHash,
    scopes,
    campaignId: input.campaignId,
    createdAt: now,
    expiresAt: new Date(now.getTime() + input.validDays * 86_400_000),
  }
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    const live = (await selectTokens(tx, actor.userId)).filter(
      (one) => one.revokedAt === null && (one.expiresAt === null || one.expiresAt > now),
    )
    if (live.length >= MAXIMUM_LIVE_TOKENS)
      throw new AppError(
        'conflict',
        `You have ${live.length} tokens that still work. Revoke one before you make another.`,
      )
    await insertToken(tx, token)
    await insertAuditEntry(tx, {
      actor,
      action: 'make-token',
      entity: 'token',
      entityId: token.id,
      after: { name: token.name, scopes, campaignId: token.campaignId, expiresAt: token.expiresAt.toISOString() },
    })
  })
  return { ...summaryOf({ ...token, lastUsedAt: null, revokedAt: null }), secret }
}

/** A token for a script that has no session: name and password in, one token out, under the limits of signing in. */
export async function createTokenWithPassword(
  credentials: { readonly email: string; readonly password: string },
  input: NewToken,
  caller: Caller,
  now = new Date(),
): Promise<NewTokenAnswer> {
  const account = await checkPassword(credentials, caller, now)
  const memberships = await selectMemberships(await getDatabase(), account.id)
  return createToken(
    {
      userId: account.id,
      displayName: account.displayName,
      email: account.email,
      role: account.role,
      memberships,
      tokenScopes: null,
      tokenCampaignId: null,
      sessionRef: 'password',
      secondsSinceSignIn: 0,
    },
    input,
    now,
  )
}

/** Makes a token worthless from now on. Doing it twice is no fault. */
export async function revokeToken(actor: Actor, tokenId: string, now = new Date()): Promise<void> {
  const db = await getDatabase()
  const owner = await selectTokenOwner(db, tokenId)
  // A token may always end itself; another's token is not there for somebody who may not manage it.
  const isItself = actor.sessionRef === `token:${tokenId}`
  hideUnless(owner !== null && (isItself || can.manageTokensOf(actor, owner)))
  await db.transaction(async (tx) => {
    if (!(await revokeTokenRow(tx, tokenId, now))) return
    await insertAuditEntry(tx, { actor, action: 'revoke-token', entity: 'token', entityId: tokenId })
  })
}
