import type { Db } from './knex'

export type ClassSet = Readonly<{ id: string; paperId: string; classId: string; className: string; satOn: string; resitOf: string | null; students: number; absent: number; scripts: number }>

const columns = {
  id: 'class_sets.id', paperId: 'class_sets.paper_id', classId: 'class_sets.class_id', className: 'classes.name', satOn: 'class_sets.sat_on', resitOf: 'class_sets.resit_of',
}

function selectClassSets(db: Db) {
  return db('class_sets').join('classes', 'classes.id', 'class_sets.class_id').select(columns).select({
    students: db.raw('(select count(*) from class_set_students where class_set_id = class_sets.id)'),
    absent: db.raw(`(select count(*) from class_set_students where class_set_id = class_sets.id and attendance <> 'expected')`),
    scripts: db.raw('(select count(*) from scripts where class_set_id = class_sets.id)'),
  })
}

/** The class sets of a paper, by date, then class. */
export async function listClassSets(db: Db, paperId: string): Promise<ClassSet[]> {
  return (await selectClassSets(db).where('class_sets.paper_id', paperId).orderBy(['class_sets.sat_on', 'classes.name'])) as ClassSet[]
}

export async function getClassSet(db: Db, id: string): Promise<ClassSet | null> {
  return ((await selectClassSets(db).where('class_sets.id', id).first()) as ClassSet | undefined) ?? null
}

export async function findClassSet(db: Db, paperId: string, classId: string, satOn: string): Promise<ClassSet | null> {
  return ((await selectClassSets(db).where({ 'class_sets.paper_id': paperId, 'class_sets.class_id': classId, 'class_sets.sat_on': satOn }).first()) as ClassSet | undefined) ?? null
}

/** Adds a class set with the class's list as it stands now. */
export async function addClassSet(db: Db, set: Pick<ClassSet, 'id' | 'paperId' | 'classId' | 'satOn' | 'resitOf'>): Promise<void> {
  await db('class_sets').insert({ id: set.id, paper_id: set.paperId, class_id: set.classId, sat_on: set.satOn, resit_of: set.resitOf, created_at: Date.now() })
  await copyClassList(db, set.id)
}

/** Copies students of the class who are not in the set yet; nobody in it changes. Returns how many came. */
export async function copyClassList(db: Db, classSetId: string): Promise<number> {
  const before = await countStudents(db, classSetId)
  await db.raw(
    `insert into class_set_students (class_set_id, student_id, candidate_number, given_name, family_name)
     select class_sets.id, students.id, students.candidate_number, students.given_name, students.family_name
     from class_sets join class_students on class_students.class_id = class_sets.class_id join students on students.id = class_students.student_id
     where class_sets.id = ? and students.left_at is null on conflict do nothing`,
    [classSetId],
  )
  return (await countStudents(db, classSetId)) - before
}

async function countStudents(db: Db, classSetId: string): Promise<number> {
  const row = await db('class_set_students').where({ class_set_id: classSetId }).count({ n: '*' }).first<{ n: number }>()
  return row.n
}

/** Only for a class set nothing was scanned for. */
export async function dropClassSet(db: Db, id: string): Promise<void> {
  await db('class_sets').where({ id }).delete()
}

/** Whether a sheaf, sample, release or re-sit hangs on the class set. */
export async function classSetInUse(db: Db, id: string): Promise<boolean> {
  for (const table of ['scripts', 'sheaf_class_sets', 'samples', 'releases']) if (await db(table).where({ class_set_id: id }).first<unknown>('class_set_id')) return true
  return Boolean(await db('class_sets').where({ resit_of: id }).first<unknown>('id'))
}
