import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { readSheafAgain } from '@/lib/tasks/read-sheaf-again'

/** Reads a sheaf again whose reading failed. */
export async function POST(request: Request, { params }: { params: Promise<{ sheafId: string }> }): Promise<Response> {
  return respond(request, async () => readSheafAgain(await requireActor(), (await params).sheafId))
}
