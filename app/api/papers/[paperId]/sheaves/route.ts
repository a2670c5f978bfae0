import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readSheaves } from '@/lib/tasks/read-sheaves'
import { receiveSheaf } from '@/lib/tasks/receive-sheaf'

type Context = { params: Promise<{ paperId: string }> }
const Arrived = z.object({ uploadId: z.string().max(64), classSetIds: z.array(z.uuid()).max(50).default([]) })

/** The sheaves of a paper and how far each has come. */
export async function GET(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => readSheaves(await requireActor(), (await params).paperId))
}

/** A complete upload becomes a sheaf. */
export async function POST(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => receiveSheaf(await requireActor(), { paperId: (await params).paperId, ...Arrived.parse(await request.json().catch(() => null)) }))
}
