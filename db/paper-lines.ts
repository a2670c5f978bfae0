import type { QuestionLeft } from '@/lib/core/paper-left'
import type { Db } from './knex'

export type PaperOfPerson = Readonly<{ paperId: string; title: string; hasBlank: 0 | 1; classSetId: string | null; className: string | null; satOn: string | null; students: number }>

function papers(db: Db) {
  return db('papers').leftJoin('class_sets', 'class_sets.paper_id', 'papers.id').leftJoin('classes', 'classes.id', 'class_sets.class_id').whereNull('papers.archived_at').select({
    paperId: 'papers.id', title: 'papers.title', hasBlank: db.raw('papers.blank_file_id is not null'), classSetId: 'class_sets.id', className: 'classes.name', satOn: 'class_sets.sat_on',
    students: db.raw('(select count(*) from class_set_students where class_set_id = class_sets.id)'),
  })
}

/** The papers a person owns, one row for each class set, or one without. */
export async function papersOwned(db: Db, userId: string): Promise<PaperOfPerson[]> {
  return (await papers(db).whereIn('papers.id', db('paper_owners').where({ user_id: userId }).select('paper_id'))) as PaperOfPerson[]
}

/** The papers a person marks some question of. */
export async function papersMarked(db: Db, userId: string): Promise<PaperOfPerson[]> {
  return (await papers(db).whereIn('papers.id', db('paper_markers').where({ user_id: userId }).select('paper_id'))) as PaperOfPerson[]
}

/** The class sets a person has a sample of. */
export async function papersModerated(db: Db, userId: string): Promise<PaperOfPerson[]> {
  return (await papers(db).whereIn('class_sets.id', db('samples').where({ moderator_id: userId }).select('class_set_id'))) as PaperOfPerson[]
}

/** Answers of a class set by question: those with a picture that wait for a settled mark, and those that have one. Withdrawn questions are left out. */
export async function answersByQuestion(db: Db, classSetId: string): Promise<QuestionLeft[]> {
  return (await db.raw(
    `select questions.id, questions.label,
       coalesce(sum(counting.state = 'settled'), 0) as marked,
       coalesce(sum(coalesce(counting.state, '') <> 'settled' and (
         not exists (select 1 from answer_spaces where question_id = questions.id) or exists (
           select 1 from answer_spaces join script_pages on script_pages.script_id = scripts.id and script_pages.paper_page = answer_spaces.page
           where answer_spaces.question_id = questions.id and script_pages.leaf_id is not null))), 0) as left
     from class_sets join scripts on scripts.class_set_id = class_sets.id
     join questions on questions.paper_id = class_sets.paper_id and questions.withdrawn_as is null
     join responses on responses.script_id = scripts.id and responses.question_id = questions.id
     left join class_set_students listed on listed.class_set_id = scripts.class_set_id and listed.student_id = coalesce(scripts.student_id, scripts.suggested_student_id)
     left join counting_decisions on counting_decisions.response_id = responses.id and counting_decisions.superseded_at is null
     left join markings counting on counting.id = counting_decisions.marking_id
     where class_sets.id = ? and coalesce(listed.attendance, 'expected') = 'expected'
     group by questions.id order by questions.position`,
    [classSetId],
  )) as QuestionLeft[]
}

/** Leaves found so far and all of the sheaves of a class set that are being read; null when none is. */
export async function leavesBeingRead(db: Db, classSetId: string): Promise<{ done: number; of: number | null } | null> {
  const [row] = (await db.raw(
    `select count(*) as sheaves, sum(leaf_count) as leaves, sum((select count(*) from leaves where sheaf_id = sheaves.id)) as done
     from sheaves join sheaf_class_sets on sheaf_class_sets.sheaf_id = sheaves.id
     where sheaf_class_sets.class_set_id = ? and state in ('waiting', 'reading')`,
    [classSetId],
  )) as { sheaves: number; leaves: number | null; done: number | null }[]
  return row && row.sheaves > 0 ? { done: row.done ?? 0, of: row.leaves } : null
}

/** Scripts of a moderator's sample of a class set: all, and those where every question has their settled second mark. Own first marks are not theirs to read. */
export async function ownSample(db: Db, classSetId: string, moderatorId: string): Promise<{ read: number; of: number } | null> {
  const [row] = (await db.raw(
    `select count(*) as "of", coalesce(sum(not exists (
       select 1 from responses join questions on questions.id = responses.question_id and questions.withdrawn_as is null
       where responses.script_id = sample_scripts.script_id and not exists (
         select 1 from markings where response_id = responses.id and marker_id = samples.moderator_id and (round = 'first' or (round = 'second' and state = 'settled'))))), 0) as read
     from samples join sample_scripts on sample_scripts.sample_id = samples.id where samples.class_set_id = ? and samples.moderator_id = ?`,
    [classSetId, moderatorId],
  )) as { read: number; of: number }[]
  return row && row.of > 0 ? row : null
}

/** When a class set was last handed back, in milliseconds. */
export async function handedBackAt(db: Db, classSetId: string): Promise<number | null> {
  const row = await db('releases').where({ class_set_id: classSetId, state: 'released' }).max({ at: 'released_at' }).first<{ at: number | null }>()
  return row.at
}
