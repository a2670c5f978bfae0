import type { Expected } from './expectation'
import { nothing, type Objects } from './objects'

/** A page with an object in it; `says` as in `expectation.ts`. */
export type PageRow = Readonly<{ door: string; of: string; at: (o: Objects) => string; says: Expected }>

const page = (door: string, of: string, at: PageRow['at'], says: Expected): PageRow => ({ door, of, at, says })

export const pageRows: readonly PageRow[] = [
  //                                                                                                                nobody owner other marker moder. admin stud. mate
  page('/', 'the school', () => '/', '                                                                              in     200   200   200    200    200   my    my'),
  page('/account', 'oneself', () => '/account', '                                                                   in     200   200   200    200    200   200   200'),
  page('/audit', 'the school', () => '/audit', '                                                                    in     403   403   403    403    200   my    my'),
  page('/people', 'the school', () => '/people', '                                                                  in     403   403   403    403    200   my    my'),
  page('/people', 'the students', () => '/people?who=students', '                                                   in     403   403   403    403    200   my    my'),
  page('/outbox', 'mails that stay on this machine', () => '/outbox', '                                             in     200   200   200    200    200   my    my'),
  page('/classes', 'the school', () => '/classes', '                                                                in     200   200   403    403    200   my    my'),
  page('/classes/[classId]', 'a class of the owner', (o) => `/classes/${o.half.class}`, '                           in     200   404   403    403    200   my    my'),
  page('/classes/[classId]', 'a class of the other', (o) => `/classes/${o.others.class}`, '                         in     404   200   403    403    200   my    my'),
  page('/classes/[classId]', 'no class', () => `/classes/${nothing}`, '                                             in     404   404   403    403    404   my    my'),
  page('/classes/[classId]/roster', 'a class of the owner', (o) => `/classes/${o.half.class}/roster`, '             in     200   404   403    403    200   my    my'),
  page('/classes/[classId]/roster', 'a class of the other', (o) => `/classes/${o.others.class}/roster`, '           in     404   200   403    403    200   my    my'),

  page('/papers/new', 'the school', () => '/papers/new', '                                                          in     200   200   403    403    403   my    my'),
  page('/papers/[paperId]', 'the half marked paper', (o) => `/papers/${o.half.paper}`, '                            in     200   404   200    404    404   my    my'),
  page('/papers/[paperId]', 'the sampled paper', (o) => `/papers/${o.sampled.paper}`, '                             in     200   404   404    403    404   my    my'),
  page('/papers/[paperId]', 'the paper handed back', (o) => `/papers/${o.back.paper}`, '                            in     200   404   200    404    404   my    my'),
  page('/papers/[paperId]', 'the paper of the other', (o) => `/papers/${o.others.paper}`, '                         in     404   200   404    404    404   my    my'),
  page('/papers/[paperId]', 'no paper', () => `/papers/${nothing}`, '                                               in     404   404   404    404    404   my    my'),
  ...['set', 'print', 'details', 'scan', 'sort', 'hand-back', 'grades'].flatMap((stage) => [
    page(`/papers/[paperId]/${stage}`, 'the half marked paper', (o) => `/papers/${o.half.paper}/${stage}`, '        in     200   404   403    404    404   my    my'),
    page(`/papers/[paperId]/${stage}`, 'the sampled paper', (o) => `/papers/${o.sampled.paper}/${stage}`, '         in     200   404   404    403    404   my    my'),
    page(`/papers/[paperId]/${stage}`, 'the paper of the other', (o) => `/papers/${o.others.paper}/${stage}`, '     in     404   200   404    404    404   my    my'),
  ]),

  page('/papers/[paperId]/mark', 'the half marked paper', (o) => `/papers/${o.half.paper}/mark`, '                                         in 200 404 200 404 404 my my'),
  page('/papers/[paperId]/mark', 'the sampled paper', (o) => `/papers/${o.sampled.paper}/mark`, '                                          in 200 404 404 403 404 my my'),
  page('/papers/[paperId]/mark', 'the paper of the other', (o) => `/papers/${o.others.paper}/mark`, '                                      in 404 200 404 404 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'a question of the marker', (o) => desk(o.half.paper, o.half.theirs.question), '              in 200 404 200 404 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'a question of the owner alone', (o) => desk(o.half.paper, o.half.hers.question), '           in 200 404 403 404 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'first marks of the sampled paper', (o) => desk(o.sampled.paper, o.sampled.unread.question), ' in 200 404 404 403 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'the sample', (o) => desk(o.sampled.paper, o.sampled.unread.question, 'second'), '            in 403 404 404 200 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'agreed marks', (o) => desk(o.sampled.paper, o.sampled.read.question, 'agreed'), '            in 200 404 404 200 404 my my'),
  page('/papers/[paperId]/mark/[questionId]', 'the question of another paper', (o) => desk(o.others.paper, o.half.hers.question), '         in 404 404 404 404 404 my my'),

  page('/papers/[paperId]/second-mark', 'the half marked paper', (o) => `/papers/${o.half.paper}/second-mark`, '                           in 200 404 403 404 404 my my'),
  page('/papers/[paperId]/second-mark', 'the sampled paper', (o) => `/papers/${o.sampled.paper}/second-mark`, '                            in 200 404 404 200 404 my my'),
  page('/papers/[paperId]/second-mark', 'the paper of the other', (o) => `/papers/${o.others.paper}/second-mark`, '                        in 404 200 404 404 404 my my'),
  page('/papers/[paperId]/second-mark/[responseId]', 'an answer marked twice', (o) => `/papers/${o.sampled.paper}/second-mark/${o.sampled.read.response}`, '   in 200 404 404 200 404 my my'),
  // Not read yet: the moderator is kept blind, the owner has nothing to compare and is led back to the list.
  page('/papers/[paperId]/second-mark/[responseId]', 'an answer not read yet', (o) => `/papers/${o.sampled.paper}/second-mark/${o.sampled.unread.response}`, ' in 307 404 404 403 404 my my'),
  page('/papers/[paperId]/second-mark/[responseId]', 'an answer outside the sample', (o) => `/papers/${o.sampled.paper}/second-mark/${o.sampled.outside.response}`, ' in 307 404 404 403 404 my my'),
  page('/papers/[paperId]/second-mark/[responseId]', 'an answer by way of another paper', (o) => `/papers/${o.others.paper}/second-mark/${o.sampled.read.response}`, ' in 404 404 404 404 404 my my'),
  // Its marks call for no adjustment: the owner is led back to the list.
  page('/papers/[paperId]/second-mark/adjust/[sampleId]/[questionId]/[markerId]', 'a marker in the sample', (o) => adjusting(o, o.sampled.sample), '                   in 307 404 404 403 404 my my'),
  page('/papers/[paperId]/second-mark/adjust/[sampleId]/[questionId]/[markerId]', 'no sample', (o) => adjusting(o, nothing), '                                       in 404 404 404 404 404 my my'),
  page('/papers/[paperId]/second-mark/record/[sampleId]', 'the sample', (o) => `/papers/${o.sampled.paper}/second-mark/record/${o.sampled.sample}`, '                in 200 404 404 403 404 my my'),
  page('/papers/[paperId]/second-mark/record/[sampleId]', 'the sample by way of another paper', (o) => `/papers/${o.others.paper}/second-mark/record/${o.sampled.sample}`, ' in 404 404 404 403 404 my my'),

  page('/my-scripts', 'oneself', () => '/my-scripts', '                                                                                    in home home home home home 200 200'),
  page('/my-scripts/[returnedScriptId]', 'the script of the student', (o) => `/my-scripts/${o.back.student}`, '                            in 307 home home home home 200 404'),
  page('/my-scripts/[returnedScriptId]', 'the script of the classmate', (o) => `/my-scripts/${o.back.mate}`, '                             in 307 home home home home 404 200'),
  page('/my-scripts/[returnedScriptId]', 'no script', () => `/my-scripts/${nothing}`, '                                                     in home home home home home 404 404'),

  // Open to whoever holds a password, a link or the set-up code; signed in, one is led on.
  page('/sign-in', 'the door', () => '/sign-in', '                 200 307 307 307 307 307 307 307'),
  page('/new-password', 'the door', () => '/new-password', '       200 200 200 200 200 200 200 200'),
  page('/new-password/[token]', 'no link', () => '/new-password/none', ' 200 200 200 200 200 200 200 200'),
  page('/first-admin', 'a school with people', () => '/first-admin', '   404 404 404 404 404 404 404 404'),
]

function desk(paper: string, question: string, round?: string): string {
  return `/papers/${paper}/mark/${question}${round ? `?round=${round}` : ''}`
}

function adjusting(o: Objects, sample: string): string {
  return `/papers/${o.sampled.paper}/second-mark/adjust/${sample}/${o.sampled.read.question}/${o.users.owner}`
}
