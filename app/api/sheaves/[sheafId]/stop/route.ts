import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { stopReading } from '@/lib/tasks/stop-reading'

/** Stops the reading of a sheaf and takes everything of it away. */
export async function POST(request: Request, { params }: { params: Promise<{ sheafId: string }> }): Promise<Response> {
  return respond(request, async () => stopReading(await requireActor(), (await params).sheafId))
}
