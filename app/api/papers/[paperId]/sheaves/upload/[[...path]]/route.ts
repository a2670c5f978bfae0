import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { takeUpload } from '@/lib/tasks/take-upload'

type Context = { params: Promise<{ paperId: string; path?: string[] }> }

/** The tus protocol for a sheaf on its way in; each request asks who it is. */
async function handler(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const { paperId, path } = await params
    return takeUpload(await requireActor(), { paperId, uploadId: path?.join('/') ?? null, request })
  })
}

export { handler as GET, handler as HEAD, handler as OPTIONS, handler as POST, handler as PATCH, handler as DELETE }
