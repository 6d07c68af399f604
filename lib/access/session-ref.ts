/** Short name of a session for lists and the audit trail; it opens nothing. */
export function sessionRefOf(idHash: string): string {
  return `session:${idHash.slice(0, 16)}`
}
