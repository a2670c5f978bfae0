import { requireActor } from '@/app/_door/require-actor'
import type { Actor } from '@/lib/core/actor'
import { SortingAct, type GivenSortingAct } from '@/lib/core/sorting-act'
import { respond } from '@/lib/infra/respond'
import { addExtraPage } from '@/lib/tasks/add-extra-page'
import { confirmCertainNames } from '@/lib/tasks/confirm-certain-names'
import { confirmName, takeNameAway } from '@/lib/tasks/confirm-name'
import { layLeaf, turnLeaf } from '@/lib/tasks/lay-leaf'
import { noteAttendance } from '@/lib/tasks/note-attendance'
import { placeLeaf } from '@/lib/tasks/place-leaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { undoSorting } from '@/lib/tasks/undo-sorting'

type Context = { params: Promise<{ paperId: string }> }

/** Everything the sorting table shows. */
export async function GET(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => readSortingTable(await requireActor(), (await params).paperId))
}

/** One act of a person at the sorting table; answers the table as it then stands. */
export async function POST(request: Request, { params }: Context): Promise<Response> {
  return respond(request, async () => {
    const actor = await requireActor()
    const { paperId } = await params
    await perform(actor, paperId, SortingAct.parse(await request.json().catch(() => null)))
    return readSortingTable(actor, paperId)
  })
}

async function perform(actor: Actor, paperId: string, act: GivenSortingAct): Promise<unknown> {
  switch (act.act) {
    case 'place': return placeLeaf(actor, act)
    case 'extra': return addExtraPage(actor, act)
    case 'lay': return layLeaf(actor, act)
    case 'turn': return turnLeaf(actor, act)
    case 'name': return confirmName(actor, act)
    case 'certain_names': return confirmCertainNames(actor, paperId, act.names)
    case 'unname': return takeNameAway(actor, act)
    case 'attendance': return noteAttendance(actor, act)
    case 'undo': return undoSorting(actor, paperId)
  }
}
