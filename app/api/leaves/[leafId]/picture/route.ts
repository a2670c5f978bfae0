import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readLeafPicture } from '@/lib/tasks/read-leaf-picture'

const Asked = z.object({
  width: z.coerce.number().int().min(40).max(4000).default(1200),
  turn: z.union([z.literal('0'), z.literal('90'), z.literal('180'), z.literal('270')]).transform((turn) => Number(turn) as 0 | 90 | 180 | 270).optional(),
})

/** A leaf never changes under its address; the cookie tells whose picture it is. */
const headers = { 'content-type': 'image/jpeg', 'cache-control': 'private, max-age=31536000, immutable', vary: 'Cookie', 'x-content-type-options': 'nosniff' }

/** A leaf upright, or turned as asked. */
export async function GET(request: Request, { params }: { params: Promise<{ leafId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const asked = Asked.parse(Object.fromEntries(new URL(request.url).searchParams))
    const bytes = await readLeafPicture(actor, { leafId: (await params).leafId, ...asked })
    return new Response(new Uint8Array(bytes), { headers })
  })
}
