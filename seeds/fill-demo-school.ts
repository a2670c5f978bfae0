import { db } from '@/db/knex'
import { listSittingClasses } from '@/db/class-set-students'
import { getPaper, setGradeScale } from '@/db/papers'
import { sampleResponseIds } from '@/db/samples'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { addClass } from '@/lib/tasks/add-class'
import { halves } from '@/lib/core/marks'
import { paperMaximum } from '@/lib/core/paper'
import { assignMarker } from '@/lib/tasks/assign-marker'
import { createPaper } from '@/lib/tasks/create-paper'
import { drawSample } from '@/lib/tasks/draw-sample'
import { importRoster } from '@/lib/tasks/import-roster'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { startRelease } from '@/lib/tasks/start-release'
import { readClassSetFile, type ClassSetName } from './class-set-files'
import { markDemoResponses } from './demo-marking'
import { addDemoStaff, type DemoStaff } from './demo-staff'
import { addDemoStudents } from './demo-students'
import { confirmDemoNames, scanDemoSheaf } from './demo-scan'

type Sat = Readonly<{ set: ClassSetName; classId: string; satOn: string; title?: string }>
type Made = Readonly<{ paperId: string; classSetId: string; set: ClassSetName; name: string }>

/** Fills an empty school with papers at five stages. Every leaf goes through the real ingest, every mark through the desk's tasks. */
export async function fillDemoSchool(say: (line: string) => void): Promise<void> {
  const staff = await addDemoStaff()
  const teacher = staff['r.adeyemi']!
  const classes = await addDemoClasses(staff)
  await sitPaper(teacher, { set: 'one-page', classId: classes['6A']!, satOn: '2026-11-24', title: 'Quick quiz, to try the scan' })
  say('  a paper waits for its sheaf')
  const loose = await sitPaper(teacher, { set: 'booklet', classId: classes['7D']!, satOn: '2026-11-19' })
  await scanDemoSheaf(teacher, loose)
  await confirmDemoNames(teacher, loose, 8)
  say('  a paper has loose sheets to sort')
  await halfMarked(staff, await sitPaper(teacher, { set: 'everyday', classId: classes['8K']!, satOn: '2026-11-12' }))
  say('  a paper is half marked')
  await atTheModerator(staff, await sitPaper(teacher, { set: 'bitonal', classId: classes['9B']!, satOn: '2026-11-17' }))
  say('  a sample is at the moderator')
  await handedBack(staff, await sitPaper(teacher, { set: 'one-page', classId: classes['6A']!, satOn: '2026-11-10' }))
  say('  a paper is handed back')
  await sitPaper(staff['h.moss']!, { set: 'one-page', classId: await addSmallClass(staff['h.moss']!), satOn: '2026-11-26', title: 'Starter for 10C' })
}

/** A class of another teacher: what is hers nobody else of the demo's people sees. */
async function addSmallClass(teacher: Actor): Promise<string> {
  const { classId } = await addClass(teacher, '10C')
  const list = ['candidate_number,given_name,family_name,email', '1001,Maren,Okafor,', '1002,Idris,Vale,', '1003,Sunniva,Peck,']
  await importRoster(teacher, classId, new TextEncoder().encode(list.join('\n')))
  return classId
}

async function addDemoClasses(staff: DemoStaff): Promise<Record<string, string>> {
  const lists = { '6A': 'one-page', '7D': 'booklet', '8K': 'everyday', '9B': 'bitonal' } as const
  const ids: Record<string, string> = {}
  for (const [name, set] of Object.entries(lists)) {
    ids[name] = (await addClass(staff['r.adeyemi']!, name)).classId
    await importRoster(staff['r.adeyemi']!, ids[name]!, readClassSetFile(set, 'roster.csv'))
  }
  return ids
}

async function sitPaper(teacher: Actor, { set, classId, satOn, title = '' }: Sat): Promise<Made> {
  const paperFile = JSON.parse(readClassSetFile(set, 'paper.json').toString('utf8')) as unknown
  const { paperId } = await createPaper(teacher, { id: newId(), title, step: 1, classSets: [{ classId, satOn }], blank: { bytes: readClassSetFile(set, 'paper.pdf'), name: 'paper.pdf' }, paperFile })
  const [sitting] = await listSittingClasses(db(), paperId)
  return { paperId, classSetId: sitting!.classSetId, set, name: `${sitting!.className} ${satOn}.pdf` }
}

async function halfMarked({ 'r.adeyemi': teacher, 'm.osei': marker }: DemoStaff, made: Made): Promise<void> {
  await scanDemoSheaf(teacher!, made)
  await confirmDemoNames(teacher!, made)
  const theirs = (label: string) => label === '1a' || label === '2'
  const questions = (await getPaper(db(), made.paperId))!.questions
  await assignMarker(teacher!, { paperId: made.paperId, userId: marker!.userId, questionIds: questions.filter(({ label }) => theirs(label)).map(({ id }) => id) })
  await markDemoResponses(marker!, { ...made, round: 'first', questions: theirs })
  await markDemoResponses(teacher!, { ...made, round: 'first', questions: (label) => label === '1b' || label === '3a' || label === '3b' })
  await markDemoResponses(teacher!, { ...made, round: 'first', questions: (label) => label === '4', most: 12 })
}

async function atTheModerator({ 'r.adeyemi': teacher, 'k.lindqvist': moderator }: DemoStaff, made: Made): Promise<void> {
  await scanDemoSheaf(teacher!, made)
  await confirmDemoNames(teacher!, made)
  await setDemoScale(made.paperId)
  await markDemoResponses(teacher!, { ...made, round: 'first', questions: () => true })
  await drawSample(teacher!, { classSetId: made.classSetId, moderatorId: moderator!.userId })
  // The moderator is half way, and half a mark apart now and then.
  const inSample = (questionId: string) => sampleResponseIds(db(), moderator!.userId, questionId)
  await markDemoResponses(moderator!, { ...made, round: 'second', questions: (label) => label < '4' }, (n) => (n % 7 === 3 ? -1 : n % 23 === 5 ? -2 : 0), inSample)
}

async function handedBack({ 'r.adeyemi': teacher, 'm.osei': marker }: DemoStaff, made: Made): Promise<void> {
  await scanDemoSheaf(teacher!, made)
  await confirmDemoNames(teacher!, made)
  await setDemoScale(made.paperId)
  await assignMarker(teacher!, { paperId: made.paperId, userId: marker!.userId, questionIds: null })
  await markDemoResponses(marker!, { ...made, round: 'first', questions: (label) => label > '5' })
  await markDemoResponses(teacher!, { ...made, round: 'first', questions: (label) => label <= '5' })
  await addDemoStudents(made.classSetId)
  await startRelease(teacher!, made.classSetId)
  while (await runNextJob('seed', () => false));
}

/** Eight grades by equal steps of the maximum, an odd half rounded up first. */
async function setDemoScale(paperId: string): Promise<void> {
  const maximum = paperMaximum((await getPaper(db(), paperId))!.questions)
  const boundaries = [8, 7, 6, 5, 4, 3, 2, 1].map((grade) => ({ grade: String(grade), lowest: halves(Math.ceil((maximum * (grade + 1)) / 20) * 2) }))
  await setGradeScale(db(), paperId, 'up', boundaries)
}
