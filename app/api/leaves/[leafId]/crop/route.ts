import { z } from 'zod'
import { pictureResponse } from '@/app/_door/picture-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { cropDpi, readLeafCrop } from '@/lib/tasks/read-leaf-crop'

const Asked = z.object({ box: z.enum(['name', 'number', 'hand']) })

/** The name box or the number boxes of a leaf, or some of its writing. Asked again each time: a leaf laid anew is cut anew. */
export async function GET(request: Request, { params }: { params: Promise<{ leafId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const { box } = Asked.parse(Object.fromEntries(new URL(request.url).searchParams))
    return pictureResponse(request, await readLeafCrop(actor, { leafId: (await params).leafId, box }), { dpi: cropDpi, key: null })
  })
}
