import type { PaperCounts } from '@/lib/core/paper-stages'
import type { Db } from './knex'

// One statement of counts: each line walks an index of the paper's own rows. A script's student is the confirmed one, else the
// suggested one; who was absent leaves nothing to mark.
const statement = `
  with own_scripts as (
    select scripts.id, scripts.student_id,
      coalesce((select attendance from class_set_students where class_set_id = scripts.class_set_id and student_id = coalesce(scripts.student_id, scripts.suggested_student_id)), 'expected') as attendance
    from class_sets join scripts on scripts.class_set_id = class_sets.id where class_sets.paper_id = :paper and (:set is null or class_sets.id = :set)
  ), sat as (select id from own_scripts where attendance = 'expected'),
  own_questions as (select id, maximum, withdrawn_as from questions where paper_id = :paper),
  answers as (
    select responses.id, counting.state,
      not exists (select 1 from answer_spaces where question_id = own_questions.id) or exists (
        select 1 from answer_spaces join script_pages on script_pages.script_id = sat.id and script_pages.paper_page = answer_spaces.page
        where answer_spaces.question_id = own_questions.id and script_pages.leaf_id is not null) as has_page
    from sat join responses on responses.script_id = sat.id
    join own_questions on own_questions.id = responses.question_id and own_questions.withdrawn_as is null
    left join counting_decisions on counting_decisions.response_id = responses.id and counting_decisions.superseded_at is null
    left join markings counting on counting.id = counting_decisions.marking_id
  ), sampled as (
    select sample_scripts.script_id, samples.moderator_id
    from class_sets join samples on samples.class_set_id = class_sets.id join sample_scripts on sample_scripts.sample_id = samples.id
    where class_sets.paper_id = :paper and (:set is null or class_sets.id = :set)
  ), own_sheaves as (
    select id, state from sheaves where paper_id = :paper
    and (:set is null or exists (select 1 from sheaf_class_sets where sheaf_id = sheaves.id and class_set_id = :set))
  ), own_leaves as (
    select leaves.state from own_sheaves join leaves on leaves.sheaf_id = own_sheaves.id
  )
  select
    (select count(*) from own_questions where withdrawn_as is not 'out') as questions,
    (select coalesce(sum(maximum), 0) from own_questions where withdrawn_as is not 'out') as marks,
    (select count(*) from own_sheaves) as sheaves,
    (select count(*) from own_sheaves where state in ('waiting', 'reading')) as sheavesReading,
    (select count(*) from own_sheaves where state = 'failed') as sheavesFailed,
    (select count(*) from own_leaves) as leaves,
    (select count(*) from own_leaves where state = 'loose') as looseSheets,
    (select count(*) from own_scripts) as scripts,
    (select count(*) from own_scripts where student_id is null) as namesOpen,
    (select count(*) from sat join paper_pages on paper_pages.paper_id = :paper
      where exists (select 1 from answer_spaces join own_questions on own_questions.id = answer_spaces.question_id where answer_spaces.page = paper_pages.page)
      and not exists (select 1 from script_pages where script_id = sat.id and paper_page = paper_pages.page and leaf_id is not null)) as pagesMissing,
    (select count(*) from answers where has_page and state is not 'settled') as answersLeft,
    (select count(*) from answers where state = 'settled') as answersMarked,
    (select count(*) from sampled) as sampled,
    (select count(*) from sampled where not exists (
      select 1 from responses join own_questions on own_questions.id = responses.question_id and own_questions.withdrawn_as is null
      join markings first on first.response_id = responses.id and first.round = 'first' and first.state = 'settled' and first.marker_id <> sampled.moderator_id
      where responses.script_id = sampled.script_id and not exists (
        select 1 from markings where response_id = responses.id and round = 'second' and marker_id = sampled.moderator_id and state = 'settled'))) as sampleRead,
    (select count(distinct returned_scripts.script_id) from class_sets join releases on releases.class_set_id = class_sets.id and releases.state = 'released'
      join returned_scripts on returned_scripts.release_id = releases.id where class_sets.paper_id = :paper and (:set is null or class_sets.id = :set)) as returned`

/** What is done and left of a paper, or of one class set of it, counted in one statement. */
export async function countPaper(db: Db, paperId: string, classSetId: string | null = null): Promise<PaperCounts> {
  const [counts] = (await db.raw(statement, { paper: paperId, set: classSetId })) as PaperCounts[]
  return counts!
}

/** Title and the names of the classes that sit the paper; null when there is no such paper. */
export async function paperTitle(db: Db, paperId: string): Promise<{ title: string; classes: string[] } | null> {
  const paper = await db('papers').where({ id: paperId }).first<{ title: string } | undefined>('title')
  if (!paper) return null
  const classes = (await db('class_sets').join('classes', 'classes.id', 'class_sets.class_id').where('class_sets.paper_id', paperId)
    .distinct('classes.name').orderBy('classes.name').pluck('classes.name')) as string[]
  return { title: paper.title, classes }
}
