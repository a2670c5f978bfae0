import { downloadResponse } from '@/app/_door/download-response'
import { requireActor } from '@/app/_door/require-actor'
import { respond } from '@/lib/infra/respond'
import { printModerationRecord } from '@/lib/tasks/print-moderation-record'

type Context = { params: Promise<{ sampleId: string }> }

/** The moderation record of a sample as a PDF. */
export async function GET(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const { bytes, name } = await printModerationRecord(await requireActor(), (await params).sampleId)
    return downloadResponse(bytes, name)
  })
}
