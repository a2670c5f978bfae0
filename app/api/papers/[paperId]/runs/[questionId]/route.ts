import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { rounds } from '@/lib/core/stamp'
import { respond } from '@/lib/infra/respond'
import { openRun } from '@/lib/tasks/open-run'

type Params = { params: Promise<{ paperId: string; questionId: string }> }

export async function GET(request: Request, { params }: Params): Promise<Response> {
  return respond(request, async () => {
    const round = z.enum(rounds).parse(new URL(request.url).searchParams.get('round') ?? 'first')
    return openRun(await requireActor(), { ...(await params), round })
  })
}
