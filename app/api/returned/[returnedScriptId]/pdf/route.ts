import { downloadResponse } from '@/app/_door/download-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { openReturnedPdf } from '@/lib/tasks/read-returned-script'

/** A returned script as a file: for its student while it stands handed back, and for the paper's owners. */
export async function GET(request: Request, { params }: { params: Promise<{ returnedScriptId: string }> }): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await openReturnedPdf(await requireActor(), (await params).returnedScriptId)
    return downloadResponse(bytes, name)
  })
}
