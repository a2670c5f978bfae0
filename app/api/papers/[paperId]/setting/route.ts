import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { Setting } from '@/lib/core/setting'
import { respond } from '@/lib/infra/respond'
import { readSetting } from '@/lib/tasks/read-setting'
import { saveSetting } from '@/lib/tasks/save-setting'

type Context = { params: Promise<{ paperId: string }> }
const Save = z.object({ version: z.int().min(1), setting: Setting })

export async function GET(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => readSetting(await requireActor(), (await params).paperId))
}

export async function POST(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    return { version: await saveSetting(actor, { paperId: (await params).paperId, ...Save.parse(await request.json()) }) }
  })
}
