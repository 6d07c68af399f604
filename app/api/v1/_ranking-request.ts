import { z } from 'zod'
import { type RankingOptions } from '@/lib/domain/ranking'
import { readQuery } from './_respond'

/** How a ranking is asked for: at another reference temperature, with or without runs that no lead has decided on, under an older method. */
export const rankingRequestSchema = z.strictObject({
  referenceTemperatureK: z.coerce.number().gt(200).lt(2_000).optional(),
  provisional: z.enum(['0', '1']).default('1'),
  method: z.coerce.number().int().gte(1).optional(),
})

export function rankingOptionsOf(request: Request): RankingOptions {
  const query = readQuery(request, rankingRequestSchema)
  return {
    includeProvisional: query.provisional === '1',
    ...(query.referenceTemperatureK === undefined ? {} : { referenceTemperatureK: query.referenceTemperatureK }),
    ...(query.method === undefined ? {} : { methodNumber: query.method }),
  }
}

/** Header that makes a browser keep a download under a plain ASCII name. */
export function downloadHeaders(fileName: string, type: string): Record<string, string> {
  const plain = fileName.replaceAll(/[^\w.-]+/g, '-')
  return {
    'Content-Type': type,
    'Content-Disposition': `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(fileName)}`,
    'Cache-Control': 'private, no-store',
    'X-Content-Type-Options': 'nosniff',
  }
}
