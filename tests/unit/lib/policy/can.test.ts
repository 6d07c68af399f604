import { describe, expect, test } from 'vitest'
import { type Actor, type CampaignRole, type Role, type TokenScope } from '@/lib/domain/role'
import { can, type RunFacts } from '@/lib/policy/can'
import { readableCampaigns, visibleCampaigns } from '@/lib/policy/campaign-scope'

/*
 * The tables below were written by hand from the product's table "who may do what", not from the code: a rule that
 * changes has to be changed in both places. `y` allowed, `-` refused.
 */
const HERE = 'campaign-here'
const ELSEWHERE = 'campaign-elsewhere'

function person(
  role: Role,
  memberships: Record<string, CampaignRole> = {},
  token: { scopes: readonly TokenScope[]; campaignId?: string } | null = null,
): Actor {
  return {
    userId: 'me',
    displayName: 'Me',
    email: 'me@example.org',
    role,
    memberships,
    tokenScopes: token?.scopes ?? null,
    tokenCampaignId: token?.campaignId ?? null,
    sessionRef: 'session',
    secondsSinceSignIn: token === null ? 10 : null,
  }
}

const member = {
  technician: person('technician', { [HERE]: 'technician' }),
  researcher: person('researcher', { [HERE]: 'researcher' }),
  lead: person('lead', { [HERE]: 'lead' }),
  guest: person('guest', { [HERE]: 'guest' }),
  admin: person('admin'),
} as const
const stranger = {
  technician: person('technician', { [ELSEWHERE]: 'technician' }),
  researcher: person('researcher', { [ELSEWHERE]: 'researcher' }),
  lead: person('lead', { [ELSEWHERE]: 'lead' }),
  guest: person('guest', { [ELSEWHERE]: 'guest' }),
  nobody: person('researcher'),
} as const

/* Member of the campaign (admin: without being one). */
const campaignTable = `
  action               technician researcher lead guest admin
  seeCampaign          y          y          y    y     y
  readCampaign         y          y          y    -     y
  readEditions         y          y          y    y     y
  addSampleToCampaign  y          y          y    -     y
  addRun               y          y          y    -     y
  addLoading           y          y          y    -     y
  remark               -          y          y    -     y
  decide               -          -          y    -     -
  shortlist            -          -          y    -     -
  setPriority          -          -          y    -     -
  saveMethod           -          -          y    -     -
  editCampaign         -          -          y    -     -
  publish              -          -          y    -     -
  manageMembers        -          -          y    -     y
  readHistory          -          -          y    -     y
`

/* House-wide records: by house role alone. */
const houseTable = `
  action           technician researcher lead guest admin
  readHouse        y          y          y    -     y
  listCampaigns    y          y          y    y     y
  addSample        y          y          y    -     y
  addLot           y          y          y    -     y
  editSample       y          y          y    -     y
  addSiteCount     y          y          y    -     y
  makeColumnMap    y          y          y    -     y
  makeCalibration  y          y          y    -     y
  makeReaction     -          y          y    -     y
  makeCampaign     -          -          y    -     y
  manageRigs       -          -          -    -     y
  manageUsers      -          -          -    -     y
  backUp           -          -          -    -     y
  listPeople       -          -          y    -     y
`

/* A run: whose it is, and how far it has come. The last state is decided and held by an edition. */
const runTable = `
  action    whose   technician/open technician/handed-in technician/decided technician/frozen researcher/open researcher/handed-in researcher/decided researcher/frozen lead/open lead/handed-in lead/decided lead/frozen guest/open guest/handed-in guest/decided guest/frozen admin/open admin/handed-in admin/decided admin/frozen
  editRun   own     y - - -   y y - -   y y y -   - - - -   y y y -
  editRun   other   - - - -   y y - -   y y y -   - - - -   y y y -
  addFiles  own     y - - -   y y - -   y y y -   - - - -   y y y -
  addFiles  other   y - - -   y y - -   y y y -   - - - -   y y y -
  changeFiles own   y - - -   y y - -   y y y -   - - - -   y y y -
  changeFiles other y - - -   y y - -   y y y -   - - - -   y y y -
  handIn    own     y y y -   y y y -   y y y -   - - - -   y y y -
  handIn    other   - - - -   y y y -   y y y -   - - - -   y y y -
  leaveOut  own     - - - -   y y y -   y y y -   - - - -   y y y -
  leaveOut  other   - - - -   y y y -   y y y -   - - - -   y y y -
`

function parse(table: string): { header: string[]; rows: string[][] } {
  const [header = [], ...rows] = table
    .trim()
    .split('\n')
    .map((line) => line.trim().split(/\s+/))
  return { header, rows }
}

function runOf(whose: string, state: string, campaignId = HERE): RunFacts {
  return {
    campaignId,
    createdBy: whose === 'own' ? 'me' : 'somebody else',
    state: state === 'open' || state === 'handed-in' ? state : 'decided',
    isFrozen: state === 'frozen',
  }
}

function isKey<T extends object>(object: T, key: PropertyKey): key is keyof T {
  return Object.hasOwn(object, key)
}

const campaignRules: Record<string, (actor: Actor, campaignId: string) => boolean> = {
  seeCampaign: can.seeCampaign,
  readCampaign: can.readCampaign,
  readEditions: can.readEditions,
  addSampleToCampaign: can.addSampleToCampaign,
  addRun: can.addRun,
  addLoading: can.addLoading,
  remark: can.remark,
  decide: can.decide,
  shortlist: can.shortlist,
  setPriority: can.setPriority,
  saveMethod: can.saveMethod,
  editCampaign: can.editCampaign,
  publish: can.publish,
  manageMembers: can.manageMembers,
  readHistory: can.readHistory,
}
function campaignRule(action: string): (actor: Actor, campaignId: string) => boolean {
  const rule = campaignRules[action]
  if (rule === undefined) throw new Error(`no campaign rule named ${action}`)
  return rule
}
const houseRules: Record<string, (actor: Actor) => boolean> = {
  readHouse: can.readHouse,
  listCampaigns: can.listCampaigns,
  addSample: can.addSample,
  addLot: can.addLot,
  editSample: can.editSample,
  addSiteCount: can.addSiteCount,
  makeColumnMap: can.makeColumnMap,
  makeCalibration: can.makeCalibration,
  makeReaction: can.makeReaction,
  makeCampaign: can.makeCampaign,
  manageRigs: can.manageRigs,
  manageUsers: can.manageUsers,
  backUp: can.backUp,
  listPeople: can.listPeople,
}
const runRules: Record<string, (actor: Actor, run: RunFacts) => boolean> = {
  editRun: can.editRun,
  addFiles: can.addFiles,
  changeFiles: can.changeFiles,
  handIn: can.handIn,
  leaveOut: can.leaveOut,
}
function actorNamed<T extends object>(actors: T, name: string): T[keyof T] {
  if (!isKey(actors, name)) throw new Error(`no actor named ${name}`)
  return actors[name]
}

describe('a member of the campaign', () => {
  const { header, rows } = parse(campaignTable)
  for (const [action = '', ...cells] of rows)
    test.each(header.slice(1).map((role, index) => ({ role, expected: cells[index] === 'y' })))(
      `${action}: $role $expected`,
      ({ role, expected }) => {
        expect(campaignRule(action)(actorNamed(member, role), HERE)).toBe(expected)
      },
    )
})

describe('a person with no part in the campaign', () => {
  for (const [action = ''] of parse(campaignTable).rows)
    test.each(Object.keys(stranger))(`${action}: %s refused`, (role) => {
      expect(campaignRule(action)(actorNamed(stranger, role), HERE)).toBe(false)
    })
  for (const [action = '', whose = ''] of parse(runTable).rows)
    test.each(Object.keys(stranger))(`${action} on ${whose} run: %s refused in every state`, (role) => {
      for (const state of ['open', 'handed-in', 'decided', 'frozen'])
        expect(runRules[action]?.(actorNamed(stranger, role), runOf(whose, state))).toBe(false)
    })
})

describe('what campaigns share', () => {
  const { header, rows } = parse(houseTable)
  for (const [action = '', ...cells] of rows)
    test.each(header.slice(1).map((role, index) => ({ role, expected: cells[index] === 'y' })))(
      `${action}: $role $expected`,
      ({ role, expected }) => {
        expect(houseRules[action]?.(actorNamed(member, role))).toBe(expected)
      },
    )
})

describe('a run', () => {
  const { header, rows } = parse(runTable)
  for (const [action = '', whose = '', ...cells] of rows)
    test.each(header.slice(2).map((column, index) => ({ column, expected: cells[index] === 'y' })))(
      `${action} ${whose}: $column $expected`,
      ({ column, expected }) => {
        const [role = '', state = ''] = column.split('/')
        expect(runRules[action]?.(actorNamed(member, role), runOf(whose, state))).toBe(expected)
      },
    )

  test('that an edition holds can no longer be decided, even by its lead', () => {
    expect(can.decide(member.lead, HERE, runOf('other', 'handed-in'))).toBe(true)
    expect(can.decide(member.lead, HERE, runOf('other', 'decided'))).toBe(true)
    expect(can.decide(member.lead, HERE, runOf('other', 'frozen'))).toBe(false)
  })
})

describe('house role and part in a campaign', () => {
  test('the part counts, not the house role', () => {
    const technicianWhoLeadsHere = person('technician', { [HERE]: 'lead' })
    expect(can.decide(technicianWhoLeadsHere, HERE)).toBe(true)
    const leadWhoIsTechnicianHere = person('lead', { [HERE]: 'technician', [ELSEWHERE]: 'lead' })
    expect(can.decide(leadWhoIsTechnicianHere, HERE)).toBe(false)
    expect(can.remark(leadWhoIsTechnicianHere, HERE)).toBe(false)
    expect(can.editRun(leadWhoIsTechnicianHere, runOf('other', 'open'))).toBe(false)
  })

  test('a guest of the house stays a guest whatever a membership says', () => {
    const raised = person('guest', { [HERE]: 'lead' })
    for (const [action = '', , , , guest] of parse(campaignTable).rows)
      expect(campaignRule(action)(raised, HERE), action).toBe(guest === 'y')
  })

  test('an admin decides only where made a lead', () => {
    expect(can.decide(person('admin', { [HERE]: 'lead' }), HERE)).toBe(true)
    expect(can.decide(person('admin', { [HERE]: 'researcher' }), HERE)).toBe(false)
    expect(can.decide(person('admin', { [ELSEWHERE]: 'lead' }), HERE)).toBe(false)
  })

  test('a campaign named like a built-in property gives nobody a part', () => {
    for (const name of ['__proto__', 'constructor', 'toString'])
      expect(can.seeCampaign(member.lead, name), name).toBe(false)
  })
})

describe('a token', () => {
  const lead = (scopes: readonly TokenScope[], campaignId?: string) =>
    person(
      'lead',
      { [HERE]: 'lead', [ELSEWHERE]: 'lead' },
      campaignId === undefined ? { scopes } : { scopes, campaignId },
    )
  const admin = (scopes: readonly TokenScope[], campaignId?: string) =>
    person('admin', {}, campaignId === undefined ? { scopes } : { scopes, campaignId })

  test('with scope read reads and changes nothing', () => {
    const reader = lead(['read'])
    expect(can.readCampaign(reader, HERE)).toBe(true)
    expect(can.readHouse(reader)).toBe(true)
    for (const action of ['addRun', 'remark', 'decide', 'shortlist', 'saveMethod', 'manageMembers', 'publish'])
      expect(campaignRule(action)(reader, HERE), action).toBe(false)
    for (const rule of Object.values(runRules)) expect(rule(reader, runOf('own', 'open'))).toBe(false)
    expect(can.manageTokensOf(reader, 'me')).toBe(false)
  })

  test('with scope intake logs runs and adds files, and neither judges nor edits', () => {
    const instrument = lead(['read', 'intake'])
    expect(can.addSample(instrument)).toBe(true)
    expect(can.addRun(instrument, HERE)).toBe(true)
    expect(can.addFiles(instrument, runOf('other', 'open'))).toBe(true)
    expect(can.handIn(instrument, runOf('own', 'open'))).toBe(true)
    expect(can.editRun(instrument, runOf('own', 'open'))).toBe(false)
    expect(can.changeFiles(instrument, runOf('own', 'open'))).toBe(false)
    expect(can.editSample(instrument)).toBe(false)
    expect(can.addSiteCount(instrument)).toBe(false)
    expect(can.makeCalibration(instrument)).toBe(false)
    expect(can.leaveOut(instrument, runOf('own', 'open'))).toBe(false)
    expect(can.remark(instrument, HERE)).toBe(false)
    expect(can.decide(instrument, HERE)).toBe(false)
    expect(can.makeColumnMap(instrument)).toBe(false)
  })

  test('with no scopes does nothing at all', () => {
    const empty = admin([])
    for (const rule of Object.values(houseRules)) expect(rule(empty)).toBe(false)
    for (const [action = ''] of parse(campaignTable).rows) expect(campaignRule(action)(empty, HERE), action).toBe(false)
  })

  test('never exceeds its owner', () => {
    const technician = person('technician', { [HERE]: 'technician' }, { scopes: ['read', 'intake', 'write'] })
    for (const [action = '', cell] of parse(campaignTable).rows)
      expect(campaignRule(action)(technician, HERE), action).toBe(cell === 'y')
  })

  test('bound to one campaign is blind to others and leaves shared records alone', () => {
    const all: readonly TokenScope[] = ['read', 'intake', 'write']
    for (const bound of [lead(all, HERE), admin(all, HERE)]) {
      expect(can.readCampaign(bound, HERE)).toBe(true)
      expect(can.addRun(bound, HERE)).toBe(true)
      expect(can.readCampaign(bound, ELSEWHERE)).toBe(false)
      expect(can.addFiles(bound, runOf('own', 'open', ELSEWHERE))).toBe(false)
      for (const [action, rule] of Object.entries(houseRules))
        expect(rule(bound), action).toBe(['readHouse', 'listCampaigns'].includes(action))
    }
  })
})

describe('tokens of people', () => {
  test.each(['technician', 'researcher', 'lead', 'guest'] as const)('%s manages own ones only', (role) => {
    expect(can.manageTokensOf(member[role], 'me')).toBe(true)
    expect(can.manageTokensOf(member[role], 'you')).toBe(false)
  })
  test('admin manages those of others too', () => {
    expect(can.manageTokensOf(member.admin, 'you')).toBe(true)
  })
})

describe('the scope of a query', () => {
  test.each([
    ['technician', [HERE], [HERE]],
    ['researcher', [HERE], [HERE]],
    ['lead', [HERE], [HERE]],
    ['guest', [], [HERE]],
    ['admin', 'all', 'all'],
  ] as const)('%s', (role, readable, visible) => {
    expect(readableCampaigns(member[role])).toEqual(readable)
    expect(visibleCampaigns(member[role])).toEqual(visible)
  })

  test('of a bound token is that campaign, for an admin too', () => {
    expect(readableCampaigns(person('admin', {}, { scopes: ['read'], campaignId: HERE }))).toEqual([HERE])
    expect(readableCampaigns(person('admin', {}, { scopes: ['write'] }))).toEqual([])
    expect(
      readableCampaigns(
        person('lead', { [HERE]: 'lead', [ELSEWHERE]: 'lead' }, { scopes: ['read'], campaignId: ELSEWHERE }),
      ),
    ).toEqual([ELSEWHERE])
  })
})

test('every rule stands in a table above', () => {
  const written = new Set([
    ...parse(campaignTable).rows.map(([action]) => action),
    ...parse(houseTable).rows.map(([action]) => action),
    ...parse(runTable).rows.map(([action]) => action),
    'manageTokensOf',
  ])
  expect(Object.keys(can).filter((action) => !written.has(action))).toEqual([])
})
