import { and, eq, sql } from 'drizzle-orm'
import { type CampaignChange, type NewCampaign, type NewMember } from '@/lib/domain/campaign'
import { type MethodSettings } from '@/lib/domain/method'
import { type Transaction } from '../executor'
import { campaigns, campaignSamples, members, methods } from '../schema'
import { inScope, type Scope } from '../scope'

export async function insertCampaign(
  tx: Transaction,
  campaign: NewCampaign & { readonly id: string; readonly createdBy: string },
): Promise<void> {
  await tx.insert(campaigns).values({
    id: campaign.id,
    code: campaign.code,
    name: campaign.name,
    laboratory: campaign.laboratory,
    description: campaign.description,
    reactionId: campaign.reactionId,
    referenceSampleId: campaign.referenceSampleId,
    createdBy: campaign.createdBy,
  })
}

/** False where the campaign is out of scope or has another version by now. */
export async function updateCampaign(
  tx: Transaction,
  scope: Scope,
  id: string,
  version: number,
  change: CampaignChange & { readonly closedAt?: Date | null },
): Promise<boolean> {
  const rows = await tx
    .update(campaigns)
    .set({
      name: change.name,
      laboratory: change.laboratory,
      description: change.description,
      referenceSampleId: change.referenceSampleId,
      closedAt: change.closedAt,
      version: sql`${campaigns.version} + 1`,
    })
    .where(and(inScope(campaigns.id, scope), eq(campaigns.id, id), eq(campaigns.version, version)))
    .returning({ id: campaigns.id })
  return rows.length > 0
}

export async function insertMember(tx: Transaction, campaignId: string, member: NewMember): Promise<void> {
  await tx.insert(members).values({ campaignId, userId: member.userId, role: member.role })
}

export async function updateMember(
  tx: Transaction,
  scope: Scope,
  campaignId: string,
  member: NewMember,
): Promise<boolean> {
  const rows = await tx
    .update(members)
    .set({ role: member.role })
    .where(
      and(inScope(members.campaignId, scope), eq(members.campaignId, campaignId), eq(members.userId, member.userId)),
    )
    .returning({ userId: members.userId })
  return rows.length > 0
}

export async function deleteMember(
  tx: Transaction,
  scope: Scope,
  campaignId: string,
  userId: string,
): Promise<boolean> {
  const rows = await tx
    .delete(members)
    .where(and(inScope(members.campaignId, scope), eq(members.campaignId, campaignId), eq(members.userId, userId)))
    .returning({ userId: members.userId })
  return rows.length > 0
}

export async function insertMethod(
  tx: Transaction,
  method: {
    readonly id: string
    readonly campaignId: string
    readonly number: number
    readonly settings: MethodSettings
    readonly reason: string
    readonly createdBy: string
  },
): Promise<void> {
  await tx.insert(methods).values({
    id: method.id,
    campaignId: method.campaignId,
    number: method.number,
    settings: method.settings,
    reason: method.reason,
    createdBy: method.createdBy,
  })
}

export async function insertCampaignSample(tx: Transaction, campaignId: string, sampleId: string): Promise<void> {
  await tx.insert(campaignSamples).values({ campaignId, sampleId })
}

export async function updateCampaignSample(
  tx: Transaction,
  scope: Scope,
  key: { readonly campaignId: string; readonly sampleId: string; readonly version: number },
  change: {
    readonly remark?: string | undefined
    readonly isShortlisted?: boolean | undefined
    readonly priority?: number | null | undefined
  },
): Promise<boolean> {
  const rows = await tx
    .update(campaignSamples)
    .set({
      remark: change.remark,
      isShortlisted: change.isShortlisted === undefined ? undefined : Number(change.isShortlisted),
      priority: change.priority,
      version: sql`${campaignSamples.version} + 1`,
    })
    .where(
      and(
        inScope(campaignSamples.campaignId, scope),
        eq(campaignSamples.campaignId, key.campaignId),
        eq(campaignSamples.sampleId, key.sampleId),
        eq(campaignSamples.version, key.version),
      ),
    )
    .returning({ version: campaignSamples.version })
  return rows.length > 0
}
