import { MarkingAsked } from '@/app/_door/marking-asked'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { reopenMarking } from '@/lib/tasks/reopen-marking'

export async function POST(request: Request): Promise<Response> {
  return respond(request, async () => reopenMarking(await requireActor(), MarkingAsked.parse(await request.json().catch(() => null))))
}
