import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { exportMarkBook } from '@/lib/tasks/export-mark-book'

const Asked = z.object({ classSet: z.string().min(1).optional() })

export async function GET(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const { classSet } = Asked.parse(Object.fromEntries(new URL(request.url).searchParams))
    const { name, csv } = await exportMarkBook(actor, (await params).paperId, classSet)
    return new Response(csv, { headers: { 'content-type': 'text/csv; charset=utf-8', 'content-disposition': `attachment; filename="mark-book.csv"; filename*=UTF-8''${encodeURIComponent(name).replaceAll("'", '%27')}`, 'cache-control': 'private, no-store' } })
  })
}
