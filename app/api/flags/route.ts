import { z } from 'zod'
import { MarkingAsked } from '@/app/_door/marking-asked'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { raiseFlag } from '@/lib/tasks/raise-flag'

const Flag = MarkingAsked.extend({ note: z.string().trim().min(1).max(600) })

export async function POST(request: Request): Promise<Response> {
  return respond(request, async () => raiseFlag(await requireActor(), Flag.parse(await request.json().catch(() => null))))
}
