import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { makePrintPack } from '@/lib/tasks/make-print-pack'

const Wanted = z.object({ classSetId: z.uuid(), spares: z.int().min(0).max(60), twoSided: z.boolean() })

/** Prints a class set's papers with codes: the PDF as the answer's body. */
export async function POST(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await makePrintPack(await requireActor(), { paperId: (await params).paperId, ...Wanted.parse(await request.json()) })
    return new Response(new Uint8Array(bytes), { headers: { 'content-type': 'application/pdf', 'content-disposition': `attachment; filename*=UTF-8''${encodeURIComponent(name)}`, 'cache-control': 'private, no-store' } })
  })
}
