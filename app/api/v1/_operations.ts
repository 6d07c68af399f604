import { z } from 'zod'
import { draftNameSchema } from '@/lib/access/drafts'
import { preferenceNameSchema } from '@/lib/access/preferences'
import { newCalibrationSchema, calibrationChangeSchema } from '@/lib/domain/calibration'
import { campaignChangeSchema, newCampaignSchema, newMemberSchema } from '@/lib/domain/campaign'
import { newColumnMapSchema } from '@/lib/domain/column-map'
import { editionWithdrawalSchema, publicationSchema } from '@/lib/domain/edition'
import { newMethodSchema } from '@/lib/domain/method'
import { newPersonSchema, tokenRequestSchema } from '@/lib/domain/person'
import { newReactionSchema, reactionChangeSchema } from '@/lib/domain/reaction'
import { newRigSchema, rigChangeSchema } from '@/lib/domain/rig'
import { type TokenScope } from '@/lib/domain/role'
import {
  decisionSchema,
  exclusionSchema,
  holdEditSchema,
  loadingChangeSchema,
  newRunSchema,
  remarkSchema,
  runChangeSchema,
  withdrawalSchema,
} from '@/lib/domain/run'
import { newLotSchema, newSampleSchema, newSiteCountSchema, sampleChangeSchema } from '@/lib/domain/sample'
import {
  addedUploadRecord,
  editionProposalRecord,
  editionRecord,
  listedEditionRecord,
  previewRecord,
  rankingRecord,
  runPointsRecord,
  runResultRecord,
  uploadRecord,
} from './_computed-records'
import {
  calibrationListQuery,
  campaignListQuery,
  columnMapListQuery,
  lastRunQuery,
  loadingListQuery,
  plainListQuery,
  runListQuery,
} from './_queries'
import { rankingRequestSchema } from './_ranking-request'
import {
  calibrationRecord,
  campaignRecord,
  campaignSampleRecord,
  columnMapRecord,
  decisionRecord,
  draftRecord,
  exclusionRecord,
  historyRecord,
  holdEditRecord,
  invitationRecord,
  listed,
  loadingRecord,
  lotRecord,
  meRecord,
  memberRecord,
  methodRecord,
  newTokenRecord,
  personRecord,
  reactionRecord,
  remarkRecord,
  rigRecord,
  runRecord,
  runSummaryRecord,
  sampleRecord,
  siteCountRecord,
  tokenRecord,
} from './_records'
import {
  calibrationFilesQuery,
  campaignSampleChangeRequest,
  campaignSampleRequest,
  draftRequest,
  memberChangeRequest,
  personChangeRequest,
  preferenceRequest,
  setAsideRequest,
  tokenListQuery,
  uploadCorrectionRequest,
} from './_requests'

export interface Operation {
  readonly method: 'get' | 'post' | 'patch' | 'put' | 'delete'
  /** with `{name}` for the parts that are ids, or what `parts` says of them */
  readonly path: string
  readonly parts?: Readonly<Record<string, z.ZodType>>
  readonly summary: string
  /** what a token must be allowed, or `any` where all may; null for what needs no sign-in */
  readonly scope: TokenScope | 'any' | null
  readonly query?: z.ZodType
  readonly body?: z.ZodType
  /** other than JSON: files, in a form or one as the body itself */
  readonly bodyType?: 'files'
  readonly answer?: z.ZodType
  readonly answerType?: string
  readonly status?: number
  /** a second status of success, with the same answer */
  readonly otherStatus?: number
  /** for a person at a screen: no token may, whatever its scopes */
  readonly isForPersons?: boolean
  /** the edit names the version it was made from in If-Match */
  readonly isVersioned?: boolean
  /** statuses of refusals beyond those that follow from the rest (see `refusalsOf`) */
  readonly refusals?: readonly number[]
}

/** Statuses an operation may be refused with, each once and in order; what fails in the house itself (500, 503) may come from any. */
export function refusalsOf(operation: Operation): number[] {
  const { method, scope, path, parts, query, body, bodyType, isVersioned } = operation
  const isChange = method !== 'get'
  const hasInput = query !== undefined || body !== undefined || bodyType !== undefined || parts !== undefined
  const sends = body !== undefined || bodyType !== undefined
  // what a person keeps for themselves is put, whatever was there
  const isRecorded = sends && method !== 'put' && scope !== null
  return [
    ...new Set([
      ...(hasInput ? [400] : []),
      ...(scope === null ? [] : [401]),
      // a session's change is refused when another site sent it, whatever its scope
      ...(scope === null || (scope === 'any' && !isChange) ? [] : [403]),
      ...(path.includes('{') && parts === undefined ? [404] : []),
      ...(isRecorded ? [409, 422] : []),
      ...(sends ? [413, 415] : []),
      ...(isVersioned === true ? [412, 428] : []),
      ...(bodyType === undefined ? [] : [503, 507]),
      ...(operation.refusals ?? []),
    ]),
  ].sort((a, b) => a - b)
}

const items = <T extends z.ZodType>(row: T) => z.strictObject({ items: z.array(row) })
type More = Partial<Omit<Operation, 'method' | 'path' | 'summary' | 'scope'>>
const get = (path: string, summary: string, more: More = {}): Operation => ({
  method: 'get',
  path,
  summary,
  scope: 'read',
  ...more,
})
const post = (path: string, summary: string, more: More & Partial<Pick<Operation, 'scope'>> = {}): Operation => ({
  method: 'post',
  path,
  summary,
  scope: 'write',
  status: 201,
  ...more,
})
const patch = (path: string, summary: string, more: More = {}): Operation => ({
  method: 'patch',
  path,
  summary,
  scope: 'write',
  isVersioned: true,
  ...more,
})

/** What a person at a screen keeps for themselves. */
const ofPerson = (method: Operation['method'], path: string, summary: string, more: More): Operation => ({
  method,
  path,
  summary,
  scope: method === 'get' ? 'read' : 'write',
  isForPersons: true,
  ...more,
})

/** A list with its creation, and one of it with its edit: the shape most records share. */
function records(
  path: string,
  id: string,
  name: string,
  schemas: {
    readonly query: z.ZodType
    readonly row: z.ZodType
    readonly one: z.ZodType
    readonly create: z.ZodType
    readonly edit: z.ZodType
  },
  /** of listing them and of making one, where it is not the usual */
  more: { readonly listing?: More; readonly making?: Partial<Pick<Operation, 'scope' | 'refusals'>> } = {},
): Operation[] {
  return [
    get(`/${path}`, `List ${name}s`, { query: schemas.query, answer: listed(schemas.row), ...more.listing }),
    post(`/${path}`, `Make a ${name}`, { body: schemas.create, answer: schemas.one, ...more.making }),
    get(`/${path}/{${id}}`, `Read a ${name}`, { answer: schemas.one }),
    patch(`/${path}/{${id}}`, `Change a ${name}`, { body: schemas.edit, answer: schemas.one }),
  ]
}

/** Every operation of the API. A test holds this list against the handlers on disk, both ways. */
export const operations: readonly Operation[] = [
  { ...get('/openapi.json', 'This description', { answer: z.looseObject({ openapi: z.string() }) }), scope: null },
  { ...get('/me', 'Who the caller is, with their parts in campaigns', { answer: meRecord }), scope: 'any' },
  {
    ...get('/tokens', 'List tokens, without their secrets', {
      query: tokenListQuery,
      answer: z.strictObject({ tokens: z.array(tokenRecord) }),
    }),
    scope: 'write',
  },
  post('/tokens', 'A token for e-mail address and password; its secret is in this answer only', {
    body: tokenRequestSchema,
    answer: newTokenRecord,
    scope: null,
    refusals: [401, 404, 409, 413, 415, 429, 503],
  }),
  {
    method: 'delete',
    path: '/tokens/{tokenId}',
    summary: 'Revoke a token; one may always revoke itself, others need the scope write',
    scope: 'any',
    status: 204,
  },
  {
    ...get('/people', 'List people, for admins', { answer: z.strictObject({ people: z.array(personRecord) }) }),
    scope: 'write',
  },
  post('/people', 'Make a person and the invitation that lets them choose a password', {
    body: newPersonSchema,
    answer: invitationRecord,
  }),
  { ...get('/people/{userId}', 'Read a person, for admins', { answer: personRecord }), scope: 'write' },
  patch('/people/{userId}', 'Change role, or close and open the account', {
    body: personChangeRequest,
    answer: personRecord,
  }),
  post('/people/{userId}/invitations', 'A new invitation; older ones are worthless from then on', {
    answer: invitationRecord,
  }),
  {
    method: 'delete',
    path: '/people/{userId}/sessions',
    summary: 'End all sessions of a person',
    scope: 'write',
    answer: z.strictObject({ ended: z.int().gte(0) }),
  },
  ofPerson('get', '/drafts/{form}', 'What was typed into a form and not sent yet', {
    parts: { form: draftNameSchema },
    answer: z.strictObject({ draft: draftRecord.nullable() }),
  }),
  ofPerson('put', '/drafts/{form}', 'Keep what is typed', {
    parts: { form: draftNameSchema },
    body: draftRequest,
    answer: z.strictObject({ draft: draftRecord }),
  }),
  ofPerson('delete', '/drafts/{form}', 'Forget what was typed', { parts: { form: draftNameSchema }, status: 204 }),
  ofPerson('get', '/preferences/{key}', 'A preference of the caller, such as the columns of a grid', {
    parts: { key: preferenceNameSchema },
    answer: z.strictObject({ content: z.unknown() }),
  }),
  ofPerson('put', '/preferences/{key}', 'Keep a preference', {
    parts: { key: preferenceNameSchema },
    body: preferenceRequest,
    status: 204,
  }),

  ...records('reactions', 'reactionId', 'reaction', {
    query: plainListQuery,
    row: reactionRecord,
    one: reactionRecord,
    create: newReactionSchema,
    edit: reactionChangeSchema,
  }),
  ...records('rigs', 'rigId', 'rig', {
    query: plainListQuery,
    row: rigRecord,
    one: rigRecord,
    create: newRigSchema,
    edit: rigChangeSchema,
  }),
  get('/rigs/{rigId}/last-run', 'The run that started last on the rig', {
    query: lastRunQuery,
    answer: z.strictObject({ run: runRecord.nullable() }),
  }),
  ...records('calibrations', 'calibrationId', 'calibration', {
    query: calibrationListQuery,
    row: calibrationRecord,
    one: calibrationRecord,
    create: newCalibrationSchema,
    edit: calibrationChangeSchema,
  }),
  post('/calibrations/files', 'Calibrations from dropped tables of response factors', {
    query: calibrationFilesQuery,
    bodyType: 'files',
    answer: items(calibrationRecord),
  }),
  get('/column-maps', 'List column maps', { query: columnMapListQuery, answer: listed(columnMapRecord) }),
  post('/column-maps', 'Keep the next version of a column map', { body: newColumnMapSchema, answer: columnMapRecord }),
  get('/column-maps/{columnMapId}', 'Read a column map', { answer: columnMapRecord }),

  ...records(
    'samples',
    'sampleId',
    'sample',
    { query: plainListQuery, row: sampleRecord, one: sampleRecord, create: newSampleSchema, edit: sampleChangeSchema },
    { making: { scope: 'intake', refusals: [404] } },
  ),
  get('/samples/{sampleId}/lots', 'Lots of a sample', { answer: items(lotRecord) }),
  post('/samples/{sampleId}/lots', 'Add a lot', { body: newLotSchema, answer: lotRecord, scope: 'intake' }),
  get('/samples/{sampleId}/site-counts', 'Site counts of a sample', { answer: items(siteCountRecord) }),
  post('/samples/{sampleId}/site-counts', 'Add a site count; results that rest on it follow', {
    body: newSiteCountSchema,
    answer: siteCountRecord,
  }),
  get('/loadings', 'List packed beds', { query: loadingListQuery, answer: listed(loadingRecord) }),
  get('/loadings/{loadingId}', 'Read a packed bed', { answer: loadingRecord }),
  patch('/loadings/{loadingId}', 'Change what was written of a packed bed', {
    body: loadingChangeSchema,
    answer: loadingRecord,
  }),

  ...records('campaigns', 'campaignId', 'campaign', {
    query: campaignListQuery,
    row: campaignRecord,
    one: campaignRecord,
    create: newCampaignSchema,
    edit: campaignChangeSchema,
  }),
  post('/campaigns/{campaignId}/close', 'End the work in a campaign', {
    body: withdrawalSchema,
    answer: campaignRecord,
    status: 200,
    isVersioned: true,
  }),
  post('/campaigns/{campaignId}/reopen', 'Open a closed campaign again', {
    body: withdrawalSchema,
    answer: campaignRecord,
    status: 200,
    isVersioned: true,
  }),
  get('/campaigns/{campaignId}/members', 'People of a campaign', { answer: items(memberRecord) }),
  post('/campaigns/{campaignId}/members', 'Give somebody a part in the campaign', {
    body: newMemberSchema,
    answer: memberRecord,
  }),
  {
    ...patch('/campaigns/{campaignId}/members/{userId}', 'Give somebody another role', {
      body: memberChangeRequest,
      answer: memberRecord,
    }),
    isVersioned: false,
  },
  {
    method: 'delete',
    path: '/campaigns/{campaignId}/members/{userId}',
    summary: 'End somebody’s part',
    scope: 'write',
    status: 204,
    refusals: [409],
  },
  get('/campaigns/{campaignId}/methods', 'Versions of the method, newest first', { answer: items(methodRecord) }),
  post('/campaigns/{campaignId}/methods', 'Save the next version of the method', {
    body: newMethodSchema,
    answer: methodRecord,
  }),
  get('/campaigns/{campaignId}/samples', 'Samples of a campaign', {
    query: plainListQuery,
    answer: listed(campaignSampleRecord),
  }),
  post('/campaigns/{campaignId}/samples', 'Put a sample into a campaign', {
    body: campaignSampleRequest,
    answer: campaignSampleRecord,
    scope: 'intake',
  }),
  get('/campaigns/{campaignId}/samples/{sampleId}', 'A sample as the campaign holds it', {
    answer: campaignSampleRecord,
  }),
  patch('/campaigns/{campaignId}/samples/{sampleId}', 'Write remark, shortlist or priority', {
    body: campaignSampleChangeRequest,
    answer: campaignSampleRecord,
  }),
  get('/campaigns/{campaignId}/history', 'Who changed what', { query: plainListQuery, answer: listed(historyRecord) }),
  get('/campaigns/{campaignId}/ranking', 'The live ranking', {
    query: rankingRequestSchema,
    answer: rankingRecord,
  }),
  get('/campaigns/{campaignId}/ranking.csv', 'The ranking as text', {
    query: rankingRequestSchema,
    answerType: 'text/csv',
  }),
  get('/campaigns/{campaignId}/ranking.xlsx', 'The ranking as a workbook', {
    query: rankingRequestSchema,
    answerType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  }),

  get('/campaigns/{campaignId}/editions', 'Published editions, newest first', { answer: items(listedEditionRecord) }),
  ofPerson('post', '/campaigns/{campaignId}/editions', 'Publish what the proposal showed, signed by a lead', {
    body: publicationSchema,
    answer: editionRecord,
    status: 201,
    refusals: [412, 429, 503],
  }),
  ofPerson('get', '/campaigns/{campaignId}/editions/proposal', 'What a publication would freeze now', {
    answer: editionProposalRecord,
  }),
  get('/campaigns/{campaignId}/editions/{number}', 'An edition as it was published', { answer: editionRecord }),
  get('/campaigns/{campaignId}/editions/{number}/ranking.csv', 'The table of an edition as text', {
    answerType: 'text/csv',
  }),
  get('/campaigns/{campaignId}/editions/{number}/ranking.xlsx', 'The table of an edition as a workbook', {
    answerType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  }),
  ofPerson('post', '/campaigns/{campaignId}/editions/{number}/withdrawal', 'Withdraw an edition, with a reason', {
    body: editionWithdrawalSchema,
    answer: editionRecord,
  }),

  ...records(
    'runs',
    'runId',
    'run',
    { query: runListQuery, row: runSummaryRecord, one: runRecord, create: newRunSchema, edit: runChangeSchema },
    { listing: { refusals: [404] }, making: { scope: 'intake', refusals: [404] } },
  ),
  post('/runs/{runId}/hand-in', 'Hand the run in', {
    answer: runRecord,
    status: 200,
    isVersioned: true,
    scope: 'intake',
    refusals: [409],
  }),
  get('/runs/{runId}/decision', 'Decisions on the run', { answer: items(decisionRecord) }),
  post('/runs/{runId}/decision', 'Decide on the run', {
    body: decisionSchema,
    answer: runRecord,
    status: 200,
    isVersioned: true,
  }),
  get('/runs/{runId}/exclusions', 'Holds and injections left out', { answer: items(exclusionRecord) }),
  post('/runs/{runId}/exclusions', 'Leave a hold or an injection out, with a reason', {
    body: exclusionSchema,
    answer: exclusionRecord,
  }),
  post('/runs/{runId}/exclusions/{exclusionId}/withdrawal', 'Put it back', {
    body: withdrawalSchema,
    answer: exclusionRecord,
    status: 200,
  }),
  get('/runs/{runId}/hold-edits', 'Windows moved by a person', { answer: items(holdEditRecord) }),
  post('/runs/{runId}/hold-edits', 'Move the window of a hold, with a reason', {
    body: holdEditSchema,
    answer: holdEditRecord,
  }),
  post('/runs/{runId}/hold-edits/{holdEditId}/withdrawal', 'Give the window back to the rule', {
    body: withdrawalSchema,
    answer: holdEditRecord,
    status: 200,
  }),
  get('/runs/{runId}/remarks', 'Remarks on the run', { answer: items(remarkRecord) }),
  post('/runs/{runId}/remarks', 'Remark on the run', { body: remarkSchema, answer: remarkRecord }),
  get('/runs/{runId}/result', 'The run with its files, trace, points and line', { answer: runResultRecord }),
  get('/runs/{runId}/points', 'The points of the run and its line', { answer: runPointsRecord }),
  get('/runs/{runId}/uploads', 'Files of the run', { answer: items(uploadRecord) }),
  post('/runs/{runId}/uploads', 'Add files; bytes that are there already are answered with 200', {
    bodyType: 'files',
    answer: items(addedUploadRecord),
    otherStatus: 200,
    scope: 'intake',
  }),
  get('/uploads/{uploadId}', 'A file with what was detected and what is still open', { answer: uploadRecord }),
  {
    ...patch(
      '/uploads/{uploadId}',
      'Answer what is asked, correct what the columns mean; of a confirmed file or one set aside it needs the scope write',
      {
        body: uploadCorrectionRequest,
        answer: uploadRecord,
      },
    ),
    scope: 'intake',
  },
  {
    ...get('/uploads/{uploadId}/preview', 'What a confirmation would take in', {
      answer: previewRecord,
      refusals: [422, 503],
    }),
    scope: 'intake',
  },
  post('/uploads/{uploadId}/confirm', 'Take the readings in; again, or of a file set aside, it needs the scope write', {
    answer: uploadRecord,
    status: 200,
    isVersioned: true,
    scope: 'intake',
    refusals: [409, 422, 503],
  }),
  post('/uploads/{uploadId}/set-aside', 'Put a file aside', {
    body: setAsideRequest,
    answer: uploadRecord,
    status: 200,
    isVersioned: true,
  }),
  get('/uploads/{uploadId}/content', 'The bytes as they were handed in', { answerType: 'application/octet-stream' }),
]
