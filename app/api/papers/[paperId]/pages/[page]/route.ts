import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readBlankPage } from '@/lib/tasks/read-blank-page'

const Page = z.coerce.number().int().min(1).max(40)

/** A page of the blank paper as a picture. The page asks with `?v=` of the file, so it may be kept by this browser for this person. */
export async function GET(request: Request, { params }: { params: Promise<{ paperId: string; page: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { paperId, page } = await params
    const png = await readBlankPage(await requireActor(), { paperId, page: Page.parse(page) })
    return new Response(new Uint8Array(png), { headers: { 'content-type': 'image/png', 'cache-control': 'private, max-age=3600', vary: 'Cookie' } })
  })
}
