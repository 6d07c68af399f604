import { type Actor, type CampaignRole, type TokenScope } from '../domain/role'
import { type RunState } from '../domain/run'

/** What a rule needs to know of a run. A run is frozen once a published edition holds it. */
export interface RunFacts {
  readonly campaignId: string
  readonly createdBy: string
  readonly state: RunState
  readonly isFrozen?: boolean
}

/** A token does no more than its scopes say; a person at a screen has none to keep to. `write` covers `intake`; reading needs `read`. */
function mayThroughToken(actor: Actor, scope: TokenScope): boolean {
  if (actor.tokenScopes === null) return true
  if (scope === 'intake') return actor.tokenScopes.includes('intake') || actor.tokenScopes.includes('write')
  return actor.tokenScopes.includes(scope)
}

/** A token bound to one campaign is blind to the others. */
function reaches(actor: Actor, campaignId: string): boolean {
  return actor.tokenCampaignId === null || actor.tokenCampaignId === campaignId
}

/** A bound token changes nothing that other campaigns share. */
function reachesHouse(actor: Actor): boolean {
  return actor.tokenCampaignId === null
}

/**
 * The part an actor plays in a campaign, or null for none. A person whose house role is guest stays a guest, whatever a
 * membership says; an admin has no part of their own unless a lead or an admin gave them one.
 */
function partIn(actor: Actor, campaignId: string): CampaignRole | null {
  if (!reaches(actor, campaignId) || !Object.hasOwn(actor.memberships, campaignId)) return null
  const part = actor.memberships[campaignId] ?? null
  return part !== null && actor.role === 'guest' ? 'guest' : part
}

function isAdminFor(actor: Actor, campaignId: string): boolean {
  return actor.role === 'admin' && reaches(actor, campaignId)
}

/** Technician, researcher or lead of the campaign, or admin. */
function worksIn(actor: Actor, campaignId: string): boolean {
  const part = partIn(actor, campaignId)
  return (part !== null && part !== 'guest') || isAdminFor(actor, campaignId)
}

/** Researcher or lead of the campaign, or admin. */
function judgesIn(actor: Actor, campaignId: string): boolean {
  const part = partIn(actor, campaignId)
  return part === 'researcher' || part === 'lead' || isAdminFor(actor, campaignId)
}

function leads(actor: Actor, campaignId: string): boolean {
  return partIn(actor, campaignId) === 'lead'
}

/** Whoever works in the campaign while the run is open (shifts change), afterwards who may still edit it. */
function addsFiles(actor: Actor, run: RunFacts): boolean {
  return run.isFrozen !== true && ((run.state === 'open' && worksIn(actor, run.campaignId)) || editsRun(actor, run))
}

function editsRun(actor: Actor, run: RunFacts): boolean {
  if (run.isFrozen === true) return false
  const part = partIn(actor, run.campaignId)
  if (part === 'lead' || isAdminFor(actor, run.campaignId)) return true
  if (part === 'researcher') return run.state !== 'decided'
  return part === 'technician' && run.createdBy === actor.userId && run.state === 'open'
}

/**
 * Who may do what: one pure function an action, false unless a line of the table says otherwise. Rules say who, and in
 * which state where the table names one; that a run can be handed in only once is the business of the mutation.
 */
export const can = {
  /** know that the campaign exists: everybody who has a part in it, guests included */
  seeCampaign: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'read') && (partIn(actor, campaignId) !== null || isAdminFor(actor, campaignId)),
  /** ask which campaigns one has a part in */
  listCampaigns: (actor: Actor): boolean => mayThroughToken(actor, 'read'),
  /** read campaign, runs, ranking */
  readCampaign: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'read') && worksIn(actor, campaignId),
  /** read and download editions */
  readEditions: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'read') && (partIn(actor, campaignId) !== null || isAdminFor(actor, campaignId)),
  /** read what campaigns share: reactions, rigs, calibrations, column maps */
  readHouse: (actor: Actor): boolean => mayThroughToken(actor, 'read') && actor.role !== 'guest',

  addSample: (actor: Actor): boolean =>
    mayThroughToken(actor, 'intake') && reachesHouse(actor) && actor.role !== 'guest',
  /** what is written of a sample bears on results (density, pores): more than an instrument's token may do */
  editSample: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role !== 'guest',
  addSiteCount: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role !== 'guest',
  addLot: (actor: Actor): boolean => mayThroughToken(actor, 'intake') && reachesHouse(actor) && actor.role !== 'guest',
  /** put a sample that exists into a campaign */
  addSampleToCampaign: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'intake') && worksIn(actor, campaignId),
  addRun: (actor: Actor, campaignId: string): boolean => mayThroughToken(actor, 'intake') && worksIn(actor, campaignId),
  addLoading: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'intake') && worksIn(actor, campaignId),
  /** add files, answer what is asked of them and take their readings in */
  addFiles: (actor: Actor, run: RunFacts): boolean => mayThroughToken(actor, 'intake') && addsFiles(actor, run),
  /** set a file aside, or read anew what was confirmed or set aside: the run loses readings by it, so an instrument's token may not */
  changeFiles: (actor: Actor, run: RunFacts): boolean => mayThroughToken(actor, 'write') && addsFiles(actor, run),
  makeColumnMap: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role !== 'guest',
  makeCalibration: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role !== 'guest',

  /** technician: own, while open; researcher: until decided; lead and admin: until an edition holds it */
  editRun: (actor: Actor, run: RunFacts): boolean => mayThroughToken(actor, 'write') && editsRun(actor, run),
  /** technician: own; researcher, lead, admin: any */
  handIn: (actor: Actor, run: RunFacts): boolean =>
    mayThroughToken(actor, 'intake') &&
    run.isFrozen !== true &&
    (judgesIn(actor, run.campaignId) ||
      (partIn(actor, run.campaignId) === 'technician' && run.createdBy === actor.userId)),
  /** leave out a point, or move a window's edges, with a reason */
  leaveOut: (actor: Actor, run: RunFacts): boolean =>
    mayThroughToken(actor, 'write') && run.isFrozen !== true && judgesIn(actor, run.campaignId),
  remark: (actor: Actor, campaignId: string): boolean => mayThroughToken(actor, 'write') && judgesIn(actor, campaignId),

  /** decide on a run, and change that decision until an edition holds the run (pass the run to have that checked) */
  decide: (actor: Actor, campaignId: string, run?: RunFacts): boolean =>
    mayThroughToken(actor, 'write') && leads(actor, campaignId) && run?.isFrozen !== true,
  shortlist: (actor: Actor, campaignId: string): boolean => mayThroughToken(actor, 'write') && leads(actor, campaignId),
  setPriority: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'write') && leads(actor, campaignId),
  saveMethod: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'write') && leads(actor, campaignId),
  editCampaign: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'write') && leads(actor, campaignId),
  publish: (actor: Actor, campaignId: string): boolean => mayThroughToken(actor, 'write') && leads(actor, campaignId),
  manageMembers: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'write') && (leads(actor, campaignId) || isAdminFor(actor, campaignId)),
  readHistory: (actor: Actor, campaignId: string): boolean =>
    mayThroughToken(actor, 'read') && (leads(actor, campaignId) || isAdminFor(actor, campaignId)),

  /** start a campaign: whoever leads in the house becomes its lead; an admin starts one for others */
  makeCampaign: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && (actor.role === 'lead' || actor.role === 'admin'),
  makeReaction: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') &&
    reachesHouse(actor) &&
    (actor.role === 'researcher' || actor.role === 'lead' || actor.role === 'admin'),

  manageRigs: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role === 'admin',
  /** people, house roles, their sessions and invitations */
  manageUsers: (actor: Actor): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role === 'admin',
  manageTokensOf: (actor: Actor, userId: string): boolean =>
    mayThroughToken(actor, 'write') && reachesHouse(actor) && (actor.userId === userId || actor.role === 'admin'),
  backUp: (actor: Actor): boolean => mayThroughToken(actor, 'write') && reachesHouse(actor) && actor.role === 'admin',
  /** names of people, to choose members from */
  listPeople: (actor: Actor): boolean =>
    mayThroughToken(actor, 'read') &&
    reachesHouse(actor) &&
    (actor.role === 'admin' || Object.keys(actor.memberships).some((campaignId) => leads(actor, campaignId))),
} as const
