import type { Actor } from '@/lib/core/actor'
import { listClassesOfTeacher, listClassSets, type ClassChoice, type ClassSet } from '@/db/class-sets'
import { listClassSetStudents, type ListedStudent } from '@/db/class-set-students'
import { db } from '@/db/knex'
import { listMarkers, listOwners, listPeopleWith, type PaperMarker, type PaperPerson } from '@/db/paper-people'
import { getPaper, type PaperDetails } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { gatePaper } from './gate-paper'
import { detailsOf } from './save-paper-details'

export type PaperDetailsView = Readonly<{
  paperId: string
  version: number
  details: PaperDetails
  blank: Readonly<{ name: string; size: number; pages: number }> | null
  questions: readonly Readonly<{ id: string; label: string }>[]
  classSets: readonly (ClassSet & Readonly<{ list: readonly ListedStudent[] }>)[]
  classes: readonly ClassChoice[]
  owners: readonly PaperPerson[]
  markers: readonly PaperMarker[]
  teachers: readonly PaperPerson[]
  allMarkers: readonly PaperPerson[]
}>

/** All about a paper that is not drawn on it. */
export async function readPaperDetails(actor: Actor, paperId: string): Promise<PaperDetailsView> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = (await getPaper(db(), paperId))!
  const file = paper.blankFileId && (await getStoredFile(db(), paper.blankFileId))
  const classSets = await listClassSets(db(), paperId)
  const list = await listClassSetStudents(db(), classSets.map(({ id }) => id))
  return {
    paperId, version: paper.schemeVersion, details: detailsOf(paper),
    blank: file ? { name: file.originalName, size: file.size, pages: paper.pages.length } : null,
    questions: paper.questions.map(({ id, label }) => ({ id, label })),
    classSets: classSets.map((set) => ({ ...set, list: list.filter((student) => student.classSetId === set.id) })),
    classes: await listClassesOfTeacher(db(), actor.userId),
    owners: await listOwners(db(), paperId), markers: await listMarkers(db(), paperId),
    teachers: await listPeopleWith(db(), 'teacher'), allMarkers: await listPeopleWith(db(), 'marker'),
  }
}
