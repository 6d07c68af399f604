import { getPreference, savePreference } from '@/lib/access/preferences'
import { preferenceRequest } from '../../_requests'
import { answer, handle, readJson } from '../../_respond'

interface Context {
  params: Promise<{ key: string }>
}

/** How something is shown to this person: `{ "content": null }` when nothing was kept. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ content: await getPreference(actor, (await context.params).key) }))
}

export async function PUT(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { content } = await readJson(request, preferenceRequest)
    await savePreference(actor, (await context.params).key, content)
    return answer(undefined, { status: 204 })
  })
}
