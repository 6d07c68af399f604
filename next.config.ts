import type { NextConfig } from 'next'

/** Headers that hold for every answer, static files and errors included; the policy with its nonce is set per request in proxy.ts. */
const securityHeaders = [
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  { key: 'Permissions-Policy', value: 'camera=(), microphone=(), geolocation=(), payment=()' },
  { key: 'Cross-Origin-Opener-Policy', value: 'same-origin' },
  { key: 'Cross-Origin-Resource-Policy', value: 'same-origin' },
  { key: 'X-Frame-Options', value: 'DENY' },
  { key: 'Strict-Transport-Security', value: 'max-age=31536000; includeSubDomains' },
]

const config: NextConfig = {
  serverExternalPackages: [
    '@electric-sql/pglite',
    'pg',
    'pg-copy-streams',
    'formidable',
    'yauzl',
    'bcryptjs',
    'pdfkit',
    'nodemailer',
    '@aws-sdk/client-s3',
  ],
  poweredByHeader: false,
  productionBrowserSourceMaps: false,
  typedRoutes: true,
  images: { unoptimized: true },
  agentRules: false,
  // see the file: the original would ask by `eval`
  turbopack: {
    resolveAlias: { '@stdlib/assert-has-generator-support': { browser: './app/_has-generator-support.cjs' } },
  },
  experimental: { serverActions: { bodySizeLimit: '1mb' } },
  headers: async () => [{ source: '/:path*', headers: securityHeaders }],
}

export default config
