import { getDraft, removeDraft, saveDraft } from '@/lib/access/drafts'
import { draftRequest } from '../../_requests'
import { answer, handle, readJson } from '../../_respond'

interface Context {
  params: Promise<{ form: string }>
}

/** What was typed into a form and not sent: `{ "draft": null }` when there is nothing. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ draft: await getDraft(actor, (await context.params).form) }))
}

export async function PUT(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { content } = await readJson(request, draftRequest)
    return { draft: await saveDraft(actor, (await context.params).form, content) }
  })
}

export async function DELETE(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    await removeDraft(actor, (await context.params).form)
    return answer(undefined, { status: 204 })
  })
}
