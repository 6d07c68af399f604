import { z } from 'zod'

/** The five roles. Admin is about the house (people, rigs, backup); the other four are about the work. */
export const roles = ['technician', 'researcher', 'lead', 'guest', 'admin'] as const
export const roleSchema = z.enum(roles)
export type Role = z.infer<typeof roleSchema>

/** What somebody is in one campaign. */
export const campaignRoles = ['technician', 'researcher', 'lead', 'guest'] as const
export const campaignRoleSchema = z.enum(campaignRoles)
export type CampaignRole = z.infer<typeof campaignRoleSchema>

/** What an API token may do; a token never exceeds its owner. */
export const tokenScopes = ['read', 'intake', 'write'] as const
export const tokenScopeSchema = z.enum(tokenScopes)
export type TokenScope = z.infer<typeof tokenScopeSchema>

/** Who acts: read afresh from the database on every request, and passed on to every access function as a plain object. */
export interface Actor {
  readonly userId: string
  readonly displayName: string
  readonly email: string
  readonly role: Role
  /** campaign id → role there */
  readonly memberships: Readonly<Record<string, CampaignRole>>
  /** null for a person at a screen; the token's scopes for a script */
  readonly tokenScopes: readonly TokenScope[] | null
  /** a token may be bound to one campaign */
  readonly tokenCampaignId: string | null
  /** session or token reference for the audit trail, never the secret */
  readonly sessionRef: string
  /** seconds since the password was last given in this session; null for tokens */
  readonly secondsSinceSignIn: number | null
}
