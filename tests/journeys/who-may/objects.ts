import path from 'node:path'
import knex, { type Knex } from 'knex'
import { userNames, type Who } from './people'

/** The demo school's database, read beside the running server. */
export function openDemoData(): Knex {
  return knex({ client: 'better-sqlite3', useNullAsDefault: true, connection: { filename: path.join(import.meta.dirname, '../../results/demo/sheafmark.sqlite'), options: { readonly: true } } })
}

/** An answer with all that hangs on it. */
export type AnswerOf = Readonly<{ response: string; question: string; script: string; page: string; leaf: string; space: string; student: string | null }>
export type PaperOf = Readonly<{ paper: string; title: string; classSet: string; class: string; className: string; satOn: string; sheaf: string | null }>

export type Objects = Readonly<{
  users: Readonly<Record<Exclude<Who, 'nobody'>, string>>
  /** The owner's paper on which the marker marks questions 1a and 2; `theirs` is in 1a, `hers` in 1b. */
  half: PaperOf & Readonly<{ theirs: AnswerOf; hers: AnswerOf; unmarked: AnswerOf; point: string; /** The names of who wrote `hers`. */ given: string; family: string }>
  /** The owner's paper with a sample at the moderator: answers inside it (read and not read) and outside. */
  sampled: PaperOf & Readonly<{ sample: string; read: AnswerOf; unread: AnswerOf; outside: AnswerOf }>
  /** The owner's paper with loose sheets and scripts without a sure name. */
  loose: PaperOf & Readonly<{ leaf: string; placed: AnswerOf; nameless: string }>
  /** The owner's paper that is handed back. */
  back: PaperOf & Readonly<{ student: string; mate: string }>
  /** The other teacher's paper and class. */
  others: PaperOf & Readonly<{ question: string; student: string }>
}>

/** An id that nothing has. */
export const nothing = '00000000-0000-4000-8000-000000000000'

type Value = string | null
const paperSql = `select papers.id as paper, papers.title, class_sets.id as classSet, classes.id as class, classes.name as className, class_sets.sat_on as satOn, (select id from sheaves where paper_id = papers.id) as sheaf
  from class_sets join papers on papers.id = class_sets.paper_id join classes on classes.id = class_sets.class_id where classes.name = ?`
const answerSql = `select responses.id as response, questions.id as question, scripts.id as script, script_pages.id as page, script_pages.leaf_id as leaf, answer_spaces.id as space, scripts.student_id as student
  from questions join responses on responses.question_id = questions.id join scripts on scripts.id = responses.script_id join answer_spaces on answer_spaces.question_id = questions.id
  join script_pages on script_pages.script_id = scripts.id and script_pages.paper_page = answer_spaces.page
  where questions.paper_id = ? and script_pages.leaf_id is not null and`
const inside = 'scripts.id in (select script_id from sample_scripts where sample_id = ?)'
const settled = (round: string) => `exists (select 1 from markings where response_id = responses.id and round = '${round}' and state = 'settled' and marker_id = ?)`

/** Looks for single rows; throws when the demo school lacks one. */
function finder(data: Knex) {
  const one = async <T>(sql: string, values: readonly Value[]): Promise<T> => {
    const [row] = (await data.raw(`${sql} limit 1`, values)) as T[]
    if (row === undefined) throw new Error(`The demo school has no: ${sql} ${values.join(' ')}`)
    return row
  }
  return {
    id: async (sql: string, ...values: Value[]) => (await one<{ id: string }>(sql, values)).id,
    paper: (className: string, more = '') => one<PaperOf>(`${paperSql} ${more}`, [className]),
    answer: (paper: string, more: string, ...values: Value[]) => one<AnswerOf>(`${answerSql} ${more} order by scripts.position, questions.position`, [paper, ...values]),
  }
}
type Find = ReturnType<typeof finder>

/** Finds what the walk knocks with. */
export async function findObjects(data: Knex): Promise<Objects> {
  const find = finder(data)
  const users: Partial<Record<Who, string>> = {}
  for (const [who, name] of Object.entries(userNames)) users[who as Who] = await find.id('select id from users where user_name = ?', name)
  const people = users as Objects['users']
  return { users: people, half: await findHalf(find, people), sampled: await findSampled(find, people), loose: await findLoose(find), back: await findBack(find, people), others: await findOthers(find) }
}

async function findHalf(find: Find, users: Objects['users']): Promise<Objects['half']> {
  const paper = await find.paper('8K')
  const hers = await find.answer(paper.paper, `questions.label = '1b' and ${settled('first')}`, users.owner)
  const names = { given: await find.id('select given_name as id from students where id = ?', hers.student), family: await find.id('select family_name as id from students where id = ?', hers.student) }
  return {
    ...paper, ...names, hers, theirs: await find.answer(paper.paper, `questions.label = '1a' and ${settled('first')}`, users.marker),
    unmarked: await find.answer(paper.paper, `questions.label = '4' and not exists (select 1 from markings where response_id = responses.id)`),
    point: await find.id('select id from mark_points where question_id = ?', hers.question),
  }
}

async function findSampled(find: Find, { moderator }: Objects['users']): Promise<Objects['sampled']> {
  const paper = await find.paper('9B')
  const sample = await find.id('select id from samples where class_set_id = ? and moderator_id = ?', paper.classSet, moderator)
  return {
    ...paper, sample, outside: await find.answer(paper.paper, `not ${inside}`, sample),
    read: await find.answer(paper.paper, `${inside} and ${settled('second')}`, sample, moderator), unread: await find.answer(paper.paper, `${inside} and not ${settled('second')}`, sample, moderator),
  }
}

async function findLoose(find: Find): Promise<Objects['loose']> {
  const paper = await find.paper('7D')
  return {
    ...paper, leaf: await find.id(`select leaves.id from leaves join sheaves on sheaves.id = leaves.sheaf_id where sheaves.paper_id = ? and leaves.state = 'loose'`, paper.paper),
    placed: await find.answer(paper.paper, 'scripts.student_id is not null'), nameless: await find.id('select id from scripts where class_set_id = ? and student_id is null', paper.classSet),
  }
}

async function findBack(find: Find, users: Objects['users']): Promise<Objects['back']> {
  const returnedTo = (userId: string) => find.id('select returned_scripts.id from returned_scripts join students on students.id = returned_scripts.student_id where students.user_id = ? and built_at is not null', userId)
  return { ...(await find.paper('6A', 'and exists (select 1 from releases where releases.class_set_id = class_sets.id)')), student: await returnedTo(users.student), mate: await returnedTo(users.mate) }
}

async function findOthers(find: Find): Promise<Objects['others']> {
  const paper = await find.paper('10C')
  return { ...paper, question: await find.id('select id from questions where paper_id = ?', paper.paper), student: await find.id('select student_id as id from class_students where class_id = ?', paper.class) }
}
