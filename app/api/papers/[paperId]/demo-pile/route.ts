import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readDemoPile } from '@/lib/tasks/read-demo-pile'

/** A scanned pile of an invented class's paper: in the demo school, instead of a copier. */
export async function GET(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const bytes = await readDemoPile(await requireActor(), (await params).paperId)
    return new Response(new Uint8Array(bytes), {
      headers: { 'content-type': 'application/pdf', 'content-length': String(bytes.length), 'content-disposition': 'attachment; filename="scan.pdf"', 'cache-control': 'private, no-store' },
    })
  })
}
