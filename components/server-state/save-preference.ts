/**
 * Keeps a small piece of a person's own view (column widths, sort order) on the server, so that it is there on the next machine too.
 * A failure costs nobody anything: the view simply starts from its defaults next time, so the answer says whether it was kept and no more.
 */
export async function savePreference(key: string, content: unknown): Promise<boolean> {
  try {
    const answer = await fetch(`/api/v1/preferences/${encodeURIComponent(key)}`, {
      method: 'PUT',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({ content }),
    })
    return answer.ok
  } catch (error) {
    if (error instanceof TypeError) return false // no connection
    throw error
  }
}
