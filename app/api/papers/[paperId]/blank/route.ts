import { requireActor } from '@/app/_door/require-actor'
import { AppError } from '@/lib/core/errors'
import { respond } from '@/lib/infra/respond'
import { readBlankFile } from '@/lib/tasks/read-blank-file'
import { putBlankPaper } from '@/lib/tasks/put-blank-paper'

const limit = 64 * 1024 * 1024

/** The blank paper, as it was put in. */
export async function GET(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await readBlankFile(await requireActor(), (await params).paperId)
    return new Response(new Uint8Array(bytes), { headers: { 'content-type': 'application/pdf', 'content-disposition': `inline; filename*=UTF-8''${encodeURIComponent(name)}`, 'cache-control': 'private, no-store' } })
  })
}

/** Puts a blank paper in place: the PDF as the body, its name as `?name=`. */
export async function POST(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    if (Number(request.headers.get('content-length') ?? 0) > limit) throw new AppError('file_too_large', { limitMb: 64 })
    const bytes = new Uint8Array(await request.arrayBuffer())
    return putBlankPaper(actor, { paperId: (await params).paperId, bytes, name: new URL(request.url).searchParams.get('name') ?? 'paper.pdf' })
  })
}
