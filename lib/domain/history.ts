/** One line of the audit trail: who changed what, when and why. */
export interface HistoryEntry {
  readonly seq: number
  readonly at: string
  readonly actorId: string
  readonly actorName: string
  readonly action: string
  readonly entity: string
  readonly entityId: string
  readonly before: unknown
  readonly after: unknown
  readonly reason: string
}
