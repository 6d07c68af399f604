import 'server-only'
import { createHash, randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertEdition, withdrawEditionRow } from '../../db/mutations/editions'
import {
  hasChangedSince,
  selectDecisionReasons,
  selectEdition,
  selectEditions,
  selectHistoryHead,
  selectLastEditionNumber,
} from '../../db/queries/editions'
import { selectCampaign } from '../../db/queries/campaigns'
import { selectAccount } from '../../db/queries/people'
import { verifyPassword } from '../auth/password'
import { takeFromBudget } from '../auth/rate-limit'
import { canonicalJson } from '../domain/canonical-json'
import {
  type Edition,
  type EditionContent,
  type EditionProposal,
  type EditionRun,
  type EditionSummary,
  type Publication,
} from '../domain/edition'
import { AppError } from '../domain/errors'
import { type Ranking } from '../domain/ranking'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { visibleCampaigns } from '../policy/campaign-scope'
import { authorise, hideUnless } from './authorise'
import { holdOpenCampaign } from './campaign-rights'
import { getCampaign } from './campaigns'
import { engineId } from './engine-id'
import { rankCampaign } from './results'
import { listUploads } from './uploads'

const PUBLISHERS = 'Editions are published and withdrawn by a lead of the campaign.'

/** The hash that an edition is published under: of its canonical text, not of any file made of it. */
export function contentHash(content: EditionContent): string {
  return createHash('sha256').update(canonicalJson(content)).digest('hex')
}

/** Who is not in the campaign is told that there is nothing; a guest of it reads its editions and nothing else. */
function authoriseReading(actor: Actor, campaignId: string): void {
  hideUnless(can.readEditions(actor, campaignId))
}

function authorisePublishing(actor: Actor, campaignId: string): void {
  hideUnless(can.seeCampaign(actor, campaignId) || can.publish(actor, campaignId))
  hideUnless(can.readCampaign(actor, campaignId) || can.publish(actor, campaignId))
  authorise(can.publish(actor, campaignId), PUBLISHERS)
  authorise(actor.tokenScopes === null, 'An edition is signed by a person at a screen, not with a token.')
}

/** Editions of one campaign, newest first; of all campaigns the actor has a part in where none is named. */
export async function listEditions(
  actor: Actor,
  campaignId: string | null = null,
): Promise<(EditionSummary & { readonly campaignCode: string; readonly campaignName: string })[]> {
  const db = await getDatabase()
  if (campaignId !== null) {
    authoriseReading(actor, campaignId)
    hideUnless((await selectCampaign(db, visibleCampaigns(actor), campaignId)) !== null)
  }
  return selectEditions(db, visibleCampaigns(actor), campaignId)
}

/** One edition as it was published, and whether its content still has the hash that it was published under. */
export async function getEdition(actor: Actor, campaignId: string, number: number): Promise<Edition> {
  authoriseReading(actor, campaignId)
  const found = await selectEdition(await getDatabase(), [campaignId], campaignId, number)
  hideUnless(found !== null)
  // written by publish() below from the same type; triggers refuse any change of it, and the hash would show one
  const content = found.content as EditionContent
  return { ...found.summary, content, isIntact: contentHash(content) === found.summary.contentSha256 }
}

/** An edition's table as the exports write it. */
export function rankingOfEdition(edition: Edition): Ranking {
  return { ...edition.content.ranking, computedAt: edition.publishedAt }
}

interface Prepared {
  readonly content: EditionContent
  readonly methodId: string
  readonly proposal: EditionProposal
}

async function prepare(actor: Actor, campaignId: string): Promise<Prepared> {
  const campaign = await getCampaign(actor, campaignId)
  const { ranking, method, runs } = await rankCampaign(actor, campaignId, { includeProvisional: false })
  const { computedAt: _, ...frozen } = ranking
  const included = frozen.rows.flatMap((row) =>
    row.runs
      .filter((run) => run.isIncluded && run.decision !== null)
      .map((run) => ({ ...run, sampleCode: row.sampleCode })),
  )
  const db = await getDatabase()
  const reasons = await selectDecisionReasons(
    db,
    included.map(({ runId }) => runId),
  )
  const editionRuns: EditionRun[] = []
  for (const { runId, code, decision, sampleCode } of included) {
    const uploads = await listUploads(actor, runId)
    const key = runs.find((entry) => entry.run.runId === runId)?.key ?? null
    if (key === null || decision === null) throw new Error(`${code} is in the ranking without a result`)
    editionRuns.push({
      runId,
      runCode: code,
      sampleCode,
      reductionKey: key,
      decision,
      decisionReason: reasons.get(runId) ?? '',
      files: uploads
        .filter((upload) => upload.state === 'confirmed')
        .map(({ fileName, sha256, byteCount }) => ({ fileName, sha256, byteCount })),
    })
  }
  const content: EditionContent = {
    format: 1,
    laboratory: campaign.laboratory,
    methodSettings: method.settings,
    ranking: frozen,
    runs: editionRuns,
  }
  const ranked = frozen.rows.filter((row) => row.rank !== null).length
  return {
    content,
    methodId: method.id,
    proposal: {
      number: (await selectLastEditionNumber(db, campaignId)) + 1,
      contentSha256: contentHash(content),
      ranking: frozen,
      runs: editionRuns,
      leftOut: frozen.rows.flatMap((row) =>
        row.runs
          .filter((run) => !run.isIncluded)
          .map((run) => ({ runCode: run.code, sampleCode: row.sampleCode, reason: run.reason })),
      ),
      refusal:
        campaign.closedAt !== null
          ? 'The campaign is closed. Open it again to publish an edition.'
          : ranked === 0
            ? 'No sample can be ranked from decided runs yet. Decide on the runs first; an undecided run is in no edition.'
            : '',
    },
  }
}

/** What a publication would freeze now. */
export async function proposeEdition(actor: Actor, campaignId: string): Promise<EditionProposal> {
  authorisePublishing(actor, campaignId)
  return (await prepare(actor, campaignId)).proposal
}

/**
 * Publishes what the lead looked at: the password signs it, the statement says what the signature means. Content, runs and entry are kept together; if
 * anything of the campaign, or of what it shares, moved since the proposal was made, nothing is.
 */
export async function publishEdition(
  actor: Actor,
  campaignId: string,
  input: Publication,
  now = new Date(),
): Promise<Edition> {
  authorisePublishing(actor, campaignId)
  await takeFromBudget('sign-in-device', `sign ${actor.userId}`)
  const db = await getDatabase()
  const account = await selectAccount(db, actor.userId)
  hideUnless(account !== null)
  if (!(await verifyPassword(input.password, account.passwordHash === '' ? null : account.passwordHash)))
    throw new AppError('unprocessable', 'The password is not right. Nothing was published.', {
      issues: [{ field: 'password', message: 'The password is not right.' }],
    })
  const head = await selectHistoryHead(db)
  const { content, methodId, proposal } = await prepare(actor, campaignId)
  if (proposal.refusal !== '') throw new AppError('conflict', proposal.refusal)
  const moved = new AppError(
    'stale',
    'Something in the campaign changed since you looked at the proposal. Look at it again; nothing was published.',
  )
  if (proposal.contentSha256 !== input.contentSha256) throw moved
  await db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    if (await hasChangedSince(tx, campaignId, head)) throw moved
    const id = randomUUID()
    await insertEdition(
      tx,
      {
        id,
        campaignId,
        number: proposal.number,
        methodId,
        engineId: engineId(),
        content,
        contentSha256: proposal.contentSha256,
        statement: input.statement,
        publishedBy: actor.userId,
        publishedAt: now,
      },
      proposal.runs,
    )
    await insertAuditEntry(tx, {
      actor,
      action: 'edition.publish',
      entity: 'edition',
      entityId: id,
      campaignId,
      after: {
        number: proposal.number,
        contentSha256: proposal.contentSha256,
        methodNumber: content.ranking.methodNumber,
        runs: proposal.runs.map(({ runCode }) => runCode),
      },
      reason: input.statement,
    })
  })
  return getEdition(actor, campaignId, proposal.number)
}

/** Withdraws an edition, with a reason that stands beside it from then on. It is never deleted; the runs it held can be worked on again. */
export async function withdrawEdition(
  actor: Actor,
  campaignId: string,
  number: number,
  reason: string,
  now = new Date(),
): Promise<Edition> {
  authorisePublishing(actor, campaignId)
  const edition = await getEdition(actor, campaignId, number)
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    if (!(await withdrawEditionRow(tx, edition.id, { by: actor.userId, at: now, reason })))
      throw new AppError('conflict', `Edition ${number} was withdrawn already.`)
    await insertAuditEntry(tx, {
      actor,
      action: 'edition.withdraw',
      entity: 'edition',
      entityId: edition.id,
      campaignId,
      before: { withdrawnAt: null },
      after: { withdrawnAt: now.toISOString() },
      reason,
    })
  })
  return getEdition(actor, campaignId, number)
}
