/**
 * What a page may load and run. Scripts and styles only with this answer's nonce or from here; no markup can bring its
 * own. A `style=` attribute in server-made markup is blocked too: use classes.
 */
export function contentPolicy(nonce: string, isDevelopment: boolean): string {
  return [
    `default-src 'none'`,
    // The framework's development client evaluates text; nothing in production does.
    `script-src 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ''}`,
    `style-src 'self' 'nonce-${nonce}'`,
    `img-src 'self' data: blob:`,
    `font-src 'self' data:`,
    `connect-src 'self'`,
    `worker-src 'self' blob:`,
    `manifest-src 'self'`,
    `form-action 'self'`,
    `base-uri 'none'`,
    `frame-ancestors 'none'`,
    `object-src 'none'`,
  ].join('; ')
}
