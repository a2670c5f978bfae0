import { downloadResponse } from '@/app/_door/download-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { openAnnotatedScript } from '@/lib/tasks/open-annotated-script'

/** A script with its marking as annotations, for staff who may see it. */
export async function GET(request: Request, { params }: { params: Promise<{ scriptId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await openAnnotatedScript(await requireActor(), (await params).scriptId)
    return downloadResponse(bytes, name)
  })
}
