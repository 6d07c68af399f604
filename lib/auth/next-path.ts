/** Where to go after sign-in: a path of this application, else the start page. */
export function safeNextPath(next: unknown): string {
  if (typeof next !== 'string' || next.length > 2_000) return '/'
  // One slash first, and nothing a browser would read as a second one or drop.
  if (!/^\/(?![/\\])[^\\\u0000-\u0020\u007f-\u00a0\u2028\u2029\ufeff]*$/u.test(next)) return '/'
  const here = 'http://here.invalid'
  try {
    const url = new URL(next, here)
    if (url.origin !== here) return '/'
    const path = `${url.pathname}${url.search}${url.hash}`
    // Dot segments may leave a second slash in front: `/.//host`.
    return path.startsWith('//') || path.startsWith('/sign-in') ? '/' : path
  } catch {
    return '/'
  }
}
