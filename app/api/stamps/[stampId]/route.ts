import { requireActor } from '@/app/_door/require-actor'
import { AppError } from '@/lib/core/errors'
import { PressedStamp } from '@/lib/core/stamp'
import { respond } from '@/lib/infra/respond'
import { pressStamp } from '@/lib/tasks/press-stamp'

type Params = { params: Promise<{ stampId: string }> }

export async function PUT(request: Request, { params }: Params): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const stamp = PressedStamp.parse(await request.json().catch(() => null))
    if (stamp.id !== (await params).stampId) throw new AppError('bad_input', { id: stamp.id })
    return pressStamp(actor, stamp)
  })
}
