import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readHandBack } from '@/lib/tasks/read-hand-back'

const Asked = z.object({ classSet: z.string().min(1).optional() })

export async function GET(request: Request, { params }: { params: Promise<{ paperId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const { classSet } = Asked.parse(Object.fromEntries(new URL(request.url).searchParams))
    return readHandBack(actor, (await params).paperId, classSet)
  })
}
