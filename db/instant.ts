/** An instant as the outside writes it: ISO 8601 in UTC. */
export function instantOf(date: Date): string {
  return date.toISOString()
}

export function instantOrNull(date: Date | null): string | null {
  return date === null ? null : date.toISOString()
}

export function dateOrNull(instant: string | null): Date | null {
  return instant === null ? null : new Date(instant)
}
