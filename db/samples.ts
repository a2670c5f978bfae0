import type { HalfMarks } from '@/lib/core/marks'
import type { DrawnAs } from '@/lib/core/second-marking'
import type { Db } from './knex'

// A person's own first marking is never among what they second-mark, whatever the sample says.
const notOwnFirst = `not exists (select 1 from markings own where own.response_id = responses.id and own.round in ('first', 're-mark') and own.marker_id = samples.moderator_id)`

/** The responses of one question that this person second-marks, in reading order (highest, lowest, middle, the rest). Closed samples are over. */
export async function sampleResponseIds(db: Db, userId: string, questionId: string): Promise<string[]> {
  return db('samples')
    .join('sample_scripts', 'sample_scripts.sample_id', 'samples.id')
    .join('responses', 'responses.script_id', 'sample_scripts.script_id')
    .where({ 'samples.moderator_id': userId, 'responses.question_id': questionId })
    .whereNull('samples.closed_at')
    .whereRaw(notOwnFirst)
    .orderBy(['samples.drawn_at', 'sample_scripts.position'])
    .pluck('responses.id')
}

/**
 * The responses of a paper whose other markings this person may not see yet: those of their open samples that they have not
 * settled themselves. Whatever shows a mark asks here first.
 */
export async function blindResponseIds(db: Db, userId: string, paperId: string): Promise<Set<string>> {
  const ids = (await db('class_sets')
    .join('samples', 'samples.class_set_id', 'class_sets.id')
    .join('sample_scripts', 'sample_scripts.sample_id', 'samples.id')
    .join('responses', 'responses.script_id', 'sample_scripts.script_id')
    .where({ 'class_sets.paper_id': paperId, 'samples.moderator_id': userId })
    .whereNull('samples.closed_at')
    .whereRaw(notOwnFirst)
    .whereNotExists((settled) => settled.select(db.raw('1')).from('markings').whereRaw('markings.response_id = responses.id')
      .where({ 'markings.round': 'second', 'markings.marker_id': userId, 'markings.state': 'settled' }))
    .pluck('responses.id')) as string[]
  return new Set(ids)
}

export type Sample = Readonly<{
  id: string; classSetId: string; paperId: string; moderatorId: string; seed: string; size: number; defaultSize: number; tolerance: HalfMarks
  drawnBy: string; drawnAt: number; closedBy: string | null; closedAt: number | null
}>

const sampleColumns = {
  id: 'samples.id', classSetId: 'samples.class_set_id', paperId: 'class_sets.paper_id', moderatorId: 'samples.moderator_id', seed: 'samples.seed', size: 'samples.size',
  defaultSize: 'samples.default_size', tolerance: 'samples.tolerance', drawnBy: 'samples.drawn_by', drawnAt: 'samples.drawn_at', closedBy: 'samples.closed_by', closedAt: 'samples.closed_at',
}
const selectSamples = (db: Db) => db('samples').join('class_sets', 'class_sets.id', 'samples.class_set_id').select(sampleColumns).orderBy(['samples.drawn_at', 'samples.id'])

export async function listSamples(db: Db, paperId: string): Promise<Sample[]> {
  return (await selectSamples(db).where('class_sets.paper_id', paperId)) as Sample[]
}

/** Whether a sample of a paper was ever drawn. */
export async function hasSample(db: Db, paperId: string): Promise<boolean> {
  return Boolean(await selectSamples(db).where('class_sets.paper_id', paperId).first())
}

export async function getSample(db: Db, id: string): Promise<Sample | null> {
  return ((await selectSamples(db).where('samples.id', id).first()) as Sample | undefined) ?? null
}

/** The sample of a class set that a moderator has; null when none was drawn for them. */
export async function findSample(db: Db, classSetId: string, moderatorId: string): Promise<Sample | null> {
  return ((await selectSamples(db).where({ 'samples.class_set_id': classSetId, 'samples.moderator_id': moderatorId }).first()) as Sample | undefined) ?? null
}

/** Keeps a drawn sample with its scripts in reading order. */
export async function addSample(db: Db, sample: Omit<Sample, 'paperId' | 'drawnBy' | 'drawnAt' | 'closedBy' | 'closedAt'>, drawnBy: string, scripts: readonly { scriptId: string; drawnAs: DrawnAs }[]): Promise<void> {
  await db('samples').insert({
    id: sample.id, class_set_id: sample.classSetId, moderator_id: sample.moderatorId, seed: sample.seed, size: sample.size, default_size: sample.defaultSize,
    tolerance: sample.tolerance, drawn_by: drawnBy, drawn_at: Date.now(),
  })
  for (const [position, { scriptId, drawnAs }] of scripts.entries()) await db('sample_scripts').insert({ sample_id: sample.id, script_id: scriptId, position, drawn_as: drawnAs })
}

/** Puts one more script at the end of a sample; nobody takes one out. */
export async function addSampleScript(db: Db, sampleId: string, scriptId: string): Promise<void> {
  const last = await db('sample_scripts').where({ sample_id: sampleId }).max({ position: 'position' }).first<{ position: number | null }>()
  await db('sample_scripts').insert({ sample_id: sampleId, script_id: scriptId, position: (last?.position ?? -1) + 1, drawn_as: 'added' })
}

export async function closeSample(db: Db, id: string, closedBy: string): Promise<void> {
  await db('samples').where({ id }).update({ closed_at: Date.now(), closed_by: closedBy })
}

export type SampleScript = Readonly<{ sampleId: string; scriptId: string; number: number; name: string | null; drawnAs: DrawnAs }>

/** The scripts of every sample of a paper in reading order; `number` is the script's running number in its class set. */
export async function listSampleScripts(db: Db, paperId: string): Promise<SampleScript[]> {
  const rows = (await db('class_sets').join('samples', 'samples.class_set_id', 'class_sets.id').join('sample_scripts', 'sample_scripts.sample_id', 'samples.id')
    .join('scripts', 'scripts.id', 'sample_scripts.script_id')
    .leftJoin('class_set_students', (join) => join.on('class_set_students.class_set_id', 'class_sets.id').andOn('class_set_students.student_id', 'scripts.student_id'))
    .where('class_sets.paper_id', paperId).orderBy(['samples.drawn_at', 'sample_scripts.position'])
    .select({ sampleId: 'samples.id', scriptId: 'scripts.id', position: 'scripts.position', drawnAs: 'sample_scripts.drawn_as', given: 'class_set_students.given_name', family: 'class_set_students.family_name' })) as
    { sampleId: string; scriptId: string; position: number; drawnAs: DrawnAs; given: string | null; family: string | null }[]
  return rows.map(({ sampleId, scriptId, position, drawnAs, given, family }) => ({ sampleId, scriptId, number: position + 1, drawnAs, name: family === null ? null : `${family}, ${given}` }))
}

/** Who has given first marks in a class set, finished or not. */
export async function firstMarkerIds(db: Db, classSetId: string): Promise<Set<string>> {
  const ids = (await db('scripts').join('responses', 'responses.script_id', 'scripts.id').join('markings', 'markings.response_id', 'responses.id')
    .where('scripts.class_set_id', classSetId).whereIn('markings.round', ['first', 're-mark']).distinct('markings.marker_id').pluck('markings.marker_id')) as string[]
  return new Set(ids)
}
